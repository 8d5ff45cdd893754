import { blockSize } from './band-file-format.ts';
import type { BandFile } from './band-file.ts';
import type { RasterGrid } from './raster-grid.ts';

export interface CodeComparison {
  grid: RasterGrid;
  /** Area of a pixel of each row, m². */
  rowAreaM2: Float64Array;
  /** Pixels of the polygons both maps are judged by: ascending flat indices, and the polygon of each. */
  owned: { pixels: Uint32Array; owners: Uint32Array };
  /** Code of each polygon's class on the first and on the second map. */
  rightCodes: readonly (readonly [number, number])[];
}

/** Two class maps laid over each other. */
export interface ComparedCodes {
  /** Pairs of codes that occur. */
  pairs: { from: number; to: number; pixels: number; areaM2: number }[];
  /** Of each held-out polygon: pixels right on both maps, on the first only, on the second only, on neither. */
  byPolygon: [number, number, number, number][];
}

/** Counts pairs of codes of two class maps on one grid, over all and in the shared held-out polygons. */
export async function compareCodes(
  { grid, rowAreaM2, owned, rightCodes }: CodeComparison,
  [first, second]: readonly [BandFile, BandFile],
): Promise<ComparedCodes> {
  const pixels = new Float64Array(65536);
  const areaM2 = new Float64Array(65536);
  const byPolygon = rightCodes.map(() => [0, 0, 0, 0] as [number, number, number, number]);
  let next = 0;
  const inRow = new Float64Array(65536);
  for (let y = 0; y < grid.height; y += blockSize) {
    const height = Math.min(blockSize, grid.height - y);
    const a = await first.readWindow(0, 0, y, grid.width, height);
    const b = await second.readWindow(0, 0, y, grid.width, height);
    for (let row = 0; row < height; row++) {
      const seen = new Set<number>();
      for (let i = row * grid.width; i < (row + 1) * grid.width; i++) {
        const pair = (a[i] << 8) | b[i];
        if (inRow[pair]++ === 0) seen.add(pair);
      }
      for (const pair of seen) {
        pixels[pair] += inRow[pair];
        areaM2[pair] += inRow[pair] * rowAreaM2[y + row];
        inRow[pair] = 0;
      }
    }
    const offset = y * grid.width;
    for (; next < owned.pixels.length && owned.pixels[next] < offset + height * grid.width; next++) {
      const at = owned.pixels[next] - offset;
      const owner = owned.owners[next];
      const [rightA, rightB] = rightCodes[owner];
      byPolygon[owner][(a[at] === rightA ? 0 : 2) + (b[at] === rightB ? 0 : 1)]++;
    }
  }
  const pairs = Array.from(pixels, (n, pair) => ({ from: pair >> 8, to: pair & 255, pixels: n, areaM2: areaM2[pair] }));
  return { pairs: pairs.filter((pair) => pair.pixels > 0), byPolygon };
}
