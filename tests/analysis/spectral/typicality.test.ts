import { execFileSync } from 'node:child_process';
import { describe, expect, it } from 'vitest';
import { createRng } from '../../../server/analysis/sampling/rng.ts';
import { summarisePixels, type SampleSummary } from '../../../server/analysis/spectral/sample-summary.ts';
import {
  judgeTypicality,
  learnSampleSpread,
  mahalanobisSquared,
  upperTailF,
} from '../../../server/analysis/spectral/typicality.ts';

const rng = createRng(11);
const draw = () => Array.from({ length: 12 }, () => rng.nextFloat()).reduce((sum, value) => sum + value, -6);

/** A sample of n alike pixels about a mean of its own. */
function makeSample(nPixels: number, spread = 1, inside = 0.1): SampleSummary {
  const mean = [draw() * spread, draw() * spread];
  return summarisePixels(
    Float32Array.from({ length: nPixels * 2 }, (_, i) => mean[i % 2]! + draw() * inside),
    2,
  );
}

describe('how unusual a sample is for its class', () => {
  it('is the Mahalanobis distance, worked by hand', () => {
    // Inverse of [[4, 2], [2, 3]] is [[3, −2], [−2, 4]] / 8; for d = (2, 1): (3·4 − 2·2·2 + 4·1) / 8 = 1.
    const covariance = Float64Array.of(4, 2, 2, 3);
    expect(mahalanobisSquared(Float64Array.of(3, 5), Float64Array.of(1, 4), covariance)).toBeCloseTo(1, 12);
    expect(mahalanobisSquared(Float64Array.of(3, 5), Float64Array.of(1, 4), Float64Array.of(1, 1, 1, 1))).toBeNull();
  });

  it('has the upper tail of F as SciPy has it', () => {
    const asked = [
      [3.2, 4, 17],
      [0.5, 6, 3],
      [25, 1, 2],
      [1.0001, 7, 120],
    ];
    const script =
      'import json,sys;from scipy.stats import f;print(json.dumps([f.sf(*a) for a in json.load(sys.stdin)]))';
    const out = execFileSync('/usr/bin/python3', ['-c', script], { input: JSON.stringify(asked), encoding: 'utf8' });
    (JSON.parse(out) as number[]).forEach((expected, i) => {
      const [f, p, v] = asked[i]!;
      expect(upperTailF(f!, p!, v!)).toBeCloseTo(expected, 10);
    });
    expect(upperTailF(0, 3, 4)).toBe(1);
  });

  it('calls one sample in twenty of the class unusual at 5 %', () => {
    let nUnusual = 0;
    const trials = 2000;
    for (let i = 0; i < trials; i++) {
      const [spread] = learnSampleSpread([Array.from({ length: 9 }, () => makeSample(20))], 2);
      const verdict = judgeTypicality(makeSample(20), spread!);
      if (verdict!.pValue < 0.05) nUnusual++;
    }
    // Two standard errors of 2000 trials are a good hundredth.
    expect(nUnusual / trials).toBeGreaterThan(0.035);
    expect(nUnusual / trials).toBeLessThan(0.065);
  });

  it('does not call a sample unusual for having few pixels', () => {
    const trials = 1000;
    let nUnusual = 0;
    for (let i = 0; i < trials; i++) {
      const [spread] = learnSampleSpread([Array.from({ length: 30 }, () => makeSample(40, 0.2, 1))], 2);
      if (judgeTypicality(makeSample(1, 0.2, 1), spread!)!.pValue < 0.05) nUnusual++;
    }
    expect(nUnusual / trials).toBeLessThan(0.08);
  });

  it('borrows the spread of all classes while a class has few samples, and says so', () => {
    const many = Array.from({ length: 12 }, () => makeSample(20));
    const few = Array.from({ length: 2 }, () => makeSample(20));
    const [own, borrowed, none] = learnSampleSpread([many, few, []], 2);
    expect(own).toMatchObject({ isPooled: false, degrees: 11, nSamples: 12 });
    expect(borrowed).toMatchObject({ isPooled: true, degrees: 12, nSamples: 2 });
    expect(none).toBeNull();
    expect(judgeTypicality(makeSample(20), borrowed!)).toMatchObject({ isPooled: true, nSamples: 2 });
  });

  it('gives no verdict without enough samples or when features repeat each other', () => {
    const [alone] = learnSampleSpread([[makeSample(5)]], 2);
    expect(judgeTypicality(makeSample(5), alone!)).toBeNull();
    const doubled = Array.from({ length: 8 }, () => {
      const value = draw();
      return summarisePixels(Float32Array.of(value, value, value + 1, value + 1), 2);
    });
    const [spread] = learnSampleSpread([doubled], 2);
    expect(judgeTypicality(doubled[0]!, spread!)).toBeNull();
  });
});
