import { rasterisePolygon } from '../../analysis/sampling/rasterise-polygon.ts';
import { summarisePixels } from '../../analysis/spectral/sample-summary.ts';
import type { BandFile } from '../../raster/band-file.ts';
import { readPixelFeatures } from '../../raster/pixel-features.ts';
import { keepInside } from './study-area-mask.ts';
import type { ComputeTasks, SampleDigest } from './tasks.ts';

/**
 * Reads the pixels of samples and keeps of each its summary and some of its pixels, evenly over it. Pixels outside the study
 * area or without data in a band do not count.
 */
export async function summariseSamples(
  { scene, polygons, pixelsKept }: ComputeTasks['summarise-samples']['input'],
  bands: readonly BandFile[],
): Promise<SampleDigest[]> {
  const nFeatures = bands.length;
  const digests: SampleDigest[] = [];
  for (const polygon of polygons) {
    const pixels = polygon ? rasterisePolygon(polygon, scene.grid.width, scene.grid.height) : new Uint32Array();
    const features = new Float32Array(pixels.length * nFeatures);
    const isUsable = await readPixelFeatures(scene.grid, bands, pixels, { features, keep: true });
    keepInside(isUsable, pixels, scene.grid, scene.studyArea);
    const usable = keepRows(features, isUsable, nFeatures);
    const nUsable = usable.length / nFeatures;
    const nKept = Math.min(pixelsKept, nUsable);
    const kept = new Float32Array(nKept * nFeatures);
    for (let i = 0; i < nKept; i++) {
      const row = Math.floor(((i + 0.5) * nUsable) / nKept);
      kept.set(usable.subarray(row * nFeatures, (row + 1) * nFeatures), i * nFeatures);
    }
    digests.push({ summary: summarisePixels(usable, nFeatures), kept });
  }
  return digests;
}

function keepRows(features: Float32Array, isUsable: Uint8Array, nFeatures: number): Float32Array {
  const kept = new Float32Array(isUsable.reduce((sum, usable) => sum + usable, 0) * nFeatures);
  let at = 0;
  isUsable.forEach((usable, row) => {
    if (usable === 0) return;
    kept.set(features.subarray(row * nFeatures, (row + 1) * nFeatures), at);
    at += nFeatures;
  });
  return kept;
}
