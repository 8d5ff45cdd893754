import { describe, expect, it } from 'vitest';
import { minimumDistance } from '../../../server/analysis/classifiers/minimum-distance.ts';
import { trainModel, type TrainingSet } from '../../../server/analysis/classifiers/classifier.ts';
import { countConfusion, joinTrainingSets, scoreTrial } from '../../../server/analysis/tuning/judge-trial.ts';

const set = (values: number[], labels: number[]): TrainingSet => ({
  ...{ features: Float32Array.from(values), labels: Uint8Array.from(labels), nRows: labels.length },
  ...{ nFeatures: 1, nClasses: 2 },
});

describe('a trial', () => {
  it('counts true against predicted classes', () => {
    const { model } = trainModel(minimumDistance, set([0, 1, 10, 11], [0, 0, 1, 1]), { metric: 'euclidean' }, 1);
    // One row of the first class lies among the second.
    expect([...countConfusion(model, set([0, 9, 12], [0, 0, 1]))]).toEqual([1, 1, 0, 1]);
  });

  it('is scored by fold and by class, worked by hand', () => {
    const score = scoreTrial([Uint32Array.of(8, 2, 0, 10), Uint32Array.of(3, 7, 5, 5), new Uint32Array(4)], 2);
    expect(score.foldAccuracies).toEqual([0.9, 0.4, null]);
    expect(score.meanAccuracy).toBeCloseTo(0.65, 12);
    expect(score.spread).toBeCloseTo(Math.sqrt(0.125), 12);
    // First class 11 of 20, second 15 of 20.
    expect(score.meanProducersAccuracy).toBeCloseTo((0.55 + 0.75) / 2, 12);
    expect(scoreTrial([], 2)).toEqual({
      ...{ foldAccuracies: [], meanAccuracy: null, spread: null, meanProducersAccuracy: null },
    });
  });

  it('joins folds row after row', () => {
    const joined = joinTrainingSets([set([1, 2], [0, 1]), set([3], [1])]);
    expect([...joined.features]).toEqual([1, 2, 3]);
    expect([...joined.labels]).toEqual([0, 1, 1]);
    expect(() => joinTrainingSets([])).toThrow(RangeError);
    expect(() => joinTrainingSets([set([1], [0]), { ...set([1], [0]), nClasses: 3 }])).toThrow(RangeError);
  });
});
