import type { BandFile } from './band-file.ts';
import { blockSize } from './band-file-format.ts';
import type { RasterGrid } from './raster-grid.ts';
import { readSceneWindow } from './scene-reader.ts';

export interface PixelFeatureOptions {
  /** Filled row-major, pixels.length × bands.length, with stored values; left alone where not given. */
  features?: Float32Array;
  /** Whether blocks stay in the cache, for reads that come back to them. */
  keep?: boolean;
  /** Called with the number of pixels read so far. */
  onRead?: (nRead: number) => void;
}

/**
 * Reads the stored values of single scene pixels, block by block, so that each block of a band is decoded once.
 *
 * `pixels` are flat indices of the scene's grid, ascending.
 * @returns for each pixel 1 where every band has data, 0 elsewhere; not-a-number and infinite values are no data.
 * @throws {RangeError} when the features' length is not pixels × bands, or as `readSceneWindow` does.
 */
export async function readPixelFeatures(
  grid: RasterGrid,
  bands: readonly BandFile[],
  pixels: Uint32Array,
  { features, keep = false, onRead }: PixelFeatureOptions = {},
): Promise<Uint8Array> {
  const nBands = bands.length;
  if (features && features.length !== pixels.length * nBands) {
    throw new RangeError(`${pixels.length} pixels of ${nBands} bands need other than ${features.length} values`);
  }
  const isValid = new Uint8Array(pixels.length).fill(1);
  let from = 0;
  while (from < pixels.length) {
    const blockRow = Math.floor(pixels[from] / grid.width / blockSize);
    const firstBeyond = (blockRow + 1) * blockSize * grid.width;
    let to = from;
    while (to < pixels.length && pixels[to] < firstBeyond) to++;
    for (const group of groupByBlockColumn(pixels, from, to, grid.width)) {
      for (let b = 0; b < nBands; b++) {
        const { x, y, width, height } = group;
        const window = await readSceneWindow(grid, bands[b], x, y, width, height, { keep });
        const { nodata } = bands[b];
        for (const i of group.positions) {
          const column = pixels[i] % grid.width;
          const row = Math.floor(pixels[i] / grid.width);
          const value = window[(row - y) * width + (column - x)];
          if (!Number.isFinite(value) || value === nodata) isValid[i] = 0;
          else if (features) features[i * nBands + b] = value;
        }
      }
    }
    from = to;
    onRead?.(to);
  }
  return isValid;
}

interface PixelGroup {
  /** Window around the pixels, in scene pixels. */
  x: number;
  y: number;
  width: number;
  height: number;
  /** Places in the list of pixels. */
  positions: number[];
}

function groupByBlockColumn(pixels: Uint32Array, from: number, to: number, gridWidth: number): PixelGroup[] {
  const byColumn = new Map<number, number[]>();
  for (let i = from; i < to; i++) {
    const blockColumn = Math.floor((pixels[i] % gridWidth) / blockSize);
    const positions = byColumn.get(blockColumn);
    if (positions) positions.push(i);
    else byColumn.set(blockColumn, [i]);
  }
  const y = Math.floor(pixels[from] / gridWidth);
  const height = Math.floor(pixels[to - 1] / gridWidth) - y + 1;
  return [...byColumn.values()].map((positions) => {
    let left = gridWidth;
    let right = 0;
    for (const i of positions) {
      const column = pixels[i] % gridWidth;
      if (column < left) left = column;
      if (column > right) right = column;
    }
    return { x: left, y, width: right - left + 1, height, positions };
  });
}

/**
 * Whether any of the pixels has data in every band; stops reading at the first that has.
 * `pixels` are flat indices of the scene's grid, ascending.
 */
export async function hasPixelWithData(
  grid: RasterGrid,
  bands: readonly BandFile[],
  pixels: Uint32Array,
): Promise<boolean> {
  // Most samples have data everywhere, so a first look at one pixel settles them.
  for (let from = 0, count = 1; from < pixels.length; from += count, count = Math.min(count * 16, 65_536)) {
    const isValid = await readPixelFeatures(grid, bands, pixels.subarray(from, from + count), { keep: true });
    if (isValid.includes(1)) return true;
  }
  return false;
}
