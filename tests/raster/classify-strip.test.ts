import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { BandFile } from '../../server/raster/band-file.ts';
import { BandStore } from '../../server/raster/band-store.ts';
import { classifyStrip } from '../../server/raster/classify-strip.ts';
import { ingestBands } from '../../server/raster/ingest-bands.ts';
import { inspectSource } from '../../server/raster/inspect-source.ts';
import { hasPixelWithData, readPixelFeatures } from '../../server/raster/pixel-features.ts';
import type { RasterGrid } from '../../server/raster/raster-grid.ts';
import { makeRaster } from '../factories/make-raster.ts';

/** Wider than one window of the strip, higher than one row of blocks, and of neither's multiple. */
const WIDTH = 2100;
const HEIGHT = 300;
/** Band 0 has no data in every 11th pixel, band 1 in every 7th row. */
const value = (band: number, column: number, row: number): number => {
  if (band === 0 && (column + row) % 11 === 0) return 0;
  if (band === 1 && row % 7 === 0) return 0;
  return 1 + ((column * 3 + row * 5 + band * 17) % 60_000);
};
const hasData = (column: number, row: number) => value(0, column, row) !== 0 && value(1, column, row) !== 0;

const store = new BandStore();
let dir: string;
let bands: BandFile[];
let grid: RasterGrid;

beforeAll(async () => {
  dir = await mkdtemp(join(tmpdir(), 'groundsel-strip-'));
  const source = join(dir, 'source.tif');
  await makeRaster(source, { width: WIDTH, height: HEIGHT, bandNames: ['A', 'B'], value });
  const written = await ingestBands(source, await inspectSource(source), join(dir, 'bands'));
  bands = await Promise.all(written.map(({ fileName }) => store.open(join(dir, 'bands', fileName))));
  grid = bands[0]!.grid;
});

afterAll(async () => {
  await store.close();
  await rm(dir, { recursive: true, force: true });
});

describe('mapping a strip', () => {
  // Distinguishes the bands and their order, so that a swapped or shifted value shows.
  const rule = (a: number, b: number) => (a + 2 * b) % 3;
  const codes = [5, 90, 254];
  const classify = (features: Float32Array, n: number, classIndex: Uint8Array) => {
    for (let i = 0; i < n; i++) classIndex[i] = rule(features[2 * i]!, features[2 * i + 1]!);
  };

  it.each([
    [0, 256],
    [256, 44],
    [100, 32],
  ])('gives every pixel of rows %i on its class, and nodata where any band has none', async (y, height) => {
    const strip = await classifyStrip({ grid, bands, y, height, classify, codes, nodataCode: 255 });
    const expected = Uint8Array.from({ length: WIDTH * height }, (_, i) => {
      const column = i % WIDTH;
      const row = y + Math.floor(i / WIDTH);
      return hasData(column, row) ? codes[rule(value(0, column, row), value(1, column, row))]! : 255;
    });
    expect(Buffer.compare(strip, expected)).toBe(0);
  });

  it('leaves pixels unclassified whose share is below the limit, not those at it', async () => {
    const shares = [0.25, 0.7, 0.95];
    const withShares = (features: Float32Array, n: number, classIndex: Uint8Array, share?: Float32Array) => {
      classify(features, n, classIndex);
      for (let i = 0; i < n; i++) share![i] = shares[classIndex[i]!]!;
    };
    const request = { grid, bands, y: 256, height: 44, classify: withShares, codes, nodataCode: 255 };
    const plain = await classifyStrip({ ...request, classify });
    const limited = await classifyStrip({ ...request, unclassified: { below: 0.7, code: 0 } });
    expect(limited).toEqual(plain.map((code) => (code === 5 ? 0 : code)));
    const strict = await classifyStrip({ ...request, unclassified: { below: 0.71, code: 0 } });
    expect(strict).toEqual(plain.map((code) => (code === 5 || code === 90 ? 0 : code)));
  });

  it('leaves out what is outside the mask', async () => {
    const inside = Uint8Array.from({ length: WIDTH * 10 }, (_, i) => (i % 3 === 0 ? 1 : 0));
    const strip = await classifyStrip({ grid, bands, y: 20, height: 10, classify, codes, nodataCode: 255, inside });
    for (let i = 0; i < strip.length; i++) if (!inside[i] && strip[i] !== 255) throw new Error(`pixel ${i} is mapped`);
    expect(strip.some((code) => code !== 255)).toBe(true);
  });
});

describe('reading single pixels', () => {
  it('gives their stored values band by band, across blocks, and says where data is missing', async () => {
    const pixels = Uint32Array.from({ length: 4000 }, (_, i) => i * 157).filter((pixel) => pixel < WIDTH * HEIGHT);
    const features = new Float32Array(pixels.length * 2);
    let nRead = 0;
    const isValid = await readPixelFeatures(grid, bands, pixels, { features, onRead: (n) => (nRead = n) });
    expect(nRead).toBe(pixels.length);
    pixels.forEach((pixel, i) => {
      const [column, row] = [pixel % WIDTH, Math.floor(pixel / WIDTH)];
      expect(isValid[i]).toBe(hasData(column, row) ? 1 : 0);
      if (isValid[i])
        expect([features[2 * i], features[2 * i + 1]]).toEqual([value(0, column, row), value(1, column, row)]);
    });
    expect(isValid.includes(0) && isValid.includes(1)).toBe(true);
  });

  it('finds whether any of them has data', async () => {
    const blankRow = Uint32Array.from({ length: WIDTH }, (_, column) => 7 * WIDTH + column);
    expect(await hasPixelWithData(grid, bands, blankRow)).toBe(false);
    expect(await hasPixelWithData(grid, bands, Uint32Array.from([...blankRow, 8 * WIDTH + 1]))).toBe(true);
    expect(await hasPixelWithData(grid, bands, new Uint32Array())).toBe(false);
  });

  it('refuses features of another length', async () => {
    const features = new Float32Array(3);
    await expect(readPixelFeatures(grid, bands, Uint32Array.of(1, 2), { features })).rejects.toThrow(RangeError);
  });
});
