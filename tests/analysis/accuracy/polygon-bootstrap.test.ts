import { describe, expect, it } from 'vitest';
import { bcaInterval, expandedTail, percentileInterval } from '../../../server/analysis/accuracy/bootstrap-interval.ts';
import { clusterRatioInterval, wilsonInterval } from '../../../server/analysis/accuracy/interval.ts';
import type { PolygonCounts } from '../../../server/analysis/accuracy/polygon-agreement.ts';
import { bootstrapPolygons } from '../../../server/analysis/accuracy/polygon-bootstrap.ts';
import { normalQuantile } from '../../../server/analysis/accuracy/quantiles.ts';
import { createRng } from '../../../server/analysis/sampling/rng.ts';

let next = 0;
const polygon = (referenceClass: number, mappedCounts: number[]): PolygonCounts => ({
  id: `p${next++}`,
  referenceClass,
  mappedCounts,
});

/** Polygons of 40 pixels in two classes that are right as a whole or wrong as a whole. */
function makeClumped(nPolygons: number, seed: number): PolygonCounts[] {
  const rng = createRng(seed);
  return Array.from({ length: nPolygons }, (_, i) => {
    const isRight = rng.nextFloat() < 0.8;
    return polygon(i % 2, (i % 2 === 0) === isRight ? [40, 0] : [0, 40]);
  });
}

describe('bootstrap by polygon', () => {
  it('holds the figures of the polygons as they are', () => {
    const { overall, kappa, perClass } = bootstrapPolygons(
      [polygon(0, [8, 2]), polygon(0, [6, 4]), polygon(1, [1, 9]), polygon(1, [3, 7])],
      2,
      { seed: 1 },
    );
    // By hand: matrix [[14, 4], [6, 16]], p_o = 30/40, p_e = (18·20 + 22·20)/1600 = .5.
    expect(overall.value).toBeCloseTo(0.75, 12);
    expect(kappa.value).toBeCloseTo(0.5, 12);
    expect(perClass[0].users.value).toBeCloseTo(14 / 18, 12);
    expect(perClass[0].producers.value).toBeCloseTo(0.7, 12);
    expect(perClass[0].f1.value).toBeCloseTo(28 / 38, 12);
  });

  it('draws one of two polygons at double weight, so that replicates are one polygon or the other', () => {
    const { perClass } = bootstrapPolygons([polygon(0, [9, 1]), polygon(0, [50, 50])], 2, {
      seed: 3,
      interval: 'percentile',
    });
    const { low, high, standardError } = perClass[0].producers;
    expect([low, high]).toEqual([0.5, 0.9]);
    // Two values, each half the time: standard deviation .2 (n − 1 of 2000 replicates).
    expect(standardError).toBeCloseTo(0.2, 2);
  });

  it('gives the same figures for the same seed, others for another', () => {
    const polygons = makeClumped(30, 4);
    const first = bootstrapPolygons(polygons, 2, { seed: 9 });
    expect(bootstrapPolygons(polygons, 2, { seed: 9 })).toEqual(first);
    expect(bootstrapPolygons(polygons, 2, { seed: 10 }).overall).not.toEqual(first.overall);
  });

  it('has the standard error of the ratio estimate in cluster sampling, for one class of many polygons', () => {
    const rng = createRng(12);
    const polygons = Array.from({ length: 60 }, () => {
      const right = 10 + rng.nextBelow(30);
      return polygon(0, [right, rng.nextBelow(20)]);
    });
    const linear = clusterRatioInterval(
      polygons.map(({ mappedCounts }) => mappedCounts[0]),
      polygons.map(({ mappedCounts }) => mappedCounts[0] + mappedCounts[1]),
    )!;
    const { overall } = bootstrapPolygons(polygons, 2, { seed: 2, nReplicates: 4000 });
    expect(Math.abs(overall.standardError! / linear.standardError - 1)).toBeLessThan(0.05);
  });

  it('is far wider than an interval that takes pixels as independent, where pixels go together (control)', () => {
    const polygons = makeClumped(40, 5);
    const { overall } = bootstrapPolygons(polygons, 2, { seed: 1 });
    const naive = wilsonInterval(Math.round(overall.value! * 1600), 1600)!;
    // Polygons of 40 like pixels: the design effect is 40, and widths differ by about √40 = 6.3.
    const ratio = (overall.high! - overall.low!) / (naive.high - naive.low);
    expect(ratio).toBeGreaterThan(4.5);
    expect(ratio).toBeLessThan(9);
  });

  it('agrees with the binomial where every polygon is a single pixel', () => {
    const rng = createRng(6);
    const polygons = Array.from({ length: 400 }, () => polygon(0, rng.nextFloat() < 0.7 ? [1, 0] : [0, 1]));
    const { overall } = bootstrapPolygons(polygons, 2, { seed: 1, interval: 'percentile' });
    const expected = Math.sqrt((overall.value! * (1 - overall.value!)) / 399);
    expect(Math.abs(overall.standardError! / expected - 1)).toBeLessThan(0.06);
  });

  it('says why there is no interval: undefined, one polygon, no spread, often undefined', () => {
    const polygons = [polygon(0, [10, 0, 0]), polygon(0, [10, 0, 0]), polygon(1, [4, 6, 0])];
    const { perClass, nClassesWithOnePolygon } = bootstrapPolygons(polygons, 3, { seed: 1 });
    expect(perClass[2].users).toMatchObject({ value: null, low: null, problem: 'undefined' });
    expect(perClass[1].producers).toMatchObject({ value: 0.6, low: null, high: null, problem: 'one-polygon' });
    expect(perClass[0].producers).toMatchObject({ value: 1, low: null, problem: 'no-spread', standardError: 0 });
    expect(nClassesWithOnePolygon).toBe(1);

    // Two of twelve polygons hold class 1 on the map; without either it is undefined: (10/12)^11 = 13 % of replicates.
    const rare = Array.from({ length: 12 }, (_, i) => polygon(0, i < 2 ? [5, 5] : [10, 0]));
    const { users } = bootstrapPolygons(rare, 2, { seed: 1, resampling: 'all-together' }).perClass[1];
    expect(users.nUndefined / 2000).toBeCloseTo((10 / 12) ** 11, 1);
    expect(users).toMatchObject({ value: 0, low: null, problem: 'often-undefined' });
  });

  it('leaves out polygons without a mapped pixel, and is undefined when none is left', () => {
    const empty = bootstrapPolygons([polygon(0, [0, 0])], 2, { seed: 1 });
    expect(empty.nPolygons).toBe(0);
    expect(empty.overall).toMatchObject({ value: null, low: null, problem: 'undefined' });
    expect(empty.kappa.value).toBeNull();
  });

  it('refuses a wrong number of classes and too few replicates', () => {
    expect(() => bootstrapPolygons([polygon(0, [1])], 2, { seed: 1 })).toThrow(/counts of 1 classes/);
    expect(() => bootstrapPolygons([polygon(2, [1, 1])], 2, { seed: 1 })).toThrow(/reference class 2/);
    expect(() => bootstrapPolygons([], 2, { seed: 1, nReplicates: 10 })).toThrow(/50 replicates/);
  });
});

describe('intervals from replicates', () => {
  const grid = Float64Array.from({ length: 1001 }, (_, i) => i / 1000);

  it('takes percentiles of the sorted replicates', () => {
    expect(percentileInterval(grid)).toEqual({ low: 0.025, high: 0.975 });
    expect(percentileInterval(new Float64Array(0))).toBeNull();
  });

  it('is the percentile interval when there is neither bias nor acceleration', () => {
    const { low, high } = bcaInterval(grid, 0.5, [0.4, 0.6])!;
    expect(low).toBeCloseTo(0.025, 9);
    expect(high).toBeCloseTo(0.975, 9);
  });

  it('shifts by twice the bias correction (Efron 1987), and goes with any rising transformation', () => {
    // 30 % of the replicates lie below .3: z0 = −.5244, ends at Φ(2·z0 ∓ 1.96).
    const z0 = normalQuantile(0.3);
    const { low, high } = bcaInterval(grid, 0.2995, [1, 1])!;
    expect(z0).toBeCloseTo(-0.524401, 6);
    expect(high).toBeCloseTo(0.8189, 3); // Φ(.911162)
    expect(low).toBeCloseTo(0.00131, 3); // Φ(−3.008766)
    const cubed = bcaInterval(
      grid.map((x) => x ** 3),
      0.2995 ** 3,
      [1, 1],
    )!;
    expect(cubed.high).toBeCloseTo(high ** 3, 4);
  });

  it('widens the tail for few units (t with 3 degrees of freedom: 3.182446, any table)', () => {
    expect(normalQuantile(expandedTail(3))).toBeCloseTo(-3.182446, 5);
    expect(expandedTail(1e7)).toBeCloseTo(0.025, 6);
  });
});
