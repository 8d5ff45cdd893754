import type { BandFile } from './band-file.ts';
import { blockSize } from './band-file-format.ts';
import type { RasterGrid } from './raster-grid.ts';
import { readSceneWindow } from './scene-reader.ts';

export interface StripRequest {
  grid: RasterGrid;
  bands: readonly BandFile[];
  /** First row and number of rows. */
  y: number;
  height: number;
  /** Fills classIndex[0..n), and share[0..n) and margin[0..n) when given, from n rows of row-major features. */
  classify: (
    features: Float32Array,
    n: number,
    classIndex: Uint8Array,
    share?: Float32Array,
    margin?: Float32Array,
  ) => void;
  /** Class code of each class index. */
  codes: ArrayLike<number>;
  /** Code of pixels without data or outside. */
  nodataCode: number;
  /** Pixels whose class has a share below a limit get this code instead; none where not given. */
  unclassified?: { below: number; code: number } | null;
  /** Row-major over the strip, 0 where a pixel is outside the area to be mapped; all of it where not given. */
  inside?: Uint8Array | null;
  /** Row-major over the strip; filled in percent, with `layerNodata` where nothing is mapped. */
  layers?: StripLayers | null;
}

/** How sure the map is of each pixel, whole percent 0–100. */
export interface StripLayers {
  /** The winner's share of the votes, or its chance. */
  confidence: Uint8Array;
  /** That share less the runner-up's. */
  margin: Uint8Array;
}

/** Value of layer pixels where nothing is mapped. */
export const layerNodata = 255;

/** Whole blocks, so that each is decoded once, and few enough that memory does not grow with the scene's width. */
const windowColumns = 8 * blockSize;
const chunkPixels = 65_536;

/**
 * Maps full-width rows of a scene: the class code of each pixel, row-major.
 * Features are the stored values as 32-bit floats; a pixel without data in any band gets the nodata code.
 * @throws {RangeError} when the rows leave the scene.
 */
export async function classifyStrip(request: StripRequest): Promise<Uint8Array> {
  const { grid, bands, y, height } = request;
  const out = new Uint8Array(grid.width * height).fill(request.nodataCode);
  const features = new Float32Array(chunkPixels * bands.length);
  const places = new Uint32Array(chunkPixels);
  const classIndex = new Uint8Array(chunkPixels);
  const { unclassified, layers } = request;
  const share = unclassified || layers ? new Float32Array(chunkPixels) : undefined;
  const margin = layers ? new Float32Array(chunkPixels) : undefined;
  layers?.confidence.fill(layerNodata);
  layers?.margin.fill(layerNodata);
  // Shares are 32-bit numbers, and one equal to the limit is not below it.
  const limit = unclassified ? Math.fround(unclassified.below) : 0;
  for (let x = 0; x < grid.width; x += windowColumns) {
    const width = Math.min(windowColumns, grid.width - x);
    const windows = [];
    for (const band of bands) {
      const values = await readSceneWindow(grid, band, x, y, width, height, { keep: false });
      windows.push({ values, nodata: band.nodata });
    }
    let n = 0;
    const flush = (): void => {
      if (n === 0) return;
      request.classify(features, n, classIndex, share, margin);
      for (let i = 0; i < n; i++) out[places[i]] = request.codes[classIndex[i]];
      if (share && unclassified) {
        for (let i = 0; i < n; i++) if (share[i] < limit) out[places[i]] = unclassified.code;
      }
      if (layers && share && margin) {
        for (let i = 0; i < n; i++) {
          layers.confidence[places[i]] = Math.round(share[i] * 100);
          layers.margin[places[i]] = Math.round(margin[i] * 100);
        }
      }
      n = 0;
    };
    for (let row = 0; row < height; row++) {
      for (let column = 0; column < width; column++) {
        const place = row * grid.width + x + column;
        if (request.inside && request.inside[place] === 0) continue;
        if (!takeFeatures(windows, row * width + column, features, n * bands.length)) continue;
        places[n++] = place;
        if (n === chunkPixels) flush();
      }
    }
    flush();
  }
  return out;
}

interface BandWindow {
  values: ArrayLike<number>;
  nodata: number | null;
}

/** Copies one pixel's values; false as soon as a band has no data there. */
function takeFeatures(windows: readonly BandWindow[], at: number, features: Float32Array, start: number): boolean {
  for (let b = 0; b < windows.length; b++) {
    const { values, nodata } = windows[b];
    const value = values[at];
    if (value === nodata || !Number.isFinite(value)) return false;
    features[start + b] = value;
  }
  return true;
}
