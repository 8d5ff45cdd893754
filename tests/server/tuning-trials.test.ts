import { describe, expect, it } from 'vitest';
import type { ClassifierRecipe } from '../../shared/contracts/run.ts';
import { tuningPlanSchema } from '../../shared/contracts/tuning.ts';
import { listTrials } from '../../server/services/tuning-trials.ts';

const forest: ClassifierRecipe = {
  ...{ kind: 'random-forest', trees: 100, maxDepth: 25, minLeaf: 1, featuresPerTree: null, classWeights: 'none' },
};
const plan = (change: object) => tuningPlanSchema.parse({ ranges: [{ parameter: 'trees', values: [50] }], ...change });

describe('the trials of a tuning', () => {
  it('are all combinations, the last setting changing fastest', () => {
    const ranges = [
      { parameter: 'trees', values: [50, 100] },
      { parameter: 'classWeights', values: ['none', 'balanced'] },
      { parameter: 'featuresPerTree', values: [null] },
    ];
    const trials = listTrials(forest, plan({ ranges }));
    expect(trials.map(({ values }) => values)).toEqual([
      [50, 'none', null],
      [50, 'balanced', null],
      [100, 'none', null],
      [100, 'balanced', null],
    ]);
    expect(trials[3]!.classifier).toEqual({ ...forest, trees: 100, classWeights: 'balanced' });
  });

  it('are drawn by the seed, none twice', () => {
    const ranges = [
      { parameter: 'trees', values: [10, 20, 30, 40, 50] },
      { parameter: 'minLeaf', values: [1, 2, 3, 4, 5] },
    ];
    const draw = (seed: number) => listTrials(forest, plan({ method: 'random', nTrials: 9, seed, ranges }));
    const keys = draw(3).map(({ values }) => values.join());
    expect(new Set(keys).size).toBe(9);
    expect(draw(3)).toEqual(draw(3));
    expect(draw(4).map(({ values }) => values.join())).not.toEqual(keys);
    expect(listTrials(forest, plan({ method: 'random', nTrials: 40, ranges }))).toHaveLength(25);
  });

  it('are refused where the classifier has no such setting or value, and where they are too many', () => {
    const refused = (ranges: unknown) => () => listTrials(forest, plan({ ranges }));
    expect(refused([{ parameter: 'neighbours', values: [3] }])).toThrow('no setting “neighbours”');
    expect(refused([{ parameter: 'kind', values: ['minimum-distance'] }])).toThrow('no setting “kind”');
    expect(refused([{ parameter: 'trees', values: [0] }])).toThrow('“trees” cannot be 0: At least one tree.');
    const twice = { parameter: 'trees', values: [1] };
    expect(refused([twice, twice])).toThrow('varied twice');
    const ten = Array.from({ length: 10 }, (_, i) => i + 1);
    expect(
      refused([
        { parameter: 'trees', values: ten },
        { parameter: 'minLeaf', values: ten },
      ]),
    ).toThrow('100 combinations are too many; at most 60');
  });
});
