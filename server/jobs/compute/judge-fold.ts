import type { TrainingSet } from '../../analysis/classifiers/classifier.ts';
import { countConfusion, joinTrainingSets } from '../../analysis/tuning/judge-trial.ts';
import { prepareClassifier } from './classifier-of-recipe.ts';
import type { ComputeTasks } from './tasks.ts';

/** Joined folds of the last tuning, by the fold left out: each trial comes with the same ones. */
let joined: { setsId: string; byFold: Map<number, TrainingSet> } | null = null;

/** Trains on all folds but one and counts how that one is classified. */
export function judgeFold(input: ComputeTasks['judge-fold']['input']): ComputeTasks['judge-fold']['result'] {
  const { sets, setsId, testFold, seed } = input;
  if (joined?.setsId !== setsId) joined = { setsId, byFold: new Map() };
  const test = sets[testFold];
  if (!test) throw new RangeError(`There is no fold ${testFold}.`);
  let set = joined.byFold.get(testFold);
  if (!set) {
    set = joinTrainingSets(sets.filter((_, fold) => fold !== testFold));
    joined.byFold.set(testFold, set);
  }
  const { nFeatures, nClasses } = set;
  try {
    const classifier = prepareClassifier(input.classifier, nFeatures);
    const parts: Uint8Array[] = [];
    for (let part = 0; part < classifier.nParts; part++) parts.push(classifier.trainPart(set, seed, part));
    const model = classifier.assemble({ nFeatures, nClasses }, parts);
    return { confusion: countConfusion(model, test), error: null };
  } catch (error) {
    return { confusion: new Uint32Array(), error: error instanceof Error ? error.message : String(error) };
  }
}
