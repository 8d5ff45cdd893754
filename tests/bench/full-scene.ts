import { execFileSync } from 'node:child_process';
import { once } from 'node:events';
import { createWriteStream, existsSync, readFileSync } from 'node:fs';
import { rm } from 'node:fs/promises';
import { join } from 'node:path';
import { finished } from 'node:stream/promises';
import { fileURLToPath } from 'node:url';
import type { TrainingSet } from '../../server/analysis/classifiers/classifier.ts';
import { createRng } from '../../server/analysis/sampling/rng.ts';
import type { RasterGrid } from '../../server/raster/raster-grid.ts';
import { writeGeoTiffFromRaw } from '../../server/raster/raw-to-geotiff.ts';
import { createRandom, makeSyntheticBand } from './synthetic-band.ts';

export const nSceneBands = 6;
export const nSceneClasses = 10;
const SEED_SPREAD = 97;
/** Beside the repository, where it is there: a real scene of 28.5 m, not part of the project. */
const COAST_PATH = fileURLToPath(new URL('../../../shared/data/coast-6band.tif', import.meta.url));

interface Base {
  width: number;
  height: number;
  /** Values without noise, 0..255. */
  bands: Uint8Array[];
  source: string;
}

export interface FullScene {
  grid: RasterGrid;
  bandPaths: string[];
  source: string;
  /** Value of a band at a pixel; the same whenever asked. */
  valueAt(band: number, column: number, row: number): number;
  /** Class at a pixel, from the values without noise. */
  classAt(column: number, row: number): number;
}

/** The real scene as raw bands, or an invented one of its size. */
function readBase(folder: string): Base {
  const [width, height] = [349, 352];
  if (!existsSync(COAST_PATH)) {
    const bands = Array.from({ length: nSceneBands }, (_, b) => {
      const invented = makeSyntheticBand(width, height, 'uint16', b + 1) as Uint16Array;
      return Uint8Array.from(invented, (value) => Math.min(255, Math.max(0, (value - 7000) / 36)));
    });
    return { width, height, bands, source: 'an invented scene' };
  }
  const raw = join(folder, 'base.raw');
  execFileSync('gdal_translate', ['-q', '-of', 'ENVI', '-co', 'INTERLEAVE=BSQ', COAST_PATH, raw]);
  const all = readFileSync(raw);
  const bands = Array.from(
    { length: nSceneBands },
    (_, b) => new Uint8Array(all.subarray(b * width * height, (b + 1) * width * height)),
  );
  return { width, height, bands, source: 'coast-6band.tif' };
}

/**
 * A scene of the wanted size: the base scene mirrored over and over, stretched to 16 bits, with noise on every value; one
 * band file each, as ingest writes them.
 */
export async function makeFullScene(width: number, height: number, folder: string): Promise<FullScene> {
  const base = readBase(folder);
  const grid = { width, height, originX: 400_000, originY: 5_900_000, pixelWidth: 30, pixelHeight: 30 };
  const fold = (at: number, size: number) => {
    const place = at % (2 * size);
    return place < size ? place : 2 * size - 1 - place;
  };
  const baseAt = (column: number, row: number) => fold(row, base.height) * base.width + fold(column, base.width);
  const valueAt = (band: number, column: number, row: number) => {
    const noise = hash(column, row, band) + hash(row, column, band + 31) + hash(column, row, band + 57) - 1.5;
    return Math.round(6000 + base.bands[band][baseAt(column, row)] * 60 + noise * 220);
  };
  const random = createRandom(SEED_SPREAD);
  const centres = Array.from({ length: nSceneClasses }, () => Math.floor(random() * base.width * base.height));
  const classAt = (column: number, row: number) => {
    const at = baseAt(column, row);
    let nearest = 0;
    let least = Infinity;
    centres.forEach((centre, c) => {
      const distance = base.bands.reduce((sum, band) => sum + (band[at] - band[centre]) ** 2, 0);
      if (distance < least) {
        least = distance;
        nearest = c;
      }
    });
    return nearest;
  };
  const bandPaths: string[] = [];
  for (let band = 0; band < nSceneBands; band++) {
    const rawPath = join(folder, `band-${band + 1}.raw`);
    const path = join(folder, `band-${band + 1}.tif`);
    await writeRows(rawPath, width, height, (column, row) => valueAt(band, column, row));
    await writeGeoTiffFromRaw({ rawPath, dtype: 'uint16', grid, wkt: 'EPSG:32628', nodata: null }, path, {
      overviews: 'none',
    });
    await rm(rawPath);
    bandPaths.push(path);
  }
  return { grid, bandPaths, source: base.source, valueAt, classAt };
}

/** Rows drawn at random from a scene, with their classes. */
export function drawSceneRows(scene: FullScene, nRows: number, seed: number): TrainingSet {
  const rng = createRng(seed);
  const features = new Float32Array(nRows * nSceneBands);
  const labels = new Uint8Array(nRows);
  for (let i = 0; i < nRows; i++) {
    const [column, row] = [rng.nextBelow(scene.grid.width), rng.nextBelow(scene.grid.height)];
    for (let b = 0; b < nSceneBands; b++) features[i * nSceneBands + b] = scene.valueAt(b, column, row);
    labels[i] = scene.classAt(column, row);
  }
  return { features, labels, nRows, nFeatures: nSceneBands, nClasses: nSceneClasses };
}

/** 0..1, random-looking and the same everywhere. */
function hash(a: number, b: number, c: number): number {
  let h = Math.imul(a + 1, 374761393) ^ Math.imul(b + 1, 668265263) ^ Math.imul(c + 1, 2246822519);
  h = Math.imul(h ^ (h >>> 13), 1274126177);
  h = Math.imul(h ^ (h >>> 16), 2246822507);
  return ((h ^ (h >>> 15)) >>> 0) / 4294967296;
}

async function writeRows(
  path: string,
  width: number,
  height: number,
  valueOf: (column: number, row: number) => number,
): Promise<void> {
  const out = createWriteStream(path);
  for (let row = 0; row < height; row++) {
    const values = new Uint16Array(width);
    for (let column = 0; column < width; column++) values[column] = valueOf(column, row);
    if (!out.write(new Uint8Array(values.buffer))) await once(out, 'drain');
  }
  out.end();
  await finished(out);
}
