import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { BandStore } from '../../server/raster/band-store.ts';
import { computeBandStatistics } from '../../server/raster/band-statistics.ts';
import { getIntegerRange, createBandArray, type BandDtype } from '../../server/raster/band-dtype.ts';
import { hashFile } from '../../server/raster/hash-file.ts';
import { ingestBands, type IngestOptions } from '../../server/raster/ingest-bands.ts';
import { inspectSource } from '../../server/raster/inspect-source.ts';
import { SourceRefusal } from '../../server/raster/source-refusal.ts';
import { createRandom } from '../bench/synthetic-band.ts';
import {
  fillBand,
  makeGrid,
  makeRaster,
  readWithGdal,
  runTool,
  useTempFolder,
  type RasterSpec,
} from './make-raster.ts';

const folder = useTempFolder();
let count = 0;

async function ingest(spec: Partial<RasterSpec> & Pick<RasterSpec, 'bands' | 'dtype'>, options: IngestOptions = {}) {
  const grid = spec.grid ?? makeGrid();
  const number = count++;
  const extension = spec.format === 'JP2OpenJPEG' ? 'jp2' : 'tif';
  const path = makeRaster(join(folder, `source-${number}.${extension}`), {
    width: grid.width,
    height: grid.height,
    grid,
    srs: 'EPSG:32628',
    ...spec,
  });
  const outDir = join(folder, `scene-${number}`);
  const bands = await ingestBands(path, await inspectSource(path), outDir, options);
  return { bands, outDir, path, pathOf: (index: number) => join(outDir, bands[index].fileName) };
}

describe('ingestBands', () => {
  it('keeps every sample type, value for value', async () => {
    const types: BandDtype[] = ['int8', 'uint8', 'int16', 'uint16', 'int32', 'uint32', 'float32', 'float64'];
    for (const dtype of types) {
      const random = createRandom(3);
      const [low, high] = getIntegerRange(dtype) ?? [-1e6, 1e6];
      const values = fillBand(createBandArray(dtype, 2400), 60, () => low + random() * (high - low));
      [values[0], values[1]] = [low, high];
      const args = dtype === 'int8' ? ['-co', 'PIXELTYPE=SIGNEDBYTE'] : [];
      const { bands, pathOf } = await ingest({ bands: [values], dtype, args });
      expect(bands[0]).toMatchObject({ dtype, fileName: 'band-01.tif', nodata: null });
      expect(bands[0].statistics).toMatchObject({ min: values[0], max: values[1], nValid: 2400 });
      const store = new BandStore();
      const band = await store.open(pathOf(0));
      expect(band.grid).toEqual(makeGrid());
      expect(await band.readWindow(0, 0, 0, 60, 40)).toEqual(values);
      await store.close();
      expect(readWithGdal(pathOf(0), dtype)).toEqual(values);
    }
  });

  it('writes 256-pixel blocks with overviews down to one block, one file a band, and its digest', async () => {
    const grid = makeGrid({ width: 700, height: 520 });
    const values = fillBand(new Uint16Array(700 * 520), 700, (col, row) => col + row);
    const { bands, outDir, pathOf } = await ingest(
      { bands: [values, values, values], dtype: 'uint16', grid },
      { bands: [3, 1] },
    );
    expect(bands.map((band) => [band.fileName, band.sourceIndex])).toEqual([
      ['band-01.tif', 3],
      ['band-02.tif', 1],
    ]);
    expect(readdirSync(outDir).sort()).toEqual(['band-01.tif', 'band-02.tif']);
    const info = JSON.parse(runTool('gdalinfo', ['-json', pathOf(0)]));
    expect(info.bands).toHaveLength(1);
    expect(info.bands[0].block).toEqual([256, 256]);
    expect(info.bands[0].overviews.map((overview: { size: number[] }) => overview.size)).toEqual([
      [350, 260],
      [175, 130],
    ]);
    expect(info.stac['proj:epsg']).toBe(32628);
    const store = new BandStore();
    const band = await store.open(pathOf(0));
    expect(band.levels.map((level) => level.blockWidth)).toEqual([256, 256, 256]);
    // Average of col + row over a 2 × 2 square: the square's corner plus 1.
    expect(Array.from(await band.readWindow(1, 100, 100, 2, 1))).toEqual([401, 403]);
    await store.close();
    expect(bands[0].sha256).toBe(await hashFile(pathOf(0)));
    expect(bands[0].sha256).toBe(runTool('sha256sum', [pathOf(0)]).slice(0, 64));
  });

  it('gives the same digest for the same source', async () => {
    const spec = { bands: [fillBand(new Uint16Array(2400), 60, (col) => col * 7)], dtype: 'uint16' as const };
    const [first, second] = [await ingest(spec), await ingest(spec)];
    expect(first.bands[0].sha256).toBe(second.bands[0].sha256);
  });

  it('leaves nodata out of statistics and overviews', async () => {
    const grid = makeGrid({ width: 300, height: 300 });
    const values = fillBand(new Int16Array(90000), 300, (col, row) => (col < 3 && row < 3 ? -9999 : 10));
    values[299] = 30;
    const { bands, pathOf } = await ingest({ bands: [values], dtype: 'int16', grid, nodata: '-9999' });
    expect(bands[0].nodata).toBe(-9999);
    expect(bands[0].statistics).toMatchObject({ nValid: 89991, min: 10, max: 30, p2: 10, p98: 10 });
    const store = new BandStore();
    const band = await store.open(pathOf(0));
    expect(Array.from(await band.readWindow(1, 0, 0, 3, 1))).toEqual([-9999, 10, 10]);
    await store.close();
  });

  it('recognises a nodata value that 32-bit floating point only comes near', async () => {
    const values = fillBand(new Float32Array(2400), 60, (col) => (col === 0 ? -9999.9 : col));
    const { bands, pathOf } = await ingest({ bands: [values], dtype: 'float32', nodata: '-9999.9' });
    expect(bands[0].nodata).toBe(Math.fround(-9999.9));
    expect(bands[0].statistics).toMatchObject({ nValid: 2360, min: 1 });
    expect(readWithGdal(pathOf(0), 'float32')[0]).toBe(Math.fround(-9999.9));
  });

  it('treats NaN as nodata, declared or not', async () => {
    const values = fillBand(new Float32Array(2400), 60, (col) => (col === 0 ? NaN : col));
    for (const nodata of [undefined, 'nan']) {
      const { bands } = await ingest({ bands: [values], dtype: 'float32', nodata });
      expect(bands[0].statistics).toMatchObject({ nValid: 2360, min: 1, max: 59, mean: 30 });
    }
  });

  it('turns an alpha band into a nodata value that no valid pixel has', async () => {
    const image = fillBand(new Uint8Array(2400), 60, (col, row) => (row === 0 ? 0 : 1 + (col % 250)));
    const alpha = fillBand(new Uint8Array(2400), 60, (col) => (col < 10 ? 0 : 255));
    const { bands, pathOf } = await ingest({ bands: [image, alpha], dtype: 'uint8', colorInterp: ['Gray', 'Alpha'] });
    // 0 is in use by valid pixels, so the type's largest value is next.
    expect(bands).toHaveLength(1);
    expect(bands[0]).toMatchObject({ dtype: 'uint8', nodata: 255 });
    expect(bands[0].statistics?.nValid).toBe(2000);
    const stored = readWithGdal(pathOf(0), 'uint8');
    expect(stored[9]).toBe(255);
    expect(stored[10]).toBe(0);
  });

  it('widens a masked 8-bit band that uses every value', async () => {
    const image = fillBand(new Uint8Array(2400), 60, (col, row) => (row * 60 + col) % 256);
    const alpha = fillBand(new Uint8Array(2400), 60, (_col, row) => (row < 30 ? 255 : 0));
    const { bands, pathOf } = await ingest({ bands: [image, alpha], dtype: 'uint8', colorInterp: ['Gray', 'Alpha'] });
    expect(bands[0]).toMatchObject({ dtype: 'uint16', nodata: 65535 });
    expect(bands[0].statistics).toMatchObject({ nValid: 1800, min: 0, max: 255 });
    expect(readWithGdal(pathOf(0), 'uint16')[2399]).toBe(65535);
  });

  it('turns a mask inside the file into nodata, NaN for floating point', async () => {
    const image = fillBand(new Float32Array(2400), 60, (col) => col / 8);
    const mask = fillBand(new Float32Array(2400), 60, (col) => (col === 59 ? 0 : 1));
    const { bands } = await ingest({
      bands: [image, mask],
      dtype: 'float32',
      args: ['-b', '1', '-mask', '2', '--config', 'GDAL_TIFF_INTERNAL_MASK', 'YES'],
    });
    expect(bands[0].nodata).toBeNaN();
    expect(bands[0].statistics).toMatchObject({ nValid: 2360, max: 58 / 8 });
  });

  it('refuses a source without a pixel of data, and leaves no file', async () => {
    const empty = new Uint16Array(2400).fill(9);
    const run = ingest({ bands: [empty, empty], dtype: 'uint16', nodata: '9' });
    await expect(run).rejects.toMatchObject({ code: 'all-nodata' });
    await expect(run).rejects.toBeInstanceOf(SourceRefusal);
    expect(readdirSync(join(folder, `scene-${count - 1}`))).toEqual([]);
    const half = await ingest({ bands: [empty, new Uint16Array(2400).fill(8)], dtype: 'uint16', nodata: '9' });
    expect(half.bands.map((band) => band.statistics?.nValid ?? null)).toEqual([null, 2400]);
  });

  it('refuses a file that was cut off, and leaves no file', async () => {
    const grid = makeGrid({ width: 300, height: 300 });
    const random = createRandom(5);
    const values = fillBand(new Uint16Array(90000), 300, () => random() * 60000);
    const { path, outDir } = await ingest({
      bands: [values],
      dtype: 'uint16',
      grid,
      args: ['-co', 'COMPRESS=DEFLATE'],
    });
    const whole = readFileSync(path);
    const cutPath = join(folder, 'cut-off.tif');
    writeFileSync(cutPath, whole.subarray(0, whole.length * 0.6));
    const run = ingestBands(cutPath, await inspectSource(cutPath), join(outDir, 'cut'));
    await expect(run).rejects.toMatchObject({ name: 'SourceRefusal', code: 'unreadable' });
    expect(readdirSync(join(outDir, 'cut'))).toEqual([]);
  });

  it('reports rising progress to 1, and stops when aborted', async () => {
    const fractions: number[] = [];
    const values = new Uint16Array(2400).fill(3);
    await ingest({ bands: [values, values], dtype: 'uint16' }, { onProgress: (fraction) => fractions.push(fraction) });
    expect(fractions.at(-1)).toBeCloseTo(1, 10);
    expect(fractions).toEqual([...fractions].sort((a, b) => a - b));
    const controller = new AbortController();
    const onProgress = (fraction: number): void => {
      if (fraction > 0.5) controller.abort();
    };
    const run = ingest({ bands: [values, values], dtype: 'uint16' }, { signal: controller.signal, onProgress });
    await expect(run).rejects.toThrow();
    expect(readdirSync(join(folder, `scene-${count - 1}`))).toEqual([]);
  });

  it('ignores sidecar masks, overviews and statistics beside the upload', async () => {
    const values = new Uint16Array(2400).fill(3);
    const { path, outDir } = await ingest({ bands: [values], dtype: 'uint16' });
    const maskArgs = ['-of', 'GTiff', '-ot', 'Byte', '-scale', '0', '9', '0', '0', '-mo', 'INTERNAL_MASK_FLAGS_1=2'];
    runTool('gdal_translate', ['-q', ...maskArgs, path, `${path}.msk`]);
    // GDAL left to itself would follow it.
    expect(runTool('gdalinfo', [path])).toContain('PER_DATASET');
    const again = await ingestBands(path, await inspectSource(path), join(outDir, 'again'));
    expect(again[0].statistics?.nValid).toBe(2400);
  });

  it('ingests a JPEG 2000 image', async () => {
    const values = fillBand(new Uint16Array(2400), 60, (col, row) => 100 + col * row);
    const args = ['-co', 'REVERSIBLE=YES', '-co', 'QUALITY=100', '-co', 'YCBCR420=NO'];
    const { pathOf } = await ingest({ bands: [values], dtype: 'uint16', format: 'JP2OpenJPEG', args });
    expect(readWithGdal(pathOf(0), 'uint16')).toEqual(values);
  });
});

describe('computeBandStatistics', () => {
  async function statisticsOf(values: Float32Array | Int32Array | Uint16Array, dtype: BandDtype) {
    const { pathOf } = await ingest({ bands: [values], dtype });
    const store = new BandStore();
    const statistics = await computeBandStatistics(await store.open(pathOf(0)));
    await store.close();
    return statistics!;
  }

  it('agrees with sorting and with two-pass moments for integers and floating point', async () => {
    for (const dtype of ['uint16', 'int32', 'float32'] as const) {
      const random = createRandom(11);
      // A few huge values: bins over the whole range alone would put both percentiles into one bin.
      const values = fillBand(createBandArray(dtype, 2400), 60, (col, row) =>
        row === 0 && col < 4 && dtype !== 'uint16' ? 2e9 : 900 + random() * 100,
      ) as Float32Array | Int32Array | Uint16Array;
      const statistics = await statisticsOf(values, dtype);
      const sorted = Array.from(values).sort((a, b) => a - b);
      const mean = sorted.reduce((sum, value) => sum + value, 0) / 2400;
      const variance = sorted.reduce((sum, value) => sum + (value - mean) ** 2, 0) / 2400;
      expect(statistics.mean / mean).toBeCloseTo(1, 12);
      expect(statistics.sd / Math.sqrt(variance)).toBeCloseTo(1, 10);
      // By the definition in the doc comment: rank ⌈p·n⌉ of the sorted values.
      expect(statistics.p2).toBe(sorted[Math.ceil(0.02 * 2400) - 1]);
      expect(statistics.p98).toBe(sorted[Math.ceil(0.98 * 2400) - 1]);
      expect(statistics.histogram.counts.reduce((sum, n) => sum + n, 0)).toBe(2400);
    }
  });

  it('gives integers that span few values one bin each', async () => {
    const { histogram } = await statisticsOf(
      fillBand(new Uint16Array(2400), 60, (col) => 7 + (col % 3)),
      'uint16',
    );
    expect(histogram).toEqual({ low: 6.5, high: 9.5, counts: [800, 800, 800] });
  });
});
