import type { ReproductionCheck } from '../../shared/contracts/reproduction.ts';
import type { App } from '../app-context.ts';
import { Reproduction } from '../entities/reproduction.ts';
import { Run, type RunResult } from '../entities/run.ts';
import type { JobContext } from '../jobs/job-queue.ts';
import { recordActivity } from './activities.ts';
import { listMissingInputs } from './reproductions.ts';
import { runFiles } from './run-files.ts';
import { mapRun } from './run-mapping.ts';
import { trainRun } from './run-training.ts';
import { openRunWork } from './run-work.ts';

/**
 * Makes a run's class map once more from its stored recipe and snapshot, in a place of its own, and writes down whether the bytes
 * are the same. Goes on from finished parts and strips after a restart, as a run does.
 */
export async function executeReproduction(app: App, context: JobContext): Promise<void> {
  await reproduce(app, context.job.subjectId ?? '', context);
}

/** The same, for whoever holds no job. @returns the reproduction with its verdict */
export async function reproduce(
  app: App,
  reproductionId: string,
  context: Omit<JobContext, 'job'> & { job?: JobContext['job'] },
): Promise<Reproduction> {
  const rows = app.db.getRepository(Reproduction);
  const row = await rows.findOneBy({ id: reproductionId });
  if (!row) throw new Error('The reproduction is gone.');
  const run = await app.db.getRepository(Run).findOne({ where: { id: row.runId }, relations: { scene: true } });
  if (!run?.result) throw new Error('The run is gone, or is not finished.');
  const began = Date.now();
  const files = runFiles(row.id);
  try {
    row.threads = app.workers.compute.threads;
    row.missing = await listMissingInputs(app, run, context.signal);
    if (row.missing.length > 0) row.verdict = 'impossible';
    else {
      row.checks = await makeAgain(app, run, run.result, row.id, context);
      row.verdict = row.checks.every((check) => check.expectedSha256 === check.foundSha256) ? 'same' : 'different';
    }
  } catch (error) {
    if (!(context.signal.aborted && context.signal.reason === 'shutdown')) await app.files.remove(files.root);
    throw error;
  }
  await app.files.remove(files.root);
  row.seconds = (Date.now() - began) / 1000;
  const { verdict, checks, missing, threads, seconds } = row;
  await app.db.transaction(async (manager) => {
    await manager.update(Reproduction, { id: row.id }, { verdict, checks, missing, threads, seconds });
    await recordActivity(manager, run.projectId, row.askedById, describeVerdict(run.number, row), `runs/${run.id}`);
  });
  for (const text of missing) context.note(text, 'warning');
  for (const { what, expectedSha256, foundSha256 } of checks) {
    context.note(
      expectedSha256 === foundSha256
        ? `${what}: the same bytes, SHA-256 ${foundSha256}.`
        : `${what}: SHA-256 ${expectedSha256} was expected, ${foundSha256} came out.`,
      expectedSha256 === foundSha256 ? 'info' : 'warning',
    );
  }
  await app.events.publish(run.projectId, { type: 'changed', what: 'runs', id: run.id, by: row.askedById });
  return row;
}

async function makeAgain(
  app: App,
  run: Run,
  result: RunResult,
  placeId: string,
  context: Pick<JobContext, 'signal' | 'report' | 'note'>,
): Promise<ReproductionCheck[]> {
  const work = await openRunWork(app, run, context);
  // The files lie under another id, so that the run's own stay untouched.
  const apart = { ...work, run: Object.assign(new Run(), run, { id: placeId }) };
  const { trainingPixels } = await trainRun(apart);
  const map = await mapRun(apart, trainingPixels);
  return [
    {
      what: 'Class map of the classifier',
      expectedSha256: (result.raw ?? result).classMapSha256,
      foundSha256: map.sha256,
    },
  ];
}

function describeVerdict(number: number, { verdict }: Reproduction): string {
  if (verdict === 'same') return `reproduced run ${number}: the same bytes`;
  if (verdict === 'different') return `reproduced run ${number}: a different map came out`;
  return `could not reproduce run ${number}: an input is gone or changed`;
}
