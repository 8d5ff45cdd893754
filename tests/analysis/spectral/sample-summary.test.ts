import { describe, expect, it } from 'vitest';
import { createRng } from '../../../server/analysis/sampling/rng.ts';
import { computeSignatures } from '../../../server/analysis/spectral/class-signature.ts';
import { pickFeatures, poolSummaries, summarisePixels } from '../../../server/analysis/spectral/sample-summary.ts';

const pixels = Float32Array.of(1, 10, 3, 14, 5, 12, 9, 20, 7, 11, 2, 2);

describe('summaries of samples', () => {
  it('has the mean and the products of deviations, worked by hand', () => {
    const { nPixels, mean, scatter } = summarisePixels(Float32Array.of(1, 10, 3, 14), 2);
    expect(nPixels).toBe(2);
    expect([...mean]).toEqual([2, 12]);
    expect([...scatter]).toEqual([2, 4, 4, 8]);
  });

  it('pools to the signature of all pixels at once, however they are cut into samples', () => {
    const [whole] = computeSignatures(pixels, new Uint8Array(6), 2, 1);
    const parts = [pixels.subarray(0, 2), pixels.subarray(2, 8), new Float32Array(), pixels.subarray(8)];
    const pooled = poolSummaries(
      parts.map((part) => summarisePixels(part, 2)),
      2,
    );
    expect(pooled.nPixels).toBe(6);
    whole!.mean.forEach((value, f) => expect(pooled.mean[f]).toBeCloseTo(value, 12));
    whole!.covariance!.forEach((value, i) => expect(pooled.covariance![i]).toBeCloseTo(value, 12));
  });

  it('has a covariance that is the same above and below the diagonal to the last digit', () => {
    const rng = createRng(3);
    const samples = Array.from({ length: 40 }, () =>
      summarisePixels(
        Float32Array.from({ length: 5 * (1 + rng.nextBelow(30)) }, () => rng.nextFloat() * 1000),
        5,
      ),
    );
    const { covariance } = poolSummaries(samples, 5);
    for (let f = 0; f < 5; f++) for (let g = 0; g < f; g++) expect(covariance![g * 5 + f]).toBe(covariance![f * 5 + g]);
  });

  it('has no mean without a pixel and no covariance with one', () => {
    expect(poolSummaries([], 2).mean[0]).toBeNaN();
    expect(poolSummaries([summarisePixels(Float32Array.of(1, 2), 2)], 2).covariance).toBeNull();
  });

  it('picks features in the order asked for', () => {
    const picked = pickFeatures(poolSummaries([summarisePixels(Float32Array.of(1, 10, 3, 14), 2)], 2), [1, 0]);
    expect([...picked.mean]).toEqual([12, 2]);
    expect([...picked.covariance!]).toEqual([8, 4, 4, 2]);
    expect(() => pickFeatures(picked, [2])).toThrow('Feature 2 of 2');
  });
});
