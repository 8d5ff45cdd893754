import { In } from 'typeorm';
import type { App } from '../app-context.ts';
import { Band } from '../entities/band.ts';
import { RunSample } from '../entities/run-sample.ts';
import type { Run } from '../entities/run.ts';
import type { RunPolygon, SceneInput } from '../jobs/compute/tasks.ts';
import type { JobContext } from '../jobs/job-queue.ts';
import { digestInput, drawInPixels, openSceneInput, placeScene, type PlacedScene } from './run-scene.ts';

/** A run with all that its stages need. */
export interface RunWork {
  app: App;
  run: Run;
  /** Aborted when the run is cancelled or the server shuts down. */
  signal: AbortSignal;
  report: JobContext['report'];
  placed: PlacedScene;
  scene: SceneInput;
  bands: Band[];
  training: RunPolygon[];
  heldOut: RunPolygon[];
}

/** Loads a run and brings its files here. @throws Error when what it was started with no longer stands */
export async function openRunWork(
  app: App,
  run: Run,
  { signal, report }: Pick<JobContext, 'signal' | 'report'>,
): Promise<RunWork> {
  const { recipe } = run;
  const placed = placeScene(run.scene);
  if (!placed) throw new Error(`The scene “${run.scene.name}” is no longer ready.`);
  const found = await app.db.getRepository(Band).findBy({ id: In(recipe.bandIds), sceneId: run.sceneId });
  const bands = recipe.bandIds.flatMap((id) => found.find((band) => band.id === id) ?? []);
  const samples = await app.db
    .getRepository(RunSample)
    .find({ where: { runId: run.id }, order: { sampleNumber: 'ASC' } });
  const digest = digestInput({ samples, classes: run.classes, bands, studyArea: run.studyArea });
  if (digest !== run.inputSha256) {
    throw new Error('The scene’s bands are not those the run was started with. Start a new run.');
  }
  const polygonsOf = (part: RunSample['part']) =>
    samples.filter((sample) => sample.part === part).map((sample) => toRunPolygon(placed, run, sample));
  return {
    app,
    run,
    signal,
    report,
    placed,
    scene: await openSceneInput(app, placed, bands, run.studyArea),
    bands,
    training: polygonsOf('training'),
    heldOut: polygonsOf('held-out'),
  };
}

/** A sample as drawn in the scene's pixels. @throws Error when it has no place there */
export function toRunPolygon(placed: PlacedScene, run: Run, sample: RunSample): RunPolygon {
  const polygon = drawInPixels(placed, sample.geometry);
  if (!polygon) throw new Error(`Sample ${sample.sampleNumber} has no place in the scene’s projection.`);
  return { id: sample.sampleId, classIndex: run.classes.findIndex(({ id }) => id === sample.classId), polygon };
}
