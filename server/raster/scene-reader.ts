import { createBandArray, type BandArray } from './band-dtype.ts';
import type { BandFile } from './band-file.ts';
import { blockSize } from './band-file-format.ts';
import { isSameGrid, type RasterGrid } from './raster-grid.ts';

/** Full-width rows `y` … `y + height − 1` of several bands on the scene's grid, each row-major. */
export interface SceneStrip {
  y: number;
  height: number;
  bands: BandArray[];
}

/**
 * Reads a window of the scene's grid from a band that may stand on its own, coarser grid, by nearest pixel centre.
 * Scene pixels beyond the band get its nodata value; a fringe of up to one band pixel is taken from the band's edge,
 * because a coarse grid seldom ends exactly where a fine one does.
 * @throws {RangeError} when the window leaves the scene, or the band covers less and has no nodata value to say so.
 */
export async function readSceneWindow(
  sceneGrid: RasterGrid,
  band: BandFile,
  x: number,
  y: number,
  width: number,
  height: number,
  options: { keep?: boolean } = {},
): Promise<BandArray> {
  if (x < 0 || y < 0 || width < 1 || height < 1 || x + width > sceneGrid.width || y + height > sceneGrid.height) {
    throw new RangeError(
      `window ${width} × ${height} at ${x}, ${y} is not inside the scene, ${sceneGrid.width} × ${sceneGrid.height}`,
    );
  }
  if (isSameGrid(sceneGrid, band.grid)) return band.readWindow(0, x, y, width, height, options);

  const { grid } = band;
  const cols = mapCentres(
    x,
    width,
    sceneGrid.pixelWidth / grid.pixelWidth,
    (sceneGrid.originX - grid.originX) / grid.pixelWidth,
    grid.width,
  );
  const rows = mapCentres(
    y,
    height,
    sceneGrid.pixelHeight / grid.pixelHeight,
    (grid.originY - sceneGrid.originY) / grid.pixelHeight,
    grid.height,
  );
  const out = createBandArray(band.dtype, width * height);
  const isPartial = cols.hasOutside || rows.hasOutside;
  if (isPartial) {
    if (band.nodata === null)
      throw new RangeError(`${band.path} covers only part of the scene and has no nodata value`);
    out.fill(band.nodata);
  }
  if (cols.first > cols.last || rows.first > rows.last) return out;
  const windowWidth = cols.last - cols.first + 1;
  const windowHeight = rows.last - rows.first + 1;
  const source = await band.readWindow(0, cols.first, rows.first, windowWidth, windowHeight);
  for (let row = 0; row < height; row++) {
    const sourceRow = rows.index[row];
    if (sourceRow < 0) continue;
    const sourceStart = (sourceRow - rows.first) * windowWidth - cols.first;
    const outStart = row * width;
    for (let col = 0; col < width; col++) {
      const sourceCol = cols.index[col];
      if (sourceCol >= 0) out[outStart + col] = source[sourceStart + sourceCol];
    }
  }
  return out;
}

/** For each scene pixel from `start`, the band pixel under its centre, or −1 beyond the band. */
function mapCentres(
  start: number,
  count: number,
  ratio: number,
  shift: number,
  bandSize: number,
): { index: Int32Array; first: number; last: number; hasOutside: boolean } {
  const index = new Int32Array(count);
  let first = bandSize;
  let last = -1;
  let hasOutside = false;
  for (let i = 0; i < count; i++) {
    const position = (start + i + 0.5) * ratio + shift;
    let pixel = Math.floor(position);
    if (pixel < 0 && position > -1) pixel = 0;
    if (pixel >= bandSize && position < bandSize + 1) pixel = bandSize - 1;
    if (pixel < 0 || pixel >= bandSize) {
      index[i] = -1;
      hasOutside = true;
      continue;
    }
    index[i] = pixel;
    if (pixel < first) first = pixel;
    if (pixel > last) last = pixel;
  }
  return { index, first, last, hasOutside };
}

/**
 * Reads a scene from top to bottom in full-width strips of all bands, for mapping.
 * With the default height each block of a band on the scene's grid is decoded once and not kept, so memory is one strip;
 * coarser bands go through the cache, because one of their blocks serves several strips.
 * @throws {RangeError} as `readSceneWindow` does.
 */
export async function* readSceneStrips(
  sceneGrid: RasterGrid,
  bands: readonly BandFile[],
  options: { rowsPerStrip?: number; fromRow?: number; toRow?: number; signal?: AbortSignal } = {},
): AsyncGenerator<SceneStrip> {
  const { rowsPerStrip = blockSize, fromRow = 0, toRow = sceneGrid.height, signal } = options;
  let y = fromRow;
  while (y < toRow) {
    signal?.throwIfAborted();
    // A first strip that ends on a multiple keeps the later ones aligned with the blocks.
    const height = Math.min(rowsPerStrip - (y % rowsPerStrip), toRow - y);
    const strip: BandArray[] = [];
    for (const band of bands) {
      const keep = rowsPerStrip % blockSize !== 0;
      strip.push(await readSceneWindow(sceneGrid, band, 0, y, sceneGrid.width, height, { keep }));
    }
    yield { y, height, bands: strip };
    y += height;
  }
}
