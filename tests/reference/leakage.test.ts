import { describe, expect, it } from 'vitest';
import { trainModel } from '../../server/analysis/classifiers/classifier.ts';
import { nearestNeighbours } from '../../server/analysis/classifiers/nearest-neighbours.ts';
import { splitSamples } from '../../server/analysis/sampling/split-samples.ts';

/**
 * Worked by hand: one band, twelve pixels in four polygons whose values say where they lie, not what they are.
 * The concern is published (Hammond & Verbyla 1996, International Journal of Remote Sensing 17:1261–1266); the numbers are ours.
 */
const PIXELS = [
  { polygon: 'A1', label: 0, values: [10.0, 10.1, 10.2] },
  { polygon: 'B2', label: 1, values: [11.0, 11.1, 11.2] },
  { polygon: 'B1', label: 1, values: [20.0, 20.1, 20.2] },
  { polygon: 'A2', label: 0, values: [21.0, 21.1, 21.2] },
].flatMap(({ polygon, label, values }) => values.map((value) => ({ polygon, label, value })));

type Pixel = (typeof PIXELS)[number];

function countRight(training: readonly Pixel[], test: readonly Pixel[]): number {
  const set = {
    features: Float32Array.from(training, ({ value }) => value),
    labels: Uint8Array.from(training, ({ label }) => label),
    ...{ nRows: training.length, nFeatures: 1, nClasses: 2 },
  };
  const { model } = trainModel(nearestNeighbours, set, { k: 1, standardise: false }, 1);
  const classIndex = new Uint8Array(test.length);
  model.predictBlock(
    Float32Array.from(test, ({ value }) => value),
    test.length,
    classIndex,
  );
  return test.filter(({ label }, i) => classIndex[i] === label).length;
}

describe('leakage between training and held-out samples', () => {
  it('makes twelve pixels of twelve right when single pixels are left out', () => {
    const right = PIXELS.map((pixel) =>
      countRight(
        PIXELS.filter((other) => other !== pixel),
        [pixel],
      ),
    );
    expect(right.reduce((sum, n) => sum + n, 0)).toBe(12);
  });

  it('makes none of twelve right when whole polygons are left out', () => {
    const polygons = [...new Set(PIXELS.map(({ polygon }) => polygon))];
    const right = polygons.map((polygon) =>
      countRight(
        PIXELS.filter((pixel) => pixel.polygon !== polygon),
        PIXELS.filter((pixel) => pixel.polygon === polygon),
      ),
    );
    expect(right.reduce((sum, n) => sum + n, 0)).toBe(0);
  });

  it('cannot come about by our split: no polygon gives pixels to both sides', () => {
    const candidates = ['A1', 'A2', 'B1', 'B2'].map((id) => ({ id, classId: id[0]! }));
    for (let seed = 0; seed < 20; seed++) {
      const { trainingIds, heldOutIds } = splitSamples(candidates, 0.5, seed);
      expect([...trainingIds, ...heldOutIds].sort()).toEqual(['A1', 'A2', 'B1', 'B2']);
      expect(heldOutIds.map((id) => id[0]).sort()).toEqual(['A', 'B']);
    }
  });
});
