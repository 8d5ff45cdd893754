import type { BandArray } from './band-dtype.ts';
import type { BandFile } from './band-file.ts';
import type { RasterGrid } from './raster-grid.ts';
import type { WarpGrid } from './warp-grid.ts';

export type Resampling = 'nearest' | 'bilinear';

/** Values of one band at a tile's pixel centres; `isValid` is 0 where there is no data or no scene. */
export interface SampledBand {
  values: Float64Array;
  isValid: Uint8Array;
}

// A window above this is read from a coarser level: near a pole one tile can span very different scales.
const maxWindowPixels = 6_000_000;

/**
 * Reads a band at the places of a warp grid, from the overview that suits the tile's resolution.
 * A pixel is valid when the band pixel it falls in is; bilinear values leave out neighbours without data.
 * Returns null when the tile misses the band.
 */
export async function sampleBand(
  band: BandFile,
  sceneGrid: RasterGrid,
  warp: WarpGrid,
  resampling: Resampling,
): Promise<SampledBand | null> {
  const { grid } = band;
  // Scene pixels to full-resolution band pixels: col × ratioX + shiftX.
  const ratioX = sceneGrid.pixelWidth / grid.pixelWidth;
  const ratioY = sceneGrid.pixelHeight / grid.pixelHeight;
  const shiftX = (sceneGrid.originX - grid.originX) / grid.pixelWidth;
  const shiftY = (grid.originY - sceneGrid.originY) / grid.pixelHeight;
  const box = findBox(warp, ratioX, shiftX, ratioY, shiftY, grid);
  if (box === null) return null;

  let level = band.chooseLevel(warp.pixelsPerTilePixel * Math.min(ratioX, ratioY));
  while (level < band.levels.length - 1 && countWindowPixels(band, level, box) > maxWindowPixels) level++;
  const { width: levelWidth, height: levelHeight } = band.levels[level];
  const toLevelX = levelWidth / grid.width;
  const toLevelY = levelHeight / grid.height;

  // One pixel more on each side for bilinear neighbours.
  const left = Math.max(0, Math.floor(box.minCol * toLevelX) - 1);
  const top = Math.max(0, Math.floor(box.minRow * toLevelY) - 1);
  const right = Math.min(levelWidth - 1, Math.floor(box.maxCol * toLevelX) + 1);
  const bottom = Math.min(levelHeight - 1, Math.floor(box.maxRow * toLevelY) + 1);
  const windowWidth = right - left + 1;
  const windowHeight = bottom - top + 1;
  const window = await band.readWindow(level, left, top, windowWidth, windowHeight);

  const placement: Placement = {
    scaleX: ratioX * toLevelX,
    shiftX: shiftX * toLevelX - left,
    scaleY: ratioY * toLevelY,
    shiftY: shiftY * toLevelY - top,
    limitX: levelWidth - left,
    limitY: levelHeight - top,
  };
  const sampled = sampleNearest(warp, window, windowWidth, placement, band.nodata);
  if (resampling === 'bilinear') {
    interpolateBilinear(warp, window, windowWidth, windowHeight, placement, band.nodata, sampled);
  }
  return sampled;
}

/** Scene positions to window positions: col × scaleX + shiftX; `limit` is the level's own end, in the window's count. */
interface Placement {
  scaleX: number;
  shiftX: number;
  scaleY: number;
  shiftY: number;
  limitX: number;
  limitY: number;
}

interface Box {
  minCol: number;
  maxCol: number;
  minRow: number;
  maxRow: number;
}

function countWindowPixels(band: BandFile, level: number, box: Box): number {
  const factor = band.getLevelFactor(level);
  return ((box.maxCol - box.minCol) / factor + 3) * ((box.maxRow - box.minRow) / factor + 3);
}

function findBox(
  { cols, rows }: WarpGrid,
  ratioX: number,
  shiftX: number,
  ratioY: number,
  shiftY: number,
  { width, height }: RasterGrid,
): Box | null {
  let minCol = Infinity;
  let maxCol = -Infinity;
  let minRow = Infinity;
  let maxRow = -Infinity;
  for (let i = 0; i < cols.length; i++) {
    const col = cols[i] * ratioX + shiftX;
    const row = rows[i] * ratioY + shiftY;
    // NaN compares false, so a pixel without a place is left out too.
    if (col >= 0 && col < width && row >= 0 && row < height) {
      if (col < minCol) minCol = col;
      if (col > maxCol) maxCol = col;
      if (row < minRow) minRow = row;
      if (row > maxRow) maxRow = row;
    }
  }
  return minCol <= maxCol ? { minCol, maxCol, minRow, maxRow } : null;
}

function sampleNearest(
  { cols, rows }: WarpGrid,
  window: BandArray,
  windowWidth: number,
  { scaleX, shiftX, scaleY, shiftY, limitX, limitY }: Placement,
  nodata: number | null,
): SampledBand {
  const n = cols.length;
  const values = new Float64Array(n);
  const isValid = new Uint8Array(n);
  const hasNodata = nodata !== null && !Number.isNaN(nodata);
  for (let i = 0; i < n; i++) {
    const x = cols[i] * scaleX + shiftX;
    const y = rows[i] * scaleY + shiftY;
    if (!(x >= 0 && x < limitX && y >= 0 && y < limitY)) continue;
    const value = window[Math.floor(y) * windowWidth + Math.floor(x)];
    if (value !== value || (hasNodata && value === nodata)) continue;
    values[i] = value;
    isValid[i] = 1;
  }
  return { values, isValid };
}

function interpolateBilinear(
  { cols, rows }: WarpGrid,
  window: BandArray,
  windowWidth: number,
  windowHeight: number,
  { scaleX, shiftX, scaleY, shiftY }: Placement,
  nodata: number | null,
  { values, isValid }: SampledBand,
): void {
  for (let i = 0; i < values.length; i++) {
    if (isValid[i] === 0) continue;
    const x = cols[i] * scaleX + shiftX - 0.5;
    const y = rows[i] * scaleY + shiftY - 0.5;
    const x0 = Math.floor(x);
    const y0 = Math.floor(y);
    let sum = 0;
    let weightSum = 0;
    for (let dy = 0; dy < 2; dy++) {
      const weightY = dy === 0 ? 1 - (y - y0) : y - y0;
      const row = Math.min(windowHeight - 1, Math.max(0, y0 + dy));
      for (let dx = 0; dx < 2; dx++) {
        const col = Math.min(windowWidth - 1, Math.max(0, x0 + dx));
        const value = window[row * windowWidth + col];
        if (value !== value || value === nodata) continue;
        const weight = weightY * (dx === 0 ? 1 - (x - x0) : x - x0);
        sum += value * weight;
        weightSum += weight;
      }
    }
    if (weightSum > 0) values[i] = sum / weightSum;
  }
}
