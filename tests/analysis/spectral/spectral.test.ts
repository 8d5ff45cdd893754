import { describe, expect, it } from 'vitest';
import { createRng } from '../../../server/analysis/sampling/rng.ts';
import { createBandAccumulator } from '../../../server/analysis/spectral/band-statistics.ts';
import { computeSignatures, type ClassSignature } from '../../../server/analysis/spectral/class-signature.ts';
import {
  addToHistogram,
  createHistogram,
  createIntegerHistogram,
  percentileOf,
} from '../../../server/analysis/spectral/histogram.ts';
import { computeSeparability } from '../../../server/analysis/spectral/separability.ts';
import { computeSpectralIndex } from '../../../server/analysis/spectral/spectral-index.ts';
import { applyStretch, percentileStretch } from '../../../server/analysis/spectral/stretch.ts';

describe('band statistics', () => {
  it('leave out nodata, NaN and infinities', () => {
    const accumulator = createBandAccumulator(-9999);
    accumulator.add(Float32Array.of(2, 4, -9999, NaN, 4, Infinity, 4, 5, 5, 7, 9));
    // Sum of squared deviations 32 over 8 − 1, by hand.
    expect(accumulator.finish()).toEqual({ nValid: 8, nNodata: 3, min: 2, max: 9, mean: 5, standardDeviation: Math.sqrt(32 / 7) }); // prettier-ignore
  });

  it('keep their digits far from zero and do not depend on how the band is cut', () => {
    const rng = createRng(1);
    const values = Float64Array.from({ length: 10_000 }, () => 1e9 + rng.nextFloat());
    const whole = createBandAccumulator(null);
    whole.add(values);
    const cut = createBandAccumulator(null);
    for (let from = 0; from < values.length; from += 333) cut.add(values.subarray(from, from + 333));
    expect(cut.finish().standardDeviation).toBeCloseTo(whole.finish().standardDeviation!, 7);
    expect(whole.finish().standardDeviation).toBeCloseTo(Math.sqrt(1 / 12), 2);
    expect(cut.finish().mean! - whole.finish().mean!).toBeCloseTo(0, 6);
  });

  it('are null where there is nothing to say', () => {
    const accumulator = createBandAccumulator(0);
    accumulator.add(Uint8Array.of(0, 0));
    expect(accumulator.finish()).toEqual({ nValid: 0, nNodata: 2, min: null, max: null, mean: null, standardDeviation: null }); // prettier-ignore
    accumulator.add(Uint8Array.of(7));
    expect(accumulator.finish()).toMatchObject({ nValid: 1, mean: 7, standardDeviation: null });
  });
});

describe('percentiles', () => {
  it('of whole numbers are those of the sorted values (nearest rank)', () => {
    const rng = createRng(2);
    const values = Uint16Array.from({ length: 1001 }, () => 1 + Math.floor(rng.nextFloat() ** 3 * 5000));
    const histogram = createIntegerHistogram(0, 65535);
    addToHistogram(histogram, values, 0);
    const sorted = values.slice().sort();
    for (const share of [0, 0.01, 0.02, 0.5, 0.98, 1]) {
      expect(percentileOf(histogram, share)).toBe(sorted[Math.max(1, Math.ceil(share * 1001)) - 1]);
    }
  });

  it('of other values are off by half a bin at most, and values outside go to the end bins', () => {
    const histogram = createHistogram(0, 1, 1000);
    addToHistogram(
      histogram,
      Float32Array.from({ length: 1000 }, (_, i) => i / 1000 + 0.0005),
      null,
    );
    expect(Math.abs(percentileOf(histogram, 0.25)! - 0.2495)).toBeLessThanOrEqual(0.0005 + 1e-9);
    addToHistogram(histogram, Float32Array.of(-5, 5, NaN), null);
    expect([histogram.counts[0], histogram.counts[999]]).toEqual([2, 2]);
  });

  it('are null without values, and histograms without width are refused', () => {
    expect(percentileOf(createHistogram(0, 1, 10), 0.5)).toBeNull();
    expect(percentileStretch(createHistogram(0, 1, 10))).toBeNull();
    expect(() => createHistogram(1, 1, 10)).toThrow(/empty/);
    expect(() => percentileOf(createHistogram(0, 1, 10), 2)).toThrow(RangeError);
  });
});

describe('stretching for display', () => {
  it('is linear between the ends, clips beyond and makes no data transparent', () => {
    const display = new Uint8Array(7);
    const alpha = new Uint8Array(7);
    applyStretch(Float32Array.of(0, 10, 15, 20, 99, NaN, -1), -1, { low: 10, high: 20 }, display, alpha);
    expect([...display]).toEqual([0, 0, 128, 255, 255, 0, 0]);
    expect([...alpha]).toEqual([255, 255, 255, 255, 255, 0, 0]);
  });

  it('shows a flat band in middle grey and refuses outputs too short', () => {
    const display = new Uint8Array(2);
    applyStretch(Uint8Array.of(5, 9), null, { low: 5, high: 5 }, display);
    expect([...display]).toEqual([128, 128]);
    expect(() => applyStretch(new Uint8Array(3), null, { low: 0, high: 1 }, display)).toThrow(RangeError);
  });

  it('takes its ends from the 2nd and 98th percentile', () => {
    const histogram = createIntegerHistogram(0, 255);
    addToHistogram(
      histogram,
      Uint8Array.from({ length: 100 }, (_, i) => i + 1),
      null,
    );
    expect(percentileStretch(histogram)).toEqual({ low: 2, high: 98 });
  });
});

describe('spectral indices', () => {
  it('are NaN where the denominator is zero or a band has no data, never infinite', () => {
    const ndvi = computeSpectralIndex('ndvi', {
      nir: Float32Array.of(0, 0.1, NaN),
      red: Float32Array.of(0, -0.1, 0.2),
    });
    expect([...ndvi]).toEqual([NaN, NaN, NaN]);
    // EVI's denominator crosses zero: 0.5 + 6·1 − 7.5·1 + 1 = 0.
    const bands = { nir: Float32Array.of(0.5), red: Float32Array.of(1), blue: Float32Array.of(1) };
    expect(computeSpectralIndex('evi', bands)[0]).toBeNaN();
  });

  it('refuse a missing band and bands of different length', () => {
    expect(() => computeSpectralIndex('nbr', { nir: new Float32Array(1) })).toThrow(/NBR needs the swir2 band/);
    expect(() => computeSpectralIndex('ndvi', { nir: new Float32Array(1), red: new Float32Array(2) })).toThrow(
      /differ/,
    );
  });
});

describe('signatures and separability', () => {
  it('have the mean and the sample covariance of each class', () => {
    const features = Float32Array.of(1, 2, 3, 6, 5, 4, 9, 9);
    const [a, b, c] = computeSignatures(features, Uint8Array.of(0, 0, 0, 1), 2, 3);
    expect([...a.mean]).toEqual([3, 4]);
    // Deviations (−2, −2), (0, 2), (2, 0): sums 8, 4, 8 over 3 − 1.
    expect([...a.covariance!]).toEqual([4, 2, 2, 4]);
    expect(b).toEqual({ nPixels: 1, mean: Float64Array.of(9, 9), covariance: null });
    expect(c).toMatchObject({ nPixels: 0, covariance: null });
  });

  it('cannot be computed from too few pixels, a constant feature or a repeated one', () => {
    const rng = createRng(3);
    const draw = (n: number, row: () => number[]) => {
      const features = Float32Array.from(Array.from({ length: n }, row).flat());
      return computeSignatures(features, new Uint8Array(n), 3, 1)[0];
    };
    const good = draw(50, () => [rng.nextFloat(), rng.nextFloat(), rng.nextFloat()]);
    const few = draw(3, () => [rng.nextFloat(), rng.nextFloat(), rng.nextFloat()]);
    const constant = draw(50, () => [rng.nextFloat(), 4, rng.nextFloat()]);
    const repeated = draw(50, () => {
      const [x, y] = [rng.nextFloat(), rng.nextFloat()];
      return [x, y, x];
    });
    expect(computeSeparability(good, good)).toMatchObject({ bhattacharyya: 0, jeffriesMatusita: 0, divergence: 0 });
    for (const bad of [few, constant, repeated]) expect(computeSeparability(good, bad)).toBeNull();
  });

  it('do not change when the features are mixed linearly', () => {
    const rng = createRng(5);
    const rows = Array.from({ length: 400 }, (_, i) => [
      rng.nextFloat() + (i % 2),
      2 * rng.nextFloat(),
      rng.nextFloat() - 0.3 * (i % 2),
    ]);
    const labels = Uint8Array.from(rows, (_, i) => i % 2);
    const mixed = rows.map(([x, y, z]) => [2 * x + y, y - 3 * z, x + y + z]);
    const measure = (values: number[][]) => {
      const [one, two] = computeSignatures(Float32Array.from(values.flat()), labels, 3, 2) as [
        ClassSignature,
        ClassSignature,
      ];
      return computeSeparability(one, two)!;
    };
    expect(measure(mixed).bhattacharyya).toBeCloseTo(measure(rows).bhattacharyya, 4);
    expect(measure(mixed).divergence).toBeCloseTo(measure(rows).divergence, 3);
    expect(measure(rows).transformedDivergence).toBeGreaterThan(1);
  });
});
