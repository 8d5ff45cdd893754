import { randomUUID } from 'node:crypto';
import { THERMAL_CAUTION } from '../../shared/constants/cautions.ts';
import type { ClassifierRecipe } from '../../shared/contracts/run.ts';
import { prepareClassifier, subspaceRowsPerTree } from '../jobs/compute/classifier-of-recipe.ts';
import type { TrainingSet } from '../analysis/classifiers/classifier.ts';
import { runComputeTask, runWatched } from '../jobs/compute/run-compute-task.ts';
import type { TrainingData } from '../jobs/compute/tasks.ts';
import { forEachLimited } from '../jobs/for-each-limited.ts';
import { runFiles } from './run-files.ts';
import { planShares, planTrainingTasks, READING_SHARE } from './run-shares.ts';
import type { RunWork } from './run-work.ts';

/** What is known of the training once the model stands; kept with it, so that a resumed run need not read again. */
export interface TrainingSummary {
  trainingPixels: number;
  notes: string[];
}

/** Trains the model, or takes up what an interrupted attempt has left of it. The same recipe gives the same bytes. */
export async function trainRun(work: RunWork): Promise<TrainingSummary> {
  const { app, run } = work;
  const files = runFiles(run.id);
  if (await app.files.has(files.model)) {
    return JSON.parse((await app.files.read(files.training)).toString('utf8')) as TrainingSummary;
  }
  const data = await readTrainingData(work);
  const summary = { trainingPixels: data.set.nRows, notes: describeTraining(work, data) };
  await app.files.write(files.training, Buffer.from(JSON.stringify(summary)));
  const classNames = run.classes.map(({ name }) => name);
  const nParts = await trainParts(work, { ...data.set, classNames });
  const partPaths: string[] = [];
  for (let part = 0; part < nParts; part++) partPaths.push(await app.files.localPath(files.part(part)));
  const { nFeatures, nClasses } = data.set;
  const model = await runComputeTask(
    app.workers.compute,
    'assemble-model',
    { shape: { nFeatures, nClasses }, classifier: run.recipe.classifier, partPaths },
    work.signal,
  );
  await app.files.write(files.model, model);
  return summary;
}

async function readTrainingData(work: RunWork): Promise<TrainingData> {
  const { app, run, scene, training, heldOut, signal, report } = work;
  const data = await runWatched(
    1000,
    (done, total) => report('Reading training pixels', done, total, (READING_SHARE * done) / total),
    (progress) =>
      runComputeTask(
        app.workers.compute,
        'read-training',
        {
          scene,
          training,
          heldOut,
          nClasses: run.classes.length,
          maxPixelsPerClass: run.recipe.maxPixelsPerClass,
          seed: run.recipe.seed,
          progress,
        },
        signal,
      ),
  );
  const empty = run.classes.filter((_, i) => data.perClass[i]?.drawn === 0).map(({ name }) => name);
  if (empty.length > 0) {
    throw new Error(
      `No training pixel is left of ${empty.join(', ')}: its training polygons have no data, lie in held-out polygons, or are shared with other classes. Draw more samples there.`,
    );
  }
  return data;
}

async function trainParts(work: RunWork, set: TrainingSet): Promise<number> {
  const { app, run, scene, signal, report } = work;
  const files = runFiles(run.id);
  const { classifier, seed } = run.recipe;
  const { nParts } = prepareClassifier(classifier, set.nFeatures);
  const shares = planShares(classifier, set.nRows, set.nFeatures, set.nClasses, scene.grid.width * scene.grid.height);
  const step = nameTrainingStep(classifier);
  const setId = randomUUID();
  const made = new Set(await app.files.list(files.parts));
  const missing = Array.from({ length: nParts }, (_, part) => part).filter((part) => !made.has(files.part(part)));
  let done = nParts - missing.length;
  const say = () => {
    const share = shares.training + ((shares.mapping - shares.training) * done) / nParts;
    report(step, done, nParts, share);
  };
  say();
  const { threads } = app.workers.compute;
  const tasks = planTrainingTasks(classifier, set, nParts, missing, threads);
  await forEachLimited(tasks, threads, signal, async (parts, taskSignal) => {
    const trained = await runComputeTask(
      app.workers.compute,
      'train-parts',
      { set, setId, classifier, seed, parts },
      taskSignal,
    );
    for (const [i, part] of parts.entries()) {
      const bytes = trained[i];
      if (!bytes) throw new Error(`Part ${part} of the training did not come back.`);
      await app.files.write(files.part(part), bytes);
    }
    done += parts.length;
    say();
  });
  return nParts;
}

function nameTrainingStep({ kind }: ClassifierRecipe): string {
  switch (kind) {
    case 'random-forest':
    case 'random-subspace-forest':
      return 'Training trees';
    case 'nearest-neighbours':
      return 'Arranging training pixels';
    case 'gaussian-maximum-likelihood':
    case 'minimum-distance':
      return 'Measuring the classes';
  }
}

function describeTraining({ run, bands }: RunWork, data: TrainingData): string[] {
  const { classifier, maxPixelsPerClass } = run.recipe;
  const capped = run.classes.flatMap(({ name }, i) => {
    const { available, drawn } = data.perClass[i] ?? { available: 0, drawn: 0 };
    return drawn < available ? [`${name} (${drawn} of ${available})`] : [];
  });
  const notes = ['Learned from and mapped by stored values (digital numbers), without scale and offset.'];
  if (bands.some(({ role }) => role === 'thermal')) notes.push(THERMAL_CAUTION);
  if (capped.length > 0) {
    notes.push(`Training pixels were drawn at random, at most ${maxPixelsPerClass} a class: ${capped.join(', ')}.`);
  }
  if (
    classifier.kind === 'random-subspace-forest' &&
    subspaceRowsPerTree !== null &&
    data.set.nRows > subspaceRowsPerTree
  ) {
    notes.push(`Each tree learned from ${subspaceRowsPerTree} training pixels drawn with replacement.`);
  }
  if (data.nHeldOutToo > 0)
    notes.push(`${pixels(data.nHeldOutToo)} of training polygons left out: a held-out polygon holds them too.`);
  if (data.nConflicting > 0)
    notes.push(`${pixels(data.nConflicting)} left out: training polygons of different classes hold them.`);
  if (data.nWithoutData > 0) {
    notes.push(
      `${pixels(data.nWithoutData)} of training polygons left out: no data in a chosen band, or outside the study area.`,
    );
  }
  return notes;
}

function pixels(n: number): string {
  return `${n} ${n === 1 ? 'pixel' : 'pixels'}`;
}
