import type { EntityManager } from 'typeorm';
import type { PostProcessingStep } from '../../shared/contracts/post-processing.ts';
import type { App } from '../app-context.ts';
import { PostProcessingRevision } from '../entities/post-processing-revision.ts';
import { RunSample } from '../entities/run-sample.ts';
import { Run, type ClassifierMap, type RunResult } from '../entities/run.ts';
import type { RunPolygon } from '../jobs/compute/tasks.ts';
import type { JobContext } from '../jobs/job-queue.ts';
import { requireResult } from './accuracy.ts';
import { measureOverall } from './accuracy-figures.ts';
import { recordActivity } from './activities.ts';
import { countSteps } from './describe-step.ts';
import { requireUnjudgedMap } from './post-processing.ts';
import { loadHeldOutPolygons, makeProcessedMap, type ProcessedMap } from './post-processing-map.ts';
import { runFiles } from './run-files.ts';

const M2_PER_HECTARE = 10_000;

/** Applies a revision's list to its run's map; until it is done, and if it fails or is cancelled, the map stays as it was. */
export async function executePostProcessing(app: App, context: JobContext): Promise<void> {
  const revision = await app.db.getRepository(PostProcessingRevision).findOneBy({ id: context.job.subjectId ?? '' });
  if (!revision) throw new Error('The list of steps is gone.');
  const run = await app.db
    .getRepository(Run)
    .findOne({ where: { id: revision.runId }, relations: { scene: true, project: true } });
  if (!run?.result) throw new Error('The run is gone, or is not finished.');
  // An attempt that died after the result was written has nothing left to do.
  if (run.result.revision === revision.number) return;
  await applyRevision(app, run, revision, context);
}

/** Applies the list of a run's own recipe as its first revision, as part of the run's job. */
export async function applyRecipeSteps(app: App, run: Run, context: JobContext): Promise<void> {
  const steps = run.recipe.postProcessing ?? [];
  if (steps.length === 0 || run.result?.revision !== undefined) return;
  const revisions = app.db.getRepository(PostProcessingRevision);
  const first = await revisions.findOneBy({ runId: run.id, number: 1 });
  const revision = first ?? revisions.create({ id: run.id, runId: run.id, number: 1, steps, effects: [] });
  if (!first) await revisions.insert({ ...revision, jobId: null, madeById: run.startedById });
  await applyRevision(app, run, revision, context);
}

async function applyRevision(
  app: App,
  run: Run,
  revision: PostProcessingRevision,
  { signal, report, note }: JobContext,
): Promise<void> {
  const files = runFiles(run.id);
  const keys = { mapKey: files.revisionMap(revision.number), mapNamesKey: files.revisionMapNames(revision.number) };
  const heldOut = await loadHeldOutPolygons(app, run);
  let isStored = false;
  try {
    const map = await makeProcessedMap(app, run, revision.steps, { ...keys, heldOut }, { signal, report });
    signal.throwIfAborted();
    const before = requireResult(run);
    const raw = before.raw ?? takeClassifierMap(before);
    await app.db.transaction(async (manager) => {
      await requireUnjudgedMap(manager, run);
      await storeMap(manager, run, revision, { map, heldOut, raw, keys });
    });
    isStored = true;
    for (const { stepId, changedPixels, nLeft } of map.effects) {
      const place = revision.steps.findIndex(({ id }) => id === stepId) + 1;
      note(
        `Step ${place} changed ${changedPixels} pixels${nLeft ? `; ${nLeft} patches without a neighbour stay` : ''}.`,
      );
    }
    // Nobody can ask for the map before last any more; a tile that is being drawn holds its file open until it is done.
    if (before.raw && before.mapKey !== raw.mapKey && before.mapKey !== keys.mapKey) {
      await app.bands.forget(await app.files.localPath(before.mapKey));
      await app.files.remove(before.mapKey);
      await app.files.remove(before.mapNamesKey);
    }
  } finally {
    if (!isStored && !(signal.aborted && signal.reason === 'shutdown')) {
      await app.files.remove(keys.mapKey);
      await app.files.remove(keys.mapNamesKey);
    }
  }
  await app.events.publish(run.projectId, { type: 'changed', what: 'runs', id: run.id, by: revision.madeById });
}

async function storeMap(
  manager: EntityManager,
  run: Run,
  revision: PostProcessingRevision,
  made: {
    map: ProcessedMap;
    heldOut: readonly RunPolygon[];
    raw: ClassifierMap;
    keys: { mapKey: string; mapNamesKey: string };
  },
): Promise<void> {
  const { map, heldOut, raw, keys } = made;
  const polygons = heldOut.map(({ id, classIndex }, i) => ({
    id,
    classIndex,
    mappedPixels: map.heldOutCodes[i] ?? {},
  }));
  const overall = measureOverall(polygons, run.classes, 'pixel');
  for (const { id, mappedPixels } of polygons) {
    await manager.update(RunSample, { runId: run.id, sampleId: id }, { mappedPixels });
  }
  run.result = {
    ...requireResult(run),
    ...keys,
    classMapSha256: map.sha256,
    pixelsByCode: map.pixelsByCode,
    areaHaByCode: Object.fromEntries(
      Object.entries(map.areaM2ByCode).map(([code, areaM2]) => [code, areaM2 / M2_PER_HECTARE]),
    ),
    overallAccuracy: overall.value,
    overallLow: overall.low,
    overallHigh: overall.high,
    notes: [...raw.notes, ...describePostProcessing(revision.steps)],
    raw,
    revision: revision.number,
  };
  await manager.update(Run, { id: run.id }, { result: run.result });
  await manager.update(PostProcessingRevision, { id: revision.id }, { effects: map.effects });
  await recordActivity(
    manager,
    run.projectId,
    revision.madeById,
    `applied post-processing ${revision.number} to run ${run.number}`,
    `runs/${run.id}/post-processing`,
  );
}

function takeClassifierMap(result: RunResult): ClassifierMap {
  const { classMapSha256, pixelsByCode, areaHaByCode, mapKey, mapNamesKey, notes } = result;
  const { overallAccuracy, overallLow, overallHigh } = result;
  return {
    ...{ classMapSha256, pixelsByCode, areaHaByCode, mapKey, mapNamesKey, notes },
    ...{ overallAccuracy, overallLow, overallHigh },
  };
}

function describePostProcessing(steps: readonly PostProcessingStep[]): string[] {
  const { on, byHand } = countSteps(steps);
  if (on === 0) return [];
  const manual = byHand > 0 ? `, ${byHand} of them ${byHand === 1 ? 'an edit' : 'edits'} by hand` : '';
  return [
    `${on} ${on === 1 ? 'step was' : 'steps were'} applied after classification${manual}. The held-out accuracy was judged on the map after them.`,
  ];
}
