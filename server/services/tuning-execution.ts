import { randomUUID } from 'node:crypto';
import { In } from 'typeorm';
import type { TuningTrial } from '../../shared/contracts/tuning.ts';
import type { TrainingSet } from '../analysis/classifiers/classifier.ts';
import { scoreTrial } from '../analysis/tuning/judge-trial.ts';
import type { App } from '../app-context.ts';
import { Band } from '../entities/band.ts';
import { Scene } from '../entities/scene.ts';
import { Tuning } from '../entities/tuning.ts';
import { runComputeTask } from '../jobs/compute/run-compute-task.ts';
import { forEachLimited } from '../jobs/for-each-limited.ts';
import type { JobContext } from '../jobs/job-queue.ts';
import { openSceneInput, placeScene } from './run-scene.ts';
import { planFolds } from './tuning-folds.ts';
import { listTrials, type PlannedTrial } from './tuning-trials.ts';

const READING_SHARE = 0.1;

/**
 * Does a tuning: reads the training pixels of each fold, then has every trial learn from all folds but one and be judged by that
 * one, in turn. Each trial's result is stored as it is known; after a restart those are not tried again.
 */
export async function executeTuning(app: App, context: JobContext): Promise<void> {
  const rows = app.db.getRepository(Tuning);
  const tuning = await rows.findOneBy({ id: context.job.subjectId ?? '' });
  if (!tuning) throw new Error('The tuning is gone.');
  const { recipe, plan, classes } = tuning;
  const sets = await readFolds(app, tuning, context);
  const setsId = randomUUID();
  const planned = listTrials(recipe.classifier, plan);
  const done = new Map(tuning.trials.map((trial) => [trial.number, trial]));
  const missing = planned.filter(({ number }) => !done.has(number));
  const nFits = planned.length * plan.folds;
  let nDone = nFits - missing.length * plan.folds;
  const say = () =>
    context.report('Trying settings', nDone, nFits, READING_SHARE + ((1 - READING_SHARE) * nDone) / nFits);
  say();
  const judge = async (trial: PlannedTrial, signal: AbortSignal): Promise<TuningTrial> => {
    const confusions: Uint32Array[] = [];
    const began = Date.now();
    let error: string | null = null;
    for (let fold = 0; fold < plan.folds; fold++) {
      if (error === null) {
        const input = { sets, setsId, testFold: fold, classifier: trial.classifier, seed: recipe.seed };
        const judged = await runComputeTask(app.workers.compute, 'judge-fold', input, signal);
        if (judged.error === null) confusions.push(judged.confusion);
        else error = judged.error;
      }
      nDone++;
      say();
    }
    const score = scoreTrial(error === null ? confusions : [], classes.length);
    return { ...trial, ...score, seconds: (Date.now() - began) / 1000, error };
  };
  await forEachLimited(missing, app.workers.compute.threads, context.signal, async (trial, signal) => {
    const judged = await judge(trial, signal);
    done.set(trial.number, judged);
    if (judged.error !== null) context.note(`Trial ${trial.number} could not be judged: ${judged.error}`, 'warning');
    const trials = [...done.values()].sort((a, b) => a.number - b.number);
    await rows.update({ id: tuning.id }, { trials });
    await app.events.publish(tuning.projectId, { type: 'changed', what: 'runs', id: null, by: null });
  });
}

/** The training pixels of each fold. A pixel belongs to one fold only, and none to a held-out sample. */
async function readFolds(app: App, tuning: Tuning, context: JobContext): Promise<TrainingSet[]> {
  const { recipe, plan, classes, samples } = tuning;
  const scene = await app.db.getRepository(Scene).findOneBy({ id: recipe.sceneId, projectId: tuning.projectId });
  const placed = scene && placeScene(scene);
  if (!placed) throw new Error('The scene of the recipe is gone or not ready. Choose another and start a new tuning.');
  const found = await app.db.getRepository(Band).findBy({ id: In(recipe.bandIds), sceneId: recipe.sceneId });
  const bands = recipe.bandIds.flatMap((id) => found.find((band) => band.id === id) ?? []);
  if (bands.length < recipe.bandIds.length) throw new Error('A band of the recipe is no longer in the scene.');
  const { folds, heldOut, notes } = planFolds(placed, samples, classes, plan);
  for (const note of notes) context.note(note);
  const input = await openSceneInput(app, placed, bands, tuning.studyArea);
  const sets: TrainingSet[] = [];
  for (const [fold, training] of folds.entries()) {
    const before = folds.slice(0, fold).flat();
    const data = await runComputeTask(
      app.workers.compute,
      'read-training',
      {
        ...{ scene: input, training, heldOut: [...heldOut, ...before], nClasses: classes.length },
        maxPixelsPerClass: Math.ceil(recipe.maxPixelsPerClass / plan.folds),
        seed: recipe.seed,
        progress: new Int32Array(new SharedArrayBuffer(4)),
      },
      context.signal,
    );
    sets.push({ ...data.set, classNames: classes.map(({ name }) => name) });
    context.note(`Fold ${fold + 1}: ${data.set.nRows} pixels of ${training.length} polygons.`);
    context.report('Reading training pixels', fold + 1, folds.length, (READING_SHARE * (fold + 1)) / folds.length);
  }
  return sets;
}
