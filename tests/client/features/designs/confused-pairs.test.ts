import { describe, expect, it } from 'vitest';
import { listConfusedPairs } from '../../../../client/src/features/designs/confused-pairs.tsx';

const classes = ['Heath', 'Pasture', 'Rock'].map((name, i) => ({ id: `c${i}`, code: i + 1, name, colour: '#888888' }));

describe('classes not told apart', () => {
  it('are pairs in either direction, the most frequent first, without what both said alike', () => {
    const matrix = [
      [9, 2, 1],
      [3, 8, 0],
      [0, 0, 7],
    ];
    expect(listConfusedPairs(matrix, classes)).toEqual([
      { one: 'Heath', other: 'Pasture', points: 5 },
      { one: 'Heath', other: 'Rock', points: 1 },
    ]);
  });

  it('are none where everybody said the same', () => {
    expect(
      listConfusedPairs(
        [
          [4, 0],
          [0, 6],
        ],
        classes,
      ),
    ).toEqual([]);
  });
});
