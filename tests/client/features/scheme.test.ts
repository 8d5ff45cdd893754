import { describe, expect, it } from 'vitest';
import { CLASS_PALETTE } from '../../../shared/constants/class-palette.ts';
import type { LandClass } from '../../../shared/contracts/land-class.ts';
import { differingFields } from '../../../client/src/features/classes/class-conflict.tsx';
import { nextFreeCode, nextFreeColour } from '../../../client/src/features/classes/next-class.ts';
import { moveId, placeInOrder } from '../../../client/src/features/classes/place-in-order.ts';

const codes = (...values: number[]) => values.map((code) => ({ code }));

describe('the next class of a scheme', () => {
  it('takes code 1 first, then the one after the highest', () => {
    expect(nextFreeCode([])).toBe(1);
    expect(nextFreeCode(codes(1, 2, 7))).toBe(8);
  });

  it('fills a gap once 254 is taken, and has none when all are', () => {
    expect(nextFreeCode(codes(1, 254, 2))).toBe(3);
    expect(nextFreeCode(codes(...Array.from({ length: 254 }, (_, index) => index + 1)))).toBeNull();
  });

  it('takes the first palette colour no class has, whatever the case it is written in', () => {
    const [first, second] = CLASS_PALETTE;
    expect(nextFreeColour([])).toBe(first?.colour);
    expect(nextFreeColour([{ colour: first?.colour.toLowerCase() ?? '' }])).toBe(second?.colour);
  });
});

describe('the order of a scheme', () => {
  it('moves a class by one place and stops at the ends', () => {
    expect(moveId(['a', 'b', 'c'], 'c', 1)).toEqual(['a', 'c', 'b']);
    expect(moveId(['a', 'b', 'c'], 'a', -1)).toEqual(['a', 'b', 'c']);
    expect(moveId(['a', 'b', 'c'], 'a', 9)).toEqual(['b', 'c', 'a']);
  });

  it('gives every class its new place, and keeps one it was not told of at the end', () => {
    const classes = ['a', 'b', 'c'].map((id, position) => ({ id, position }) as LandClass);
    const placed = placeInOrder(classes, ['c', 'a']);
    expect(placed.map(({ id, position }) => [id, position])).toEqual([
      ['c', 0],
      ['a', 1],
      ['b', 2],
    ]);
  });
});

describe('two versions of a class', () => {
  it('are compared field by field, colours without regard to case', () => {
    const mine = { code: 3, name: 'Heath', colour: '#A85AA4', definition: 'Mine' };
    const theirs = { ...mine, colour: '#a85aa4', definition: '' };
    expect(differingFields(theirs, mine)).toEqual([{ label: 'Definition', theirs: 'none', mine: 'Mine' }]);
  });
});
