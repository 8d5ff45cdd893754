import { existsSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { mkdtempSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { BandStore } from '../../server/raster/band-store.ts';
import { writeClassMapFile, type ClassMapRequest } from '../../server/raster/class-map-file.ts';
import { inspectSource } from '../../server/raster/inspect-source.ts';
import { fillBand, makeGrid, makeRaster, readWithGdal, runTool, useTempFolder } from './make-raster.ts';

const folder = useTempFolder();
const grid = makeGrid({ width: 620, height: 540 });
const codes = fillBand(new Uint8Array(620 * 540), 620, (col, row) => (col < 5 ? 255 : 1 + ((col + row) % 3)));

async function makeRequest(overrides: Partial<ClassMapRequest> = {}): Promise<ClassMapRequest> {
  const source = makeRaster(join(folder, 'source.tif'), {
    bands: [new Uint8Array(620 * 540)],
    dtype: 'uint8',
    width: 620,
    height: 540,
    grid,
    srs: 'EPSG:32628',
  });
  const { crs } = await inspectSource(source);
  const stripPaths = [0, 256, 512].map((row) => {
    const path = join(folder, `strip-${row}.raw`);
    writeFileSync(path, codes.subarray(row * 620, Math.min(540, row + 256) * 620));
    return path;
  });
  return {
    stripPaths,
    grid,
    wkt: crs.wkt,
    classes: [
      { code: 1, name: 'Open water', color: [30, 80, 160] },
      { code: 2, name: 'Heath & <moor>', color: [150, 90, 140] },
      { code: 3, name: 'Salt"marsh', color: [120, 150, 90] },
    ],
    title: 'Class map, spring',
    metadata: { RUN_DIGEST: 'abc123' },
    ...overrides,
  };
}

function freshPath(): string {
  return join(mkdtempSync(join(folder, 'out-')), 'class-map.tif');
}

describe('writeClassMapFile', () => {
  it('writes what gdalinfo reads back: CRS, transform, nodata, colours, names, blocks and overviews', async () => {
    const outPath = freshPath();
    const written = await writeClassMapFile(await makeRequest(), outPath);
    const info = JSON.parse(runTool('gdalinfo', ['-json', outPath]));
    expect(info.stac['proj:epsg']).toBe(32628);
    expect(info.geoTransform).toEqual([500000, 30, 0, 5000000, 0, -30]);
    expect(info.size).toEqual([620, 540]);
    expect(info.metadata['']).toMatchObject({ RUN_DIGEST: 'abc123', TIFFTAG_IMAGEDESCRIPTION: 'Class map, spring' });
    const [band] = info.bands;
    expect(band).toMatchObject({ type: 'Byte', block: [256, 256], noDataValue: 255, colorInterpretation: 'Palette' });
    expect(band.metadata['']).toMatchObject({
      CLASS_1: 'Open water',
      CLASS_2: 'Heath & <moor>',
      CLASS_3: 'Salt"marsh',
    });
    expect(band.overviews.map((overview: { size: number[] }) => overview.size)).toEqual([
      [310, 270],
      [155, 135],
    ]);
    expect(band.colorTable.entries.slice(1, 4)).toEqual([
      [30, 80, 160, 255],
      [150, 90, 140, 255],
      [120, 150, 90, 255],
    ]);
    // GDAL picks the categories up from the sidecar.
    expect(runTool('gdalinfo', [outPath])).toMatch(
      /Categories:[\s\S]*1: Open water\s+2: Heath & <moor>\s+3: Salt"marsh/,
    );
    expect(written.auxPath).toBe(`${outPath}.aux.xml`);
    expect(readWithGdal(outPath, 'uint8')).toEqual(codes);
    expect(written.bytes).toBe(readFileSync(outPath).length);
    expect(written.sha256).toBe(runTool('sha256sum', [outPath]).slice(0, 64));
  });

  it('keeps names inside the TIFF, without the sidecar', async () => {
    const outPath = freshPath();
    await writeClassMapFile(await makeRequest(), outPath);
    const moved = join(folder, 'moved.tif');
    writeFileSync(moved, readFileSync(outPath));
    expect(JSON.parse(runTool('gdalinfo', ['-json', moved])).bands[0].metadata[''].CLASS_1).toBe('Open water');
  });

  it('takes nearest pixels into overviews, so that no class appears that was not there', async () => {
    const outPath = freshPath();
    await writeClassMapFile(await makeRequest(), outPath);
    const store = new BandStore();
    const band = await store.open(outPath);
    expect(band.nodata).toBe(255);
    const { width, height } = band.levels[1];
    const coarse = await band.readWindow(1, 0, 0, width, height);
    expect([...new Set(coarse)].sort((a, b) => a - b)).toEqual([1, 2, 3, 255]);
    await store.close();
  });

  it('gives the same bytes for the same strips and classes, and other bytes for others', async () => {
    const [first, second] = [freshPath(), freshPath()];
    const a = await writeClassMapFile(await makeRequest(), first);
    const b = await writeClassMapFile(await makeRequest(), second);
    expect(a.sha256).toBe(b.sha256);
    expect(readFileSync(a.auxPath)).toEqual(readFileSync(b.auxPath));
    const request = await makeRequest();
    const c = await writeClassMapFile({ ...request, classes: request.classes.slice(0, 2) }, freshPath());
    expect(c.sha256).not.toBe(a.sha256);
  });

  it('writes in degrees as well', async () => {
    const degrees = makeGrid({
      width: 620,
      height: 540,
      originX: 8,
      originY: 47,
      pixelWidth: 0.001,
      pixelHeight: 0.001,
    });
    const wkt = runTool('gdalsrsinfo', ['-o', 'wkt2', 'EPSG:4326']).trim();
    const outPath = freshPath();
    await writeClassMapFile({ ...(await makeRequest()), grid: degrees, wkt }, outPath);
    expect((await inspectSource(outPath)).bounds).toMatchObject({ west: 8, north: 47 });
  });

  it('refuses strips that do not make up the grid and impossible classes, leaving nothing behind', async () => {
    const request = await makeRequest();
    const outPath = freshPath();
    const run = (overrides: Partial<ClassMapRequest>) => writeClassMapFile({ ...request, ...overrides }, outPath);
    await expect(run({ stripPaths: request.stripPaths.slice(1) })).rejects.toThrow(/284 rows of 620, wanted 540/);
    await expect(run({ grid: { ...grid, width: 619 } })).rejects.toThrow(/not whole rows/);
    const [first] = request.classes;
    await expect(run({ classes: [first, first] })).rejects.toThrow(/two classes/);
    await expect(run({ classes: [{ ...first, code: 255 }] })).rejects.toThrow(/0 to 254/);
    const controller = new AbortController();
    controller.abort();
    await expect(writeClassMapFile(request, outPath, { signal: controller.signal })).rejects.toThrow();
    expect(existsSync(outPath)).toBe(false);
    expect(readdirSync(join(outPath, '..'))).toEqual([]);
  });
});
