import { describe, expect, it } from 'vitest';
import { choosePlaces, type CandidatePlace } from '../../../server/analysis/sampling/choose-places.ts';
import { createRng } from '../../../server/analysis/sampling/rng.ts';

const plain = { count: 3, spacingPixels: 0, taken: [], seed: 1 };

function place(column: number, margin: number, leading = 0, second = 1): CandidatePlace {
  return { row: 0, column, margin, leading, second };
}

describe('choosing where to sample next', () => {
  it('takes the smallest margins first', () => {
    const candidates = [place(0, 0.4), place(1, 0.1), place(2, 0.9), place(3, 0.2)];
    expect(choosePlaces(candidates, plain)).toEqual([1, 3, 0]);
  });

  it('leaves room for a pair of classes that is confused less often', () => {
    // Lacks 16 × 1 and 1 × 1: roots 4 and 1, so of five places one goes to the rarer pair although its margin is larger.
    const common = Array.from({ length: 16 }, (_, i) => place(i, 0));
    const rare = { ...place(40, 0), leading: 3, second: 2 };
    const chosen = choosePlaces([...common, rare], { ...plain, count: 5 });
    expect(chosen).toHaveLength(5);
    expect(chosen).toContain(16);
  });

  it('counts a pair alike whichever class leads', () => {
    const candidates = [place(0, 0, 0, 1), place(1, 0, 1, 0), place(2, 0, 0, 2), place(3, 0, 2, 0)];
    const chosen = choosePlaces(candidates, { ...plain, count: 2 });
    expect(chosen.filter((i) => i < 2)).toHaveLength(1);
  });

  it('fills up from any pair when the parts leave places over', () => {
    const candidates = [place(0, 0.1), place(1, 0.8), place(2, 0.7)];
    expect(choosePlaces(candidates, plain)).toEqual([0, 2, 1]);
  });

  it('keeps the distance between places and to samples that are there', () => {
    const rng = createRng(4);
    const candidates = Array.from({ length: 2000 }, () => ({
      ...{ row: rng.nextBelow(100), column: rng.nextBelow(100), margin: rng.nextFloat() },
      ...{ leading: rng.nextBelow(3), second: 3 },
    }));
    const taken = [{ row: 50, column: 50 }];
    const chosen = choosePlaces(candidates, { count: 60, spacingPixels: 9, taken, seed: 2 });
    const places = [...taken, ...chosen.map((i) => candidates[i])];
    expect(chosen.length).toBeGreaterThan(30);
    places.forEach((a, i) => {
      for (const b of places.slice(i + 1))
        expect(Math.hypot(a.row - b.row, a.column - b.column)).toBeGreaterThanOrEqual(9);
    });
  });

  it('takes equal margins from all over and the same ones for the same seed', () => {
    const candidates = Array.from({ length: 1000 }, (_, i) => place(i, 0));
    const chosen = choosePlaces(candidates, { ...plain, count: 50 });
    expect(chosen).toEqual(choosePlaces(candidates, { ...plain, count: 50 }));
    expect(chosen).not.toEqual(choosePlaces(candidates, { ...plain, count: 50, seed: 2 }));
    expect(Math.max(...chosen)).toBeGreaterThan(800);
    expect(Math.min(...chosen)).toBeLessThan(200);
  });

  it('refuses numbers that make no sense', () => {
    expect(() => choosePlaces([], { ...plain, count: 1.5 })).toThrow('whole number of places');
    expect(() => choosePlaces([], { ...plain, spacingPixels: -1 })).toThrow('at least 0 pixels');
  });
});
