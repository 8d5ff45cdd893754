import { randomUUID } from 'node:crypto';
import { In } from 'typeorm';
import type { Recipe } from '../../shared/contracts/run.ts';
import type { App } from '../app-context.ts';
import { Job } from '../entities/job.ts';
import { Project } from '../entities/project.ts';
import { ReferenceDesign } from '../entities/reference-design.ts';
import { RunSample } from '../entities/run-sample.ts';
import { Run } from '../entities/run.ts';
import { Scene } from '../entities/scene.ts';
import { Conflict, InvalidInput, NotFound } from '../errors.ts';
import { recordActivity } from './activities.ts';
import { checkRecipe, type RunPlan } from './recipe-check.ts';
import { runFiles } from './run-files.ts';
import { digestInput } from './run-scene.ts';

const INSERT_ROWS = 500;
const SHOWN = { job: true, scene: true, startedBy: true } as const;

/** Newest first. */
export function listRuns(app: App, projectId: string): Promise<Run[]> {
  return app.db.getRepository(Run).find({ where: { projectId }, relations: SHOWN, order: { number: 'DESC' } });
}

export function findRun(app: App, id: string): Promise<Run | null> {
  return app.db.getRepository(Run).findOne({ where: { id }, relations: SHOWN });
}

/**
 * Starts a run: takes its number, the snapshot of samples, classes and study area, and queues the work, all or nothing.
 * @throws InvalidInput "recipe-refused" naming every problem that stops the recipe
 */
export async function startRun(
  app: App,
  project: Project,
  byId: string,
  input: { name: string; note: string; recipe: Recipe },
): Promise<Run> {
  const { problems, plan } = await checkRecipe(app, project, input.recipe);
  const stops = problems.filter(({ severity }) => severity === 'stops');
  if (!plan) {
    throw new InvalidInput(
      'The recipe cannot be run.',
      {
        errors: stops.map(({ path, text }) => ({ path, message: text })),
        found: stops.map(({ text }) => text).join(' '),
        advice: 'Change what is named and start again.',
      },
      'recipe-refused',
    );
  }
  const warnings = problems.map(({ text }) => text);
  const runId = await app.db.transaction((manager) =>
    insertRun(app, manager, project, byId, { ...input, plan, warnings }),
  );
  await app.events.publish(project.id, { type: 'changed', what: 'runs', id: runId, by: byId });
  const run = await findRun(app, runId);
  if (!run) throw new NotFound();
  return run;
}

async function insertRun(
  app: App,
  manager: App['db']['manager'],
  project: Project,
  byId: string,
  {
    name,
    note,
    recipe,
    plan,
    warnings,
  }: { name: string; note: string; recipe: Recipe; plan: RunPlan; warnings: string[] },
): Promise<string> {
  // Held until the run is in, so that the scene cannot be deleted in between.
  const scene = await manager.findOne(Scene, {
    where: { id: plan.scene.id, state: 'ready' },
    lock: { mode: 'pessimistic_write' },
  });
  if (!scene)
    throw new Conflict('The scene was removed in between.', { advice: 'Choose another scene.' }, 'scene-gone');
  await manager.increment(Project, { id: project.id }, 'lastRunNumber', 1);
  const { lastRunNumber: number } = await manager.findOneByOrFail(Project, { id: project.id });

  const classes = plan.classes.map(({ id, code, name: className, colour }) => ({ id, code, name: className, colour }));
  const samples = plan.samples.map(({ sample, part }) => ({
    sampleId: sample.id,
    sampleNumber: sample.number,
    sampleVersion: sample.version,
    classId: sample.classId,
    geometry: sample.geometry,
    part,
  }));
  const { studyArea } = project;
  const inputSha256 = digestInput({ samples, classes, bands: plan.bands, studyArea });
  const id = randomUUID();
  const job = await app.jobs.enqueue(manager, { kind: 'run', projectId: project.id, sceneId: scene.id, runId: id });
  await manager.insert(Run, {
    ...{ id, projectId: project.id, number, name, note, sceneId: scene.id, recipe, classes, studyArea, warnings },
    ...{ inputSha256, jobId: job.id, result: null, startedById: byId },
  });
  const rows = samples.map((sample) => ({ ...sample, runId: id, mappedPixels: null }));
  for (let from = 0; from < rows.length; from += INSERT_ROWS) {
    await manager.insert(RunSample, rows.slice(from, from + INSERT_ROWS));
  }
  await recordActivity(manager, project.id, byId, `started run ${number}${name ? ` (${name})` : ''}`, `runs/${id}`);
  return id;
}

/** Stops a run that waits or works. @throws Conflict when it has ended */
export async function cancelRun(app: App, run: Run, byId: string): Promise<Run> {
  if (!isUnderWay(run)) {
    throw new Conflict('The run has ended already.', { found: `it is ${run.job.state}` }, 'run-ended');
  }
  await app.jobs.cancel(run.jobId);
  await app.db.transaction((manager) =>
    recordActivity(manager, run.projectId, byId, `cancelled run ${run.number}`, `runs/${run.id}`),
  );
  await app.events.publish(run.projectId, { type: 'changed', what: 'runs', id: run.id, by: byId });
  const after = await findRun(app, run.id);
  if (!after) throw new NotFound();
  // A run that waited to go on after a restart has files, and no work under way that would remove them.
  if (after.job.state === 'cancelled') await app.files.remove(runFiles(run.id).root);
  return after;
}

/** Removes a run with its class map. @throws Conflict while it waits or works */
export async function deleteRun(app: App, run: Run, byId: string): Promise<void> {
  await app.db.transaction(async (manager) => {
    const job = await manager.findOne(Job, { where: { id: run.jobId }, lock: { mode: 'pessimistic_write' } });
    if (!job) throw new NotFound();
    const other = await manager.findOneBy(Job, { runId: run.id, state: In(['queued', 'running']) });
    if (isUnderWay({ job }) || other) {
      throw new Conflict(
        'The run is still under way.',
        {
          found: other && !isUnderWay({ job }) ? 'other work on it goes on' : `it is ${job.state}`,
          advice: 'Cancel it first.',
        },
        'run-under-way',
      );
    }
    if (await manager.existsBy(ReferenceDesign, { runId: run.id })) {
      throw new Conflict(
        'The run cannot be deleted: reference points were drawn from its class map.',
        { found: 'a reference design rests on it', advice: 'Delete the design first, if it is still a draft.' },
        'in-use',
      );
    }
    await manager.delete(Run, { id: run.id });
    await manager.delete(Job, [{ id: run.jobId }, { runId: run.id }]);
    await recordActivity(manager, run.projectId, byId, `deleted run ${run.number}`, 'runs');
  });
  // A probe may still hold the class map open.
  if (run.result) await app.bands.forget(await app.files.localPath(run.result.mapKey));
  await app.files.remove(runFiles(run.id).root);
  await app.events.publish(run.projectId, { type: 'changed', what: 'runs', id: run.id, by: byId });
}

export function isUnderWay({ job }: Pick<Run, 'job'>): boolean {
  return job.state === 'queued' || job.state === 'running';
}
