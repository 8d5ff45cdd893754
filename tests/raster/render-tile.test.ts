import { existsSync } from 'node:fs';
import { join } from 'node:path';
import sharp from 'sharp';
import { afterAll, describe, expect, it } from 'vitest';
import { BandStore } from '../../server/raster/band-store.ts';
import { ingestBands } from '../../server/raster/ingest-bands.ts';
import { inspectSource, type SourceInfo } from '../../server/raster/inspect-source.ts';
import type { RasterGrid } from '../../server/raster/raster-grid.ts';
import { renderTile, renderTilePixels } from '../../server/raster/render-tile.ts';
import { sampleBand } from '../../server/raster/sample-band.ts';
import { getMercatorLat, getMercatorLon, getSceneGeometry } from '../../server/raster/tile-geometry.ts';
import type { TileRequest } from '../../server/raster/tile-request.ts';
import { buildWarpGrid } from '../../server/raster/warp-grid.ts';
import { fillBand, makeGrid, makeRaster, middleTile, readWithGdal, runTool, useTempFolder } from './make-raster.ts';

const folder = useTempFolder();
const store = new BandStore({ cacheMb: 16 });
afterAll(() => store.close());
let count = 0;

interface Scene {
  info: SourceInfo;
  grid: RasterGrid;
  paths: string[];
}

async function makeScene(
  bands: (Uint8Array | Uint16Array | Float32Array)[],
  srs: string,
  grid: RasterGrid,
  nodata?: string,
): Promise<Scene> {
  const dtype = bands[0] instanceof Uint8Array ? 'uint8' : bands[0] instanceof Uint16Array ? 'uint16' : 'float32';
  const name = `scene-${count++}`;
  const { width, height } = grid;
  const path = makeRaster(join(folder, `${name}.tif`), { bands, dtype, width, height, grid, srs, nodata });
  return ingestScene(path, name);
}

async function ingestScene(path: string, name: string): Promise<Scene> {
  const info = await inspectSource(path);
  const ingested = await ingestBands(path, info, join(folder, name));
  const grid = { width: info.width, height: info.height, ...info.transform };
  return { info, grid, paths: ingested.map((band) => join(folder, name, band.fileName)) };
}

function warpWithGdal(path: string, { z, x, y }: { z: number; x: number; y: number }, ...more: string[]): string {
  const half = 20037508.342789244;
  const side = (2 * half) / 2 ** z;
  const extent = [-half + x * side, half - (y + 1) * side, -half + (x + 1) * side, half - y * side].map(String);
  const out = join(folder, `warped-${count++}.tif`);
  const exact = ['-t_srs', 'EPSG:3857', '-te', ...extent, '-ts', '256', '256', '-et', '0', '-ovr', 'NONE'];
  runTool('gdalwarp', ['-q', ...exact, ...more, path, out]);
  return out;
}

describe('tiles against gdalwarp', () => {
  const side = 300;
  // Each pixel's value tells its column and row; 0 is kept for nodata. Exact in float32.
  const placeValues = fillBand(new Float32Array(side * side), side, (col, row) => 1 + row * side + col);
  const metres = (overrides: Partial<RasterGrid>): RasterGrid => makeGrid({ width: side, height: side, ...overrides });
  const degrees = { pixelWidth: 0.0004, pixelHeight: 0.0003 };
  it.each([
    { name: 'UTM north', srs: 'EPSG:32628', grid: metres({ originX: 420000, originY: 5800000 }), z: 12 },
    { name: 'UTM south', srs: 'EPSG:32734', grid: metres({ originX: 250000, originY: 6250000 }), z: 12 },
    { name: 'UTM north, far enlarged', srs: 'EPSG:32628', grid: metres({ originX: 420000, originY: 5800000 }), z: 16 },
    { name: 'degrees', srs: 'EPSG:4326', grid: metres({ originX: 8, originY: 47, ...degrees }), z: 12 },
    { name: 'polar stereographic', srs: 'EPSG:3031', grid: metres({ originX: 900000, originY: 1200000 }), z: 10 },
    {
      name: 'British grid, with datum shift',
      srs: 'EPSG:27700',
      grid: metres({ originX: 420000, originY: 300000 }),
      z: 12,
    },
    {
      name: 'UTM zone 60 by the antimeridian',
      srs: 'EPSG:32660',
      grid: metres({ originX: 829000, originY: 600000 }),
      z: 12,
    },
  ])('takes the same pixel as gdalwarp: $name', async ({ srs, grid, z }) => {
    const scene = await makeScene([placeValues], srs, grid, '0');
    const tile = { ...middleTile(scene.info.bounds, z), size: 256 };
    const geometry = getSceneGeometry(scene.grid, scene.info.crs.proj4);
    const warp = buildWarpGrid(tile, geometry)!;
    expect(warp.pixelsPerTilePixel).toBeLessThan(1.9);
    const ours = (await sampleBand(await store.open(scene.paths[0]), scene.grid, warp, 'nearest'))!;
    const theirs = readWithGdal(warpWithGdal(scene.paths[0], tile, '-r', 'near'), 'float32');

    let nOnScene = 0;
    let nDiffering = 0;
    for (let i = 0; i < 65536; i++) {
      const our = ours.isValid[i] === 1 ? ours.values[i] : 0;
      if (our !== 0 || theirs[i] !== 0) nOnScene++;
      if (our === theirs[i]) continue;
      nDiffering++;
      // A third of a pixel is all that may explain it: both choices must hold a point that near the exact place.
      const lon = getMercatorLon((tile.x + ((i % 256) + 0.5) / 256) / 2 ** z);
      const lat = getMercatorLat((tile.y + (Math.floor(i / 256) + 0.5) / 256) / 2 ** z);
      const [col, row] = geometry.toPixel(lon, lat);
      for (const choice of [our, theirs[i]]) {
        if (choice === 0) {
          const margin = Math.max(-col, col - side, -row, row - side);
          expect(margin).toBeGreaterThan(-1 / 3);
        } else {
          expect(Math.abs(((choice - 1) % side) + 0.5 - col)).toBeLessThan(0.5 + 1 / 3);
          expect(Math.abs(Math.floor((choice - 1) / side) + 0.5 - row)).toBeLessThan(0.5 + 1 / 3);
        }
      }
    }
    expect(nOnScene).toBeGreaterThan(15000);
    expect(nDiffering / nOnScene).toBeLessThan(0.01);
  });

  it('interpolates as gdalwarp does away from nodata', async () => {
    const smooth = fillBand(
      new Float32Array(side * side),
      side,
      (col, row) => 100 + 40 * Math.sin(col / 6) * Math.cos(row / 8),
    );
    const scene = await makeScene([smooth], 'EPSG:32628', metres({ originX: 420000, originY: 5800000 }));
    const tile = { ...middleTile(scene.info.bounds, 14), size: 256 };
    const warp = buildWarpGrid(tile, getSceneGeometry(scene.grid, scene.info.crs.proj4))!;
    const ours = (await sampleBand(await store.open(scene.paths[0]), scene.grid, warp, 'bilinear'))!;
    const theirs = readWithGdal(warpWithGdal(scene.paths[0], tile, '-r', 'bilinear'), 'float32');
    expect(ours.isValid.reduce((sum, one) => sum + one, 0)).toBe(65536);
    let worst = 0;
    for (let i = 0; i < 65536; i++) worst = Math.max(worst, Math.abs(ours.values[i] - theirs[i]));
    // The steepest slope is 40/6 a pixel; an eighth of a pixel of position is 0.83.
    expect(worst).toBeLessThan(0.83);
  });

  it('reads an overview where a tile pixel spans many scene pixels', async () => {
    const wide = makeGrid({ width: 1200, height: 1200 });
    const values = fillBand(new Uint16Array(1200 * 1200), 1200, (col, row) => 1000 + col + row);
    const scene = await makeScene([values], 'EPSG:32628', wide);
    const tile = { ...middleTile(scene.info.bounds, 9), size: 256 };
    const warp = buildWarpGrid(tile, getSceneGeometry(scene.grid, scene.info.crs.proj4))!;
    const band = await store.open(scene.paths[0]);
    expect(band.getLevelFactor(band.chooseLevel(warp.pixelsPerTilePixel))).toBe(4);
    const { values: ours, isValid } = (await sampleBand(band, scene.grid, warp, 'nearest'))!;
    for (let i = 0; i < 65536; i++) {
      if (isValid[i] === 0) continue;
      // The value says where it came from: within half an overview pixel (4 / 2 each way) of the place asked for.
      expect(Math.abs(ours[i] - 1000 - (warp.cols[i] - 0.5 + warp.rows[i] - 0.5))).toBeLessThanOrEqual(4.5);
    }
  });
});

describe('renderTile', () => {
  const grid = makeGrid({ width: 300, height: 300, originX: 420000, originY: 5800000 });
  const ramp = fillBand(new Uint16Array(90000), 300, (col) => 1000 + col * 10);
  const holed = fillBand(new Uint16Array(90000), 300, (col, row) =>
    col > 140 && row > 140 && row < 160 ? 0 : 2000 + row * 10,
  );

  async function makeRequest(): Promise<{ scene: Scene; request: TileRequest }> {
    const scene = await makeScene([ramp, holed], 'EPSG:32628', grid, '0');
    const [first, second] = scene.paths;
    const layer: TileRequest['layer'] = {
      kind: 'composite',
      bands: [first, second, first],
      stretch: [
        [1000, 4000],
        [2000, 5000],
        [1000, 4000],
      ],
    };
    return {
      scene,
      request: { ...middleTile(scene.info.bounds, 12), crs: scene.info.crs.proj4, grid: scene.grid, layer },
    };
  }

  it('gives a WebP tile that is transparent outside the scene and where any band has no data', async () => {
    const { request } = await makeRequest();
    const encoded = (await renderTile(request, store))!;
    const { data, info } = await sharp(encoded).ensureAlpha().raw().toBuffer({ resolveWithObject: true });
    expect(info).toMatchObject({ width: 256, height: 256, channels: 4 });
    expect((await sharp(encoded).metadata()).format).toBe('webp');
    const warp = buildWarpGrid({ ...request, size: 256 }, getSceneGeometry(request.grid, request.crs))!;
    let nTransparent = 0;
    for (let i = 0; i < 65536; i++) {
      const [col, row] = [Math.floor(warp.cols[i]), Math.floor(warp.rows[i])];
      const isShown = col >= 0 && col < 300 && row >= 0 && row < 300 && holed[row * 300 + col] !== 0;
      expect(data[i * 4 + 3]).toBe(isShown ? 255 : 0);
      if (!isShown) nTransparent++;
    }
    expect(nTransparent).toBeGreaterThan(100);
  });

  it('stretches linearly, and brightens the middle with gamma', async () => {
    const { request } = await makeRequest();
    const warp = buildWarpGrid({ ...request, size: 256 }, getSceneGeometry(request.grid, request.crs))!;
    const plain = (await renderTilePixels(request, store))!;
    const bright = (await renderTilePixels({ ...request, gamma: 2 }, store))!;
    let nCompared = 0;
    for (let i = 0; i < 65536; i += 11) {
      if (plain.rgba[i * 4 + 3] === 0) continue;
      const fraction = (1000 + Math.floor(warp.cols[i]) * 10 - 1000) / 3000;
      expect(Math.abs(plain.rgba[i * 4] - 255 * fraction)).toBeLessThanOrEqual(1);
      expect(Math.abs(bright.rgba[i * 4] - 255 * Math.sqrt(fraction))).toBeLessThanOrEqual(2);
      nCompared++;
    }
    expect(nCompared).toBeGreaterThan(1000);
  });

  it('shows one band in grey or through a ramp', async () => {
    const { request, scene } = await makeRequest();
    const layer = { kind: 'single' as const, band: scene.paths[0], stretch: [1000, 3990] as [number, number] };
    const grey = (await renderTilePixels({ ...request, layer }, store))!;
    const at = grey.rgba.findIndex((value, i) => i % 4 === 3 && value === 255) - 3;
    expect(grey.rgba[at]).toBe(grey.rgba[at + 1]);
    expect(grey.rgba[at]).toBe(grey.rgba[at + 2]);
    const blueToRed = (await renderTilePixels(
      {
        ...request,
        layer: {
          ...layer,
          ramp: [
            [0, 0, 255, 255],
            [255, 0, 0, 255],
          ],
        },
      },
      store,
    ))!;
    expect(blueToRed.rgba[at] + blueToRed.rgba[at + 2]).toBe(255);
    expect(blueToRed.rgba[at]).toBe(grey.rgba[at]);
  });

  it('shows classes in exactly the colours of the palette, uncoloured codes and nodata transparent', async () => {
    const codes = fillBand(new Uint8Array(90000), 300, (col) => [1, 2, 3, 255][Math.floor(col / 75)]);
    const scene = await makeScene([codes], 'EPSG:32628', grid, '255');
    const layer: TileRequest['layer'] = {
      kind: 'classes',
      band: scene.paths[0],
      palette: [
        [1, [10, 120, 30, 255]],
        [2, [200, 180, 20, 255]],
        [255, [9, 9, 9, 255]],
      ],
    };
    const request = {
      ...middleTile(scene.info.bounds, 12),
      crs: scene.info.crs.proj4,
      grid,
      layer,
      resampling: 'bilinear' as const,
    };
    const { data } = await sharp((await renderTile(request, store))!)
      .raw()
      .toBuffer({ resolveWithObject: true });
    const warp = buildWarpGrid({ ...request, size: 256 }, getSceneGeometry(grid, request.crs))!;
    for (let i = 0; i < 65536; i++) {
      const [col, row] = [Math.floor(warp.cols[i]), Math.floor(warp.rows[i])];
      const code = col >= 0 && col < 300 && row >= 0 && row < 300 ? codes[row * 300 + col] : 0;
      const pixel = Array.from(data.subarray(i * 4, i * 4 + 4));
      if (code === 1) expect(pixel).toEqual([10, 120, 30, 255]);
      else if (code === 2) expect(pixel).toEqual([200, 180, 20, 255]);
      else expect(pixel[3]).toBe(0);
    }
  });

  it('draws a band on its own coarser grid where it belongs', async () => {
    const { request, scene } = await makeRequest();
    const coarseGrid = makeGrid({ ...grid, width: 100, height: 100, pixelWidth: 90, pixelHeight: 90 });
    const thermal = await makeScene(
      [fillBand(new Uint16Array(10000), 100, (col) => 1000 + col * 30)],
      'EPSG:32628',
      coarseGrid,
    );
    const layer = { kind: 'single' as const, band: thermal.paths[0], stretch: [1000, 4000] as [number, number] };
    const pixels = (await renderTilePixels({ ...request, layer }, store))!;
    const warp = buildWarpGrid({ ...request, size: 256 }, getSceneGeometry(scene.grid, request.crs))!;
    for (let i = 0; i < 65536; i += 5) {
      if (pixels.rgba[i * 4 + 3] === 0) continue;
      expect(Math.abs(pixels.rgba[i * 4] - (255 * Math.floor(warp.cols[i] / 3)) / 100)).toBeLessThanOrEqual(1);
    }
  });

  it('returns null for a tile that misses the scene or shows only nodata, and refuses one that does not exist', async () => {
    const { request } = await makeRequest();
    expect(await renderTile({ ...request, x: request.x + 20 }, store)).toBeNull();
    const empty = await makeScene([new Uint16Array(90000).fill(5), new Uint16Array(90000)], 'EPSG:32628', grid, '0');
    const layer = { kind: 'single' as const, band: empty.paths[1], stretch: [0, 1] as [number, number] };
    expect(await renderTile({ ...request, layer }, store)).toBeNull();
    await expect(renderTile({ ...request, z: 2, x: 4 }, store)).rejects.toThrow(RangeError);
  });

  it('draws 512-pixel tiles that show the same place', async () => {
    const { request } = await makeRequest();
    const dense = (await renderTilePixels({ ...request, size: 512 }, store))!;
    expect(dense.rgba).toHaveLength(512 * 512 * 4);
    const normal = (await renderTilePixels(request, store))!;
    const share = (rgba: Uint8Array): number =>
      rgba.filter((value, i) => i % 4 === 3 && value === 255).length / (rgba.length / 4);
    expect(share(dense.rgba)).toBeCloseTo(share(normal.rgba), 2);
  });
});

// A real six-band scene that isn't part of the repository; checked where it lies beside it.
const coastPath = join(import.meta.dirname, '../../../shared/data/coast-6band.tif');
describe.skipIf(!existsSync(coastPath))('a real six-band scene', () => {
  it('is ingested whole and drawn like gdalwarp draws it', async () => {
    const scene = await ingestScene(coastPath, 'coast');
    expect(scene.info).toMatchObject({ width: 349, height: 352, crs: { epsg: 31985 } });
    expect(scene.paths).toHaveLength(6);
    const tile = { ...middleTile(scene.info.bounds, 13), size: 256 };
    const warp = buildWarpGrid(tile, getSceneGeometry(scene.grid, scene.info.crs.proj4))!;
    for (const path of scene.paths) {
      const ours = (await sampleBand(await store.open(path), scene.grid, warp, 'nearest'))!;
      const theirs = readWithGdal(warpWithGdal(path, tile, '-r', 'near'), 'uint8');
      let nDiffering = 0;
      for (let i = 0; i < 65536; i++) if (ours.isValid[i] === 1 && ours.values[i] !== theirs[i]) nDiffering++;
      expect(nDiffering / 65536).toBeLessThan(0.01);
    }
  });
});
