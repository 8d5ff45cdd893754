import { expect, it } from 'vitest';
import { costlyPairs } from '../../../../client/src/features/estimates/costly-pairs.ts';
import type { Estimates } from '../../../../shared/contracts/reference.ts';

const columns = ['Heath', 'Pasture'].map((name, i) => ({ id: `c${i}`, code: i + 1, name, colour: '#888888' }));
const estimates = (proportions: number[][] | null) =>
  ({
    ...{ proportions, columns, design: { totalAreaHa: 2000 } },
    rows: [
      ...columns.map(({ id, ...rest }) => ({ classId: id, ...rest })),
      { classId: null, code: 0, name: 'Unclassified', colour: '#000000' },
    ],
    counts: [
      [30, 9],
      [2, 40],
      [1, 0],
    ],
  }) as unknown as Estimates;

it('ranks mistakes by the area they cost, not by points, with what was left unclassified among them', () => {
  const pairs = costlyPairs(
    estimates([
      [0.3, 0.01],
      [0.05, 0.6],
      [0.04, 0],
    ]),
  );
  expect(
    pairs.map(({ mappedIndex, referenceIndex, areaHa, points }) => [mappedIndex, referenceIndex, areaHa, points]),
  ).toEqual([
    [1, 0, 100, 2],
    [2, 0, 80, 1],
    [0, 1, 20, 9],
  ]);
});

it('knows no pair where nothing can be estimated', () => {
  expect(costlyPairs(estimates(null))).toEqual([]);
});
