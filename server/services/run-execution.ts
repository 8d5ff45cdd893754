import type { App } from '../app-context.ts';
import { RunSample } from '../entities/run-sample.ts';
import { Run } from '../entities/run.ts';
import type { JobContext } from '../jobs/job-queue.ts';
import { measureOverall } from './accuracy-figures.ts';
import { recordActivity } from './activities.ts';
import { applyRecipeSteps } from './post-processing-execution.ts';
import { runFiles } from './run-files.ts';
import { sendRunLetter } from './run-letter.ts';
import { mapRun } from './run-mapping.ts';
import { trainRun, type TrainingSummary } from './run-training.ts';
import { openRunWork, type RunWork } from './run-work.ts';

const M2_PER_HECTARE = 10_000;

/**
 * Does a run: trains, maps, counts, and writes down the result at once or not at all. A run interrupted by the end of its server
 * goes on from the parts and strips it has; a cancelled one leaves no file behind, a failed one keeps them
 * for another try.
 */
export async function executeRun(app: App, context: JobContext): Promise<void> {
  const run = await app.db
    .getRepository(Run)
    .findOne({ where: { id: context.job.runId ?? '' }, relations: { scene: true, project: true, startedBy: true } });
  if (!run) throw new Error('The run is gone.');
  const { signal } = context;
  try {
    if (context.job.cancelAsked && !run.result) await waitForCancel(signal);
    // An attempt that died after the result was written has only its tidying left.
    if (!run.result) {
      const work = await openRunWork(app, run, context);
      const training = await trainRun(work);
      context.note(`${count(training.trainingPixels, 'training pixel')} of ${count(work.training.length, 'polygon')}.`);
      for (const text of run.warnings) context.note(text, 'warning');
      for (const text of training.notes) context.note(text);
      await storeResult(work, training);
    }
    await applyRecipeSteps(app, run, context);
  } catch (error) {
    if (signal.aborted && signal.reason === 'shutdown') throw error;
    if (signal.aborted) await app.files.remove(runFiles(run.id).root);
    else {
      app.log.warn({ err: error, run: run.id }, 'run failed');
      await sendRunLetter(app, run, { failure: error instanceof Error ? error.message : String(error) });
    }
    throw error;
  }
  await removeWorkFiles(app, run.id);
  await sendRunLetter(app, run, { failure: null });
}

/** A run cancelled while its server was gone does no more work: the runner tells it to stop at its next heartbeat. */
function waitForCancel(signal: AbortSignal): Promise<never> {
  return new Promise((_, reject) => {
    if (signal.aborted) return reject(signal.reason);
    signal.addEventListener('abort', () => reject(signal.reason), { once: true });
  });
}

async function storeResult(work: RunWork, training: TrainingSummary): Promise<void> {
  const { app, run, heldOut, signal } = work;
  const files = runFiles(run.id);
  const map = await mapRun(work, training.trainingPixels);
  const polygons = heldOut.map(({ id, classIndex }, i) => ({
    id,
    classIndex,
    mappedPixels: map.heldOutCodes[i] ?? {},
  }));
  const overall = measureOverall(polygons, run.classes, 'pixel');
  run.result = {
    trainingPixels: training.trainingPixels,
    trainingPolygons: work.training.length,
    heldOutPolygons: heldOut.length,
    classMapSha256: map.sha256,
    pixelsByCode: map.pixelsByCode,
    areaHaByCode: Object.fromEntries(
      Object.entries(map.areaM2ByCode).map(([code, areaM2]) => [code, areaM2 / M2_PER_HECTARE]),
    ),
    overallAccuracy: overall.value,
    overallLow: overall.low,
    overallHigh: overall.high,
    notes: [...training.notes, ...map.notes],
    mapKey: files.map,
    mapNamesKey: files.mapNames,
    modelKey: files.model,
    layerKeys: { confidence: files.layer('confidence'), margin: files.layer('margin') },
  };
  signal.throwIfAborted();
  await app.db.transaction(async (manager) => {
    for (const { id, mappedPixels } of polygons) {
      await manager.update(RunSample, { runId: run.id, sampleId: id }, { mappedPixels });
    }
    await manager.update(Run, { id: run.id }, { result: run.result });
    await recordActivity(manager, run.projectId, null, `Run ${run.number} finished`, `runs/${run.id}`);
  });
  await app.events.publish(run.projectId, { type: 'changed', what: 'runs', id: run.id, by: null });
}

/** What is left over takes room and nothing else, so failing to remove it does not fail a run that stands. */
async function removeWorkFiles(app: App, runId: string): Promise<void> {
  const { parts, strips, training, layerStrips } = runFiles(runId);
  try {
    for (const key of [parts, strips, training, layerStrips('confidence'), layerStrips('margin')])
      await app.files.remove(key);
  } catch (error) {
    app.log.error({ err: error, run: runId }, 'work files of a run could not be removed');
  }
}

function count(n: number, one: string): string {
  return `${n} ${n === 1 ? one : `${one}s`}`;
}
