import { join } from 'node:path';
import { UNCLASSIFIED_CODE } from '../../shared/constants/class-codes.ts';
import type { PostProcessingStep, StepEffect } from '../../shared/contracts/post-processing.ts';
import type { App } from '../app-context.ts';
import { RunSample } from '../entities/run-sample.ts';
import type { Run } from '../entities/run.ts';
import { runComputeTask, runWatched } from '../jobs/compute/run-compute-task.ts';
import type { FinishedMap, RunPolygon } from '../jobs/compute/tasks.ts';
import type { JobContext } from '../jobs/job-queue.ts';
import { writeClassMapFile } from '../raster/class-map-file.ts';
import { requireResult } from './accuracy.ts';
import { readColour } from './class-colour.ts';
import { resolveSteps } from './post-processing-steps.ts';
import { measurePixelAreas } from './run-areas.ts';
import { UNCLASSIFIED_COLOR } from './run-mapping.ts';
import { placeScene } from './run-scene.ts';
import { toRunPolygon } from './run-work.ts';

const M2_PER_HECTARE = 10_000;
/** Share of the work that is done when the steps are, before the map is written. */
const STEPS_SHARE = 0.7;

export interface ProcessedMap extends FinishedMap {
  effects: StepEffect[];
}

/**
 * Applies steps to the classifier's own map of a run and stores the outcome under other keys; the classifier's map stays. The same
 * steps give the same bytes.
 * @throws InvalidInput for a step that does not fit the map
 */
export async function makeProcessedMap(
  app: App,
  run: Run,
  steps: readonly PostProcessingStep[],
  target: { mapKey: string; mapNamesKey: string | null; heldOut: readonly RunPolygon[] },
  { signal, report }: Pick<JobContext, 'signal' | 'report'>,
): Promise<ProcessedMap> {
  const placed = placeScene(run.scene);
  if (!placed) throw new Error(`The scene “${run.scene.name}” is no longer ready.`);
  const result = requireResult(run);
  const resolved = await resolveSteps(app, run, placed, steps);
  const mapPath = await app.files.localPath((result.raw ?? result).mapKey);
  const { rowAreaM2 } = measurePixelAreas(placed);
  const scratch = await app.files.scratch('post-processing');
  try {
    const rawPath = join(scratch.path, 'classes.raw');
    const { effects, ...map } = await runWatched(
      Math.max(1, resolved.length) * 1000,
      (done, total) => report('Applying steps', Math.floor(done / 1000), resolved.length, (STEPS_SHARE * done) / total),
      (progress) =>
        runComputeTask(
          app.workers.compute,
          'post-process',
          {
            ...{ grid: placed.grid, mapPath, rawPath, rowAreaM2, progress },
            steps: resolved.map(({ step }) => step),
            heldOut: target.heldOut,
          },
          signal,
        ),
    );
    const written = await writeClassMapFile(
      {
        stripPaths: [rawPath],
        grid: placed.grid,
        wkt: placed.wkt,
        classes: [
          ...((map.pixelsByCode[UNCLASSIFIED_CODE] ?? 0) > 0
            ? [{ code: UNCLASSIFIED_CODE, name: 'Unclassified', color: UNCLASSIFIED_COLOR }]
            : []),
          ...run.classes.map(({ code, name, colour }) => ({ code, name, color: readColour(colour) })),
        ],
        title: `Class map of ${run.scene.name}, post-processed`,
        metadata: { CLASS_MAP_SHA256: map.sha256, INPUT_SHA256: run.inputSha256 },
      },
      join(scratch.path, 'class-map.tif'),
      {
        signal,
        onProgress: (done) => report('Writing the class map', done * 100, 100, STEPS_SHARE + (1 - STEPS_SHARE) * done),
      },
    );
    if (target.mapNamesKey !== null) await app.files.adopt(target.mapNamesKey, written.auxPath);
    await app.files.adopt(target.mapKey, written.path);
    return {
      ...map,
      effects: effects.map(({ changedM2, ...effect }, i) => ({
        ...{ stepId: resolved[i]?.stepId ?? '', changedHa: changedM2 / M2_PER_HECTARE },
        ...effect,
      })),
    };
  } finally {
    await scratch.dispose();
  }
}

/** The held-out polygons of a run in its scene's pixels. */
export async function loadHeldOutPolygons(app: App, run: Run): Promise<RunPolygon[]> {
  const placed = placeScene(run.scene);
  if (!placed) throw new Error(`The scene “${run.scene.name}” is no longer ready.`);
  const samples = await app.db
    .getRepository(RunSample)
    .find({ where: { runId: run.id, part: 'held-out' }, order: { sampleNumber: 'ASC' } });
  return samples.map((sample) => toRunPolygon(placed, run, sample));
}
