import { drawTrainingPixels } from '../../analysis/sampling/draw-training-pixels.ts';
import { dropPixelsNear } from '../../analysis/sampling/drop-pixels-near.ts';
import { rasterisePolygon } from '../../analysis/sampling/rasterise-polygon.ts';
import { hashText } from '../../analysis/sampling/rng.ts';
import type { BandFile } from '../../raster/band-file.ts';
import { readPixelFeatures } from '../../raster/pixel-features.ts';
import type { ComputeTasks, RunPolygon, TrainingData } from './tasks.ts';
import { keepInside } from './study-area-mask.ts';

/**
 * Reads what a classifier learns from: pixels of the training polygons that no held-out polygon holds, with data in all
 * bands, of one class only, and at most so many of each class, drawn by the seed.
 */
export async function readTraining(
  input: ComputeTasks['read-training']['input'],
  bands: readonly BandFile[],
): Promise<TrainingData> {
  const { grid, studyArea } = input.scene;
  const rasterise = ({ polygon }: RunPolygon) => rasterisePolygon(polygon, grid.width, grid.height);
  const heldOut = joinAscending(input.heldOut.map(rasterise));
  let nHeldOutToo = 0;
  const polygons = input.training.map((sample) => {
    const all = rasterise(sample);
    const pixels = dropPixelsNear(all, heldOut, grid.width, 0);
    nHeldOutToo += all.length - pixels.length;
    return { id: sample.id, classIndex: sample.classIndex, pixels };
  });

  const candidates = joinAscending(polygons.map(({ pixels }) => pixels));
  const isUsable = await readPixelFeatures(grid, bands, candidates, {
    onRead: (nRead) => Atomics.store(input.progress, 0, Math.round((nRead / candidates.length) * 500)),
  });
  keepInside(isUsable, candidates, grid, studyArea);
  const unusable = new Set(candidates.filter((_, i) => isUsable[i] === 0));
  const usable = polygons.map((polygon) => ({
    ...polygon,
    pixels: polygon.pixels.filter((pixel) => !unusable.has(pixel)),
  }));

  // A stream of its own: the seed itself also splits the samples and grows the trees.
  const drawn = drawTrainingPixels(
    usable,
    input.nClasses,
    input.maxPixelsPerClass,
    hashText(`training pixels ${input.seed}`),
  );
  const nFeatures = bands.length;
  const nRows = drawn.pixels.length;
  const features = new Float32Array(new SharedArrayBuffer(nRows * nFeatures * 4));
  await readPixelFeatures(grid, bands, drawn.pixels, {
    features,
    onRead: (nRead) => Atomics.store(input.progress, 0, 500 + Math.round((nRead / nRows) * 500)),
  });
  const labels = new Uint8Array(new SharedArrayBuffer(nRows));
  labels.set(drawn.labels);
  return {
    set: { features, labels, nRows, nFeatures, nClasses: input.nClasses },
    perClass: drawn.perClass,
    nHeldOutToo,
    nConflicting: drawn.nConflicting,
    nWithoutData: unusable.size,
  };
}

/** All pixels of several lists, ascending, each once. */
function joinAscending(lists: readonly Uint32Array[]): Uint32Array {
  const all = new Uint32Array(lists.reduce((sum, list) => sum + list.length, 0));
  let offset = 0;
  for (const list of lists) {
    all.set(list, offset);
    offset += list.length;
  }
  return all.sort().filter((pixel, i) => i === 0 || pixel !== all[i - 1]);
}
