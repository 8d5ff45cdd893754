import { describe, expect, it } from 'vitest';
import {
  createPointFinder,
  createStrataCounter,
  type DrawnPoint,
  type DrawStratum,
} from '../../../server/analysis/sampling/draw-points.ts';
import { drawRanks } from '../../../server/analysis/sampling/draw-ranks.ts';
import { keepSpacing } from '../../../server/analysis/sampling/keep-spacing.ts';

const strata: DrawStratum[] = [
  { code: 4, key: 'heath' },
  { code: 9, key: 'rock' },
];
const width = 40;
/** 40 × 30 pixels: nodata (0) on the left, rock on every fifth diagonal, heath elsewhere. */
const raster = Uint8Array.from({ length: width * 30 }, (_, i) => {
  const [row, column] = [Math.floor(i / width), i % width];
  if (column < 5) return 0;
  return (row + column) % 5 === 0 ? 9 : 4;
});

function draw(wanted: number[], seed: number, rowsPerStrip = 7): DrawnPoint[] {
  const strips = Array.from({ length: Math.ceil(30 / rowsPerStrip) }, (_, s) => ({
    firstRow: s * rowsPerStrip,
    width,
    codes: raster.subarray(s * rowsPerStrip * width, (s + 1) * rowsPerStrip * width),
  }));
  const counter = createStrataCounter(strata);
  strips.forEach((strip) => counter.addStrip(strip));
  const finder = createPointFinder(strata, counter.sizes(), wanted, seed);
  strips.forEach((strip) => finder.addStrip(strip));
  return finder.points();
}

describe('drawing ranks', () => {
  it('draws each rank once, all of them when asked for all', () => {
    const all = drawRanks(50, 50, 7, 'a');
    expect([...all].sort((a, b) => a - b)).toEqual(Array.from({ length: 50 }, (_, i) => i));
  });

  it('begins with the smaller draw when a larger one is asked for, of any size and without memory for all', () => {
    const few = drawRanks(4_000_000_000, 30, 7, 'a');
    expect([...drawRanks(4_000_000_000, 300, 7, 'a')].slice(0, 30)).toEqual([...few]);
    expect(new Set(drawRanks(4_000_000_000, 300, 7, 'a')).size).toBe(300);
    expect([...drawRanks(4_000_000_000, 30, 7, 'b')]).not.toEqual([...few]);
    expect([...drawRanks(4_000_000_000, 30, 8, 'a')]).not.toEqual([...few]);
  });

  it('makes every pair of 6 equally likely', () => {
    const counts = new Map<string, number>();
    for (let seed = 0; seed < 15_000; seed++) {
      const pair = [...drawRanks(6, 2, seed, 'a')].sort((a, b) => a - b).join();
      counts.set(pair, (counts.get(pair) ?? 0) + 1);
    }
    expect(counts.size).toBe(15);
    // Chi-square with 14 degrees of freedom: 36.12 is passed once in a thousand.
    const chi = [...counts.values()].reduce((sum, n) => sum + (n - 1000) ** 2 / 1000, 0);
    expect(chi).toBeLessThan(36.12);
  });

  it('refuses more than there are', () => {
    expect(() => drawRanks(3, 4, 1, 'a')).toThrow(/4 of 3/);
    expect(() => drawRanks(2 ** 33, 1, 1, 'a')).toThrow(RangeError);
  });
});

describe('drawing points from strips', () => {
  it('finds pixels of the right stratum, none twice, never outside', () => {
    const points = draw([60, 25], 3);
    expect(points.filter(({ stratum }) => stratum === 0)).toHaveLength(60);
    for (const { stratum, row, column } of points) expect(raster[row * width + column]).toBe(strata[stratum].code);
    expect(new Set(points.map(({ row, column }) => row * width + column)).size).toBe(85);
  });

  it('does not depend on how the raster is cut into strips', () => {
    expect(draw([60, 25], 3, 1)).toEqual(draw([60, 25], 3, 30));
  });

  it('holds the smaller design in the larger, stratum by stratum, in the same order', () => {
    const small = draw([20, 5], 3);
    const large = draw([60, 5], 3);
    expect(large.filter(({ stratum, order }) => stratum === 1 || order < 20)).toEqual(small);
    expect(draw([20, 5], 4)).not.toEqual(small);
  });

  it('refuses strips out of turn, a raster that has changed, and strata that share a key', () => {
    const finder = createPointFinder(strata, [840, 210], [1, 1], 1);
    expect(() => finder.addStrip({ firstRow: 3, width, codes: raster })).toThrow(/from row 0, got row 3/);
    finder.addStrip({ firstRow: 0, width, codes: raster.subarray(0, 10 * width) });
    expect(() => finder.points()).toThrow(/were counted/);
    expect(() => createStrataCounter([strata[0], { code: 5, key: 'heath' }])).toThrow(/key of its own/);
  });
});

describe('keeping a least distance', () => {
  const distance = (a: DrawnPoint, b: DrawnPoint) => Math.hypot(a.row - b.row, a.column - b.column);
  const nearest = (points: DrawnPoint[]) =>
    Math.min(...points.flatMap((a, i) => points.slice(i + 1).map((b) => distance(a, b))));

  it('keeps points apart, across strata too, and counts what it leaves out', () => {
    const { kept, nTooNear, nLacking, effect } = keepSpacing(draw([200, 60], 3), [15, 6], 4);
    expect(effect).toMatch(/no longer a simple random sample/);
    expect(kept).toHaveLength(21);
    expect(nearest(kept)).toBeGreaterThanOrEqual(4);
    expect(nearest(draw([15, 6], 3))).toBeLessThan(4);
    expect(nTooNear.reduce((sum, n) => sum + n)).toBeGreaterThan(0);
    expect(nLacking).toEqual([0, 0]);
  });

  it('without a distance is the draw itself', () => {
    const points = draw([15, 6], 3);
    expect(keepSpacing(points, [15, 6], 0)).toEqual({ kept: points, nTooNear: [0, 0], nLacking: [0, 0], effect: null });
  });

  it('says how many are lacking when no more fit', () => {
    const { kept, nLacking } = keepSpacing(draw([800, 200], 3), [400, 100], 10);
    expect(kept.length + nLacking[0] + nLacking[1]).toBe(500);
    expect(nLacking[0]).toBeGreaterThan(300);
    expect(() => keepSpacing([], [1], -1)).toThrow(RangeError);
  });

  it('augments a design without touching what is there', () => {
    const first = keepSpacing(draw([100, 30], 3), [10, 4], 4).kept;
    const more = keepSpacing(draw([200, 60], 3), [18, 6], 4, first).kept;
    expect(more).toHaveLength(24);
    for (const point of first) expect(more).toContainEqual(point);
    expect(nearest(more)).toBeGreaterThanOrEqual(4);
  });
});
