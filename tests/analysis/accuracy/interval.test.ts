import { describe, expect, it } from 'vitest';
import { clusterRatioInterval, wilsonInterval } from '../../../server/analysis/accuracy/interval.ts';
import { erfc, incompleteBeta, normalQuantile, studentTQuantile } from '../../../server/analysis/accuracy/quantiles.ts';

function expectRelative(got: number, wanted: number, tolerance: number): void {
  expect(Math.abs(got - wanted) / Math.abs(wanted)).toBeLessThan(tolerance);
}

describe('quantiles (against scipy.stats of Debian 12)', () => {
  it.each([
    [0.975, 1.959963984540054],
    [0.995, 2.5758293035489004],
    [0.6, 0.2533471031357997],
    [1e-9, -5.9978070150076865],
  ])('has the normal quantile of %s', (p, z) => expectRelative(normalQuantile(p), z, 1e-11));

  it.each([
    [0.975, 1, 12.706204736432095],
    [0.975, 2, 4.302652729911275],
    [0.975, 4, 2.7764451051977987],
    [0.975, 29, 2.045229642132703],
    [0.95, 7, 1.894578605061305],
    [0.995, 1000, 2.580754698065942],
    [0.001, 3, -10.214531852405337],
  ])("has Student's t quantile of %s with %s degrees of freedom", (p, df, t) =>
    expectRelative(studentTQuantile(p, df), t, 1e-10),
  );

  it('has the special functions under them', () => {
    expectRelative(incompleteBeta(2.5, 7, 0.2), 0.36749651990402316, 1e-12);
    expectRelative(incompleteBeta(150, 87, 0.5), 1.8579680697862788e-5, 1e-11);
    expectRelative(erfc(0.3), 0.6713732405408726, 1e-14);
    expectRelative(erfc(2.5), 0.00040695201744495886, 1e-12);
    expectRelative(erfc(4), 1.541725790028002e-8, 1e-13);
  });

  it('refuses probabilities outside the open interval', () => {
    expect(() => normalQuantile(1)).toThrow(RangeError);
    expect(() => studentTQuantile(0.5, 0)).toThrow(/Degrees/);
  });
});

describe('Wilson interval', () => {
  it('agrees with the score equation it solves', () => {
    const { low, high } = wilsonInterval(81, 263)!;
    const z = normalQuantile(0.975);
    for (const bound of [low, high]) {
      expect(Math.abs(81 / 263 - bound) / Math.sqrt((bound * (1 - bound)) / 263)).toBeCloseTo(z, 9);
    }
    // Newcombe 1998, Statistics in Medicine 17:857–872, Table I: 81 of 263 gives 0.2553 to 0.3662 (from memory).
    expect(low).toBeCloseTo(0.2553, 4);
    expect(high).toBeCloseTo(0.3662, 4);
  });

  it('stays inside 0..1 and is not a point at the ends', () => {
    expect(wilsonInterval(0, 20)!.low).toBe(0);
    expect(wilsonInterval(0, 20)!.high).toBeCloseTo(0.1611, 4);
    expect(wilsonInterval(20, 20)!.high).toBe(1);
    expect(wilsonInterval(20, 20)!.low).toBeCloseTo(0.8389, 4);
  });

  it('is null without trials and refuses more successes than trials', () => {
    expect(wilsonInterval(0, 0)).toBeNull();
    expect(() => wilsonInterval(3, 2)).toThrow(RangeError);
  });
});

describe('interval over polygons', () => {
  it('equals the figures worked by hand for three polygons', () => {
    // R = 24/30 = .8; residuals 9 − 8 = 1, 7 − 8 = −1, 8 − 8 = 0; variance 3/2 · 2 / 900 = 1/300.
    const result = clusterRatioInterval([9, 7, 8], [10, 10, 10])!;
    expect(result.estimate).toBeCloseTo(0.8, 14);
    expect(result.standardError).toBeCloseTo(Math.sqrt(1 / 300), 14);
    expect(result.degreesOfFreedom).toBe(2);
    expect(result.low).toBeCloseTo(0.8 - 4.302652729911275 * Math.sqrt(1 / 300), 10);
    expect(result.high).toBe(1);
    expect(result.degenerate).toBe(false);
  });

  it('is the variance of a mean when every cluster is one pixel', () => {
    const hits = [1, 0, 1, 1, 0, 1, 1, 1];
    const result = clusterRatioInterval(hits, new Array(8).fill(1))!;
    expect(result.standardError ** 2).toBeCloseTo((0.75 * 0.25) / 7, 14);
  });

  it('is far wider than a pixel interval when polygons are right or wrong as a whole', () => {
    const hits = [100, 100, 0, 100, 100, 0];
    const byPolygon = clusterRatioInterval(hits, new Array(6).fill(100))!;
    const byPixel = wilsonInterval(400, 600)!;
    expect(byPolygon.high - byPolygon.low).toBeGreaterThan(5 * (byPixel.high - byPixel.low));
  });

  it('does not change when every polygon holds the same pixels ten times over', () => {
    const a = clusterRatioInterval([9, 7, 3], [10, 11, 6])!;
    const b = clusterRatioInterval([90, 70, 30], [100, 110, 60])!;
    expect(b.low).toBeCloseTo(a.low, 12);
    expect(b.high).toBeCloseTo(a.high, 12);
  });

  it('is null below two polygons, ignores empty ones, and says when it has collapsed', () => {
    expect(clusterRatioInterval([5], [9])).toBeNull();
    expect(clusterRatioInterval([5, 0], [9, 0])).toBeNull();
    expect(clusterRatioInterval([5, 9], [5, 9])).toMatchObject({ estimate: 1, degenerate: true, nClusters: 2 });
    expect(() => clusterRatioInterval([5], [4])).toThrow(RangeError);
  });
});
