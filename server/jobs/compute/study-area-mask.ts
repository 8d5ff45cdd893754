import type { MultiPolygon } from '../../analysis/sampling/polygon.ts';
import { rasteriseMultiPolygon } from '../../analysis/sampling/rasterise-polygon.ts';
import type { RasterGrid } from '../../raster/raster-grid.ts';

const STRIP_ROWS = 256;

/** 1 for each pixel of the rows whose centre is inside the study area, row-major; null when there is no study area. */
export function maskStrip(studyArea: MultiPolygon | null, width: number, y: number, height: number): Uint8Array | null {
  if (!studyArea) return null;
  const shifted = studyArea.map((polygon) =>
    polygon.map((ring) => ring.map(([column, row]) => [column, row - y] as const)),
  );
  const mask = new Uint8Array(width * height);
  for (const pixel of rasteriseMultiPolygon(shifted, width, height)) mask[pixel] = 1;
  return mask;
}

/** Sets `isUsable` to 0 for pixels outside the study area; `pixels` are ascending flat indices of the grid. */
export function keepInside(
  isUsable: Uint8Array,
  pixels: Uint32Array,
  { width, height }: RasterGrid,
  studyArea: MultiPolygon | null,
): void {
  if (!studyArea) return;
  let strip = -1;
  let mask: Uint8Array | null = null;
  pixels.forEach((pixel, i) => {
    const wanted = Math.floor(pixel / width / STRIP_ROWS);
    if (wanted !== strip) {
      strip = wanted;
      mask = maskStrip(studyArea, width, strip * STRIP_ROWS, Math.min(STRIP_ROWS, height - strip * STRIP_ROWS));
    }
    if (mask?.[pixel - strip * STRIP_ROWS * width] === 0) isUsable[i] = 0;
  });
}
