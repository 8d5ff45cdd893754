import { join } from 'node:path';
import { copyFileSync, readdirSync } from 'node:fs';
import { afterAll, describe, expect, it } from 'vitest';
import { BandStore } from '../../server/raster/band-store.ts';
import { BlockCache } from '../../server/raster/block-cache.ts';
import { ingestBands } from '../../server/raster/ingest-bands.ts';
import { inspectSource } from '../../server/raster/inspect-source.ts';
import { readSceneStrips, readSceneWindow } from '../../server/raster/scene-reader.ts';
import type { RasterGrid } from '../../server/raster/raster-grid.ts';
import { fillBand, makeGrid, makeRaster, useTempFolder } from './make-raster.ts';

const folder = useTempFolder();
const store = new BandStore({ cacheMb: 8 });
afterAll(() => store.close());
const sceneGrid = makeGrid({ width: 601, height: 530 });
const sceneValues = fillBand(new Uint16Array(601 * 530), 601, (col, row) => col * 100 + (row % 100));
// Three scene pixels a side; 201 × 3 = 603 and 176 × 3 = 528: a little beyond in the east, a little short in the south.
const coarseGrid = makeGrid({ width: 201, height: 176, pixelWidth: 90, pixelHeight: 90 });
const coarseValues = fillBand(new Int16Array(201 * 176), 201, (col, row) => col * 150 + row);

async function makeBand(
  name: string,
  grid: RasterGrid,
  bands: (Uint16Array | Int16Array)[],
  nodata?: string,
): Promise<string> {
  const dtype = bands[0] instanceof Int16Array ? 'int16' : 'uint16';
  const { width, height } = grid;
  const path = makeRaster(join(folder, `${name}.tif`), {
    bands,
    dtype,
    width,
    height,
    grid,
    srs: 'EPSG:32628',
    nodata,
  });
  const outDir = join(folder, name);
  await ingestBands(path, await inspectSource(path), outDir);
  return join(outDir, 'band-01.tif');
}
const fine = await makeBand('fine', sceneGrid, [sceneValues]);
const coarse = await makeBand('coarse', coarseGrid, [coarseValues], '-1');

function countOpenFiles(): number {
  return readdirSync('/proc/self/fd').length;
}

describe('BandFile', () => {
  it('reads any window, across block edges and up to the last pixel', async () => {
    const band = await store.open(fine);
    for (const [x, y, width, height] of [
      [0, 0, 601, 530],
      [250, 250, 20, 20],
      [600, 529, 1, 1],
      [255, 0, 2, 530],
    ]) {
      const window = await band.readWindow(0, x, y, width, height);
      const expected = fillBand(
        new Uint16Array(width * height),
        width,
        (col, row) => sceneValues[(y + row) * 601 + x + col],
      );
      expect(window).toEqual(expected);
    }
  });

  it('refuses a window that leaves the level', async () => {
    const band = await store.open(fine);
    await expect(band.readWindow(0, 600, 0, 2, 1)).rejects.toThrow(RangeError);
    await expect(band.readWindow(1, 0, 0, 302, 1)).rejects.toThrow(/301 × 265/);
  });

  it('chooses the coarsest level that loses no detail', async () => {
    const band = await store.open(fine);
    expect(band.levels.map((level) => level.width)).toEqual([601, 301, 151]);
    expect([0.1, 1, 1.8, 2, 3.5, 4, 50].map((scale) => band.chooseLevel(scale))).toEqual([0, 0, 0, 1, 1, 2, 2]);
  });
});

describe('BandStore', () => {
  it('keeps no more files open than allowed, and still reads them all', async () => {
    const before = countOpenFiles();
    const tight = new BandStore({ cacheMb: 0, maxOpenFiles: 2 });
    const grid = makeGrid();
    const paths: string[] = [];
    for (let i = 0; i < 5; i++) paths.push(await makeBand(`many-${i}`, grid, [new Uint16Array(2400).fill(i)]));
    const bands = await Promise.all(paths.map((path) => tight.open(path)));
    for (let round = 0; round < 3; round++) {
      const values = await Promise.all(bands.map((band) => band.readWindow(0, 5, 5, 1, 1)));
      expect(values.map(([value]) => value)).toEqual([0, 1, 2, 3, 4]);
    }
    await new Promise((resolve) => setTimeout(resolve, 50));
    expect(countOpenFiles() - before).toBeLessThanOrEqual(2);
    await tight.close();
    expect(countOpenFiles()).toBe(before);
  });

  it('never mixes a replaced file with what it knew of the old one', async () => {
    const tight = new BandStore({ cacheMb: 4, maxOpenFiles: 1 });
    const [old, replacement, other] = [
      await makeBand('old', makeGrid(), [new Uint16Array(2400).fill(1)]),
      await makeBand('replacement', makeGrid({ width: 50, height: 48 }), [new Uint16Array(2400).fill(2)]),
      await makeBand('other', makeGrid(), [new Uint16Array(2400).fill(3)]),
    ];
    const held = await tight.open(old);
    copyFileSync(replacement, old);
    await tight.open(other);
    await expect(held.readWindow(0, 0, 0, 60, 1)).rejects.toThrow(/changed/);
    const fresh = await tight.open(old);
    expect(fresh.grid.width).toBe(50);
    expect((await fresh.readWindow(0, 0, 0, 1, 1))[0]).toBe(2);
    await tight.close();
  });

  it('says so when a file is missing or is no band file', async () => {
    await expect(store.open(join(folder, 'absent.tif'))).rejects.toThrow(/ENOENT/);
    await expect(store.open(join(folder, 'fine.tif'))).rejects.toThrow(/not a band file/);
  });
});

describe('BlockCache', () => {
  it('drops the block used longest ago, by bytes', () => {
    const cache = new BlockCache(100);
    cache.set('a', new Uint8Array(40));
    cache.set('b', new Uint8Array(40));
    expect(cache.get('a')).toBeDefined();
    cache.set('c', new Uint8Array(40));
    expect(cache.get('b')).toBeUndefined();
    expect(cache.get('a')).toBeDefined();
    expect(cache.bytes).toBe(80);
    cache.set('a', new Uint8Array(10));
    expect(cache.bytes).toBe(50);
    cache.set('huge', new Uint8Array(101));
    expect(cache.get('huge')).toBeUndefined();
    expect(cache.bytes).toBe(50);
  });
});

describe('readSceneWindow', () => {
  it('gives a coarser band on the scene grid by nearest centre', async () => {
    const band = await store.open(coarse);
    const window = await readSceneWindow(sceneGrid, band, 297, 100, 8, 2);
    // Scene column 297 has its centre at 297.5 / 3 = 99.17 coarse pixels, so in column 99.
    const expected = [99, 99, 99, 100, 100, 100, 101, 101].map((col) => col * 150 + 33);
    expect(Array.from(window)).toEqual([...expected, ...expected]);
  });

  it('takes a fringe of less than a coarse pixel from the edge', async () => {
    const band = await store.open(coarse);
    const lastRows = await readSceneWindow(sceneGrid, band, 0, 526, 1, 4);
    // Rows 528 and 529 lie below the coarse band's 176 rows.
    expect(Array.from(lastRows)).toEqual([175, 175, 175, 175]);
  });

  it('gives nodata beyond the band, and refuses where there is none to give', async () => {
    const wide = makeGrid({ ...sceneGrid, originX: sceneGrid.originX - 900, width: 631 });
    const window = await readSceneWindow(wide, await store.open(coarse), 0, 0, 40, 1);
    expect(Array.from(window.subarray(24, 31))).toEqual([-1, -1, -1, 0, 0, 0, 0]);
    await expect(readSceneWindow(wide, await store.open(fine), 0, 0, 40, 1)).rejects.toThrow(/no nodata value/);
  });

  it('refuses a window outside the scene', async () => {
    await expect(readSceneWindow(sceneGrid, await store.open(fine), 0, 500, 10, 31)).rejects.toThrow(RangeError);
  });
});

describe('readSceneStrips', () => {
  it('covers every row once, in order, all bands on the scene grid', async () => {
    const bands = [await store.open(fine), await store.open(coarse)];
    const rebuilt = new Uint16Array(sceneValues.length);
    const starts: number[] = [];
    for await (const strip of readSceneStrips(sceneGrid, bands)) {
      starts.push(strip.y);
      rebuilt.set(strip.bands[0], strip.y * 601);
      expect(strip.bands[1]).toHaveLength(strip.height * 601);
      expect(strip.bands[1][300]).toBe(100 * 150 + Math.min(175, Math.floor(strip.y / 3)));
    }
    expect(starts).toEqual([0, 256, 512]);
    expect(rebuilt).toEqual(sceneValues);
  });

  it('starts anywhere, realigns with the blocks, and heeds the signal', async () => {
    const bands = [await store.open(fine)];
    const starts: number[] = [];
    for await (const strip of readSceneStrips(sceneGrid, bands, { fromRow: 100, toRow: 520 })) starts.push(strip.y);
    expect(starts).toEqual([100, 256, 512]);
    const controller = new AbortController();
    const read = async (): Promise<void> => {
      for await (const strip of readSceneStrips(sceneGrid, bands, { signal: controller.signal })) {
        if (strip.y === 256) controller.abort();
      }
    };
    await expect(read()).rejects.toThrow(/abort/i);
  });
});
