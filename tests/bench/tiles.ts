/**
 * Times tiles of an invented scene through the worker pool. Run: npm run bench:tiles [-- --size=4000 --threads=2]
 * Cold: a tile asked for by threads that have decoded nothing yet (modules loaded, system page cache warm).
 * Warm: the same tile again, its blocks decoded. The last lines compare one tile with gdalwarp and gdal_translate.
 */
import { execFileSync } from 'node:child_process';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { cpus, tmpdir } from 'node:os';
import { join } from 'node:path';
import { createWorkerPool } from '../../server/jobs/worker-pool.ts';
import { inspectSource } from '../../server/raster/inspect-source.ts';
import { ingestBands, type IngestedBand } from '../../server/raster/ingest-bands.ts';
import type { RasterGrid } from '../../server/raster/raster-grid.ts';
import { writeGeoTiffFromRaw } from '../../server/raster/raw-to-geotiff.ts';
import { getTileBounds } from '../../server/raster/tile-geometry.ts';
import type { TileLayer, TileRequest } from '../../server/raster/tile-request.ts';
import { createRandom, makeSyntheticBand } from './synthetic-band.ts';

function readOption(name: string, fallback: number): number {
  const given = process.argv.find((argument) => argument.startsWith(`--${name}=`));
  return given === undefined ? fallback : Number(given.split('=')[1]);
}
const size = readOption('size', 4000);
const threads = readOption('threads', 2);
const tilesPerZoom = readOption('tiles', 40);
const zooms = [8, 10, 12, 13, 15];
const grid: RasterGrid = {
  width: size,
  height: size,
  originX: 400000,
  originY: 5850000,
  pixelWidth: 30,
  pixelHeight: 30,
};

const entry = new URL('../../server/raster/tile-worker.ts', import.meta.url);
const openPool = () =>
  createWorkerPool<TileRequest, Uint8Array | null>({ entry, threads, workerData: { cacheMb: 256 } });
type TilePool = ReturnType<typeof openPool>;

/** The centre of a tile that is well inside the scene, as a request without a layer. */
function chooseTiles(zoom: number, toTile: (u: number, v: number) => [number, number]): [number, number][] {
  const random = createRandom(zoom);
  const chosen = new Map<string, [number, number]>();
  for (let attempt = 0; attempt < tilesPerZoom * 20 && chosen.size < tilesPerZoom; attempt++) {
    const tile = toTile(0.1 + 0.8 * random(), 0.1 + 0.8 * random());
    chosen.set(tile.join('/'), tile);
  }
  return [...chosen.values()];
}

function quantile(sorted: readonly number[], share: number): string {
  return sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))].toFixed(1);
}

async function timeTiles(pool: TilePool, requests: readonly TileRequest[]): Promise<number[]> {
  const times: number[] = [];
  for (const request of requests) {
    const began = performance.now();
    const tile = await pool.run(request);
    times.push(performance.now() - began);
    if (tile === null) throw new Error(`tile ${request.z}/${request.x}/${request.y} came back empty`);
  }
  return times.sort((a, b) => a - b);
}

/** One tile outside the scene in each thread, so that modules are loaded before anything is timed. */
async function loadModules(pool: TilePool, request: TileRequest): Promise<void> {
  const elsewhere = { ...request, z: 8, x: 0, y: 0 };
  await Promise.all(Array.from({ length: threads * 2 }, () => pool.run(elsewhere)));
}

async function main(): Promise<void> {
  const folder = await mkdtemp(join(tmpdir(), 'bench-tiles-'));
  try {
    const began = performance.now();
    const paths: string[] = [];
    const bands: IngestedBand[] = [];
    for (let number = 1; number <= 3; number++) {
      const rawPath = join(folder, `band-${number}.raw`);
      const sourcePath = join(folder, `source-${number}.tif`);
      await writeFile(rawPath, makeSyntheticBand(size, size, 'uint16', number));
      await writeGeoTiffFromRaw({ rawPath, dtype: 'uint16', grid, wkt: 'EPSG:32628', nodata: null }, sourcePath, {
        overviews: 'none',
      });
      await rm(rawPath);
      const ingestBegan = performance.now();
      bands.push(
        ...(await ingestBands(sourcePath, await inspectSource(sourcePath), folder, { firstFileNumber: number })),
      );
      const seconds = (performance.now() - ingestBegan) / 1000;
      if (number === 1) console.log(`ingest of one ${size} × ${size} uint16 band: ${seconds.toFixed(2)} s`);
      paths.push(join(folder, bands[number - 1].fileName));
    }
    const info = await inspectSource(paths[0]);
    console.log(
      `${cpus().length} × ${cpus()[0].model}, Node ${process.version}; ${threads} threads; scene ready in ${((performance.now() - began) / 1000).toFixed(1)} s`,
    );
    const stretch = bands.map((band) => [band.statistics!.p2, band.statistics!.p98] as [number, number]);
    const composite: TileLayer = {
      kind: 'composite',
      bands: [paths[0], paths[1], paths[2]],
      stretch: [stretch[0], stretch[1], stretch[2]],
    };
    const single: TileLayer = { kind: 'single', band: paths[0], stretch: stretch[0] };
    const { west, south, east, north } = info.bounds;
    const toRequest = (
      z: number,
      [x, y]: [number, number],
      layer: TileLayer,
      more: Partial<TileRequest> = {},
    ): TileRequest => ({
      ...{ z, x, y, crs: info.crs.proj4, grid, layer },
      ...more,
    });

    console.log(
      '\n| layer | zoom | tiles | cold p50 ms | cold p95 ms | warm p50 ms | warm p95 ms |\n|---|---|---|---|---|---|---|',
    );
    const cases: [string, TileLayer, Partial<TileRequest>][] = [
      ['composite, nearest', composite, {}],
      ['composite, bilinear', composite, { resampling: 'bilinear' }],
      ['one band', single, {}],
    ];
    for (const [label, layer, more] of cases) {
      const allCold: number[] = [];
      const allWarm: number[] = [];
      for (const z of zooms) {
        const tiles = chooseTiles(z, (u, v) => locateTile(west + u * (east - west), south + v * (north - south), z));
        const requests = tiles.map((tile) => toRequest(z, tile, layer, more));
        const pool = openPool();
        await loadModules(pool, requests[0]);
        const cold = await timeTiles(pool, requests);
        // Twice unmeasured: either thread may serve either request.
        await timeTiles(pool, requests);
        await timeTiles(pool, requests);
        const warm = await timeTiles(pool, requests);
        await pool.close();
        allCold.push(...cold);
        allWarm.push(...warm);
        console.log(
          `| ${label} | ${z} | ${cold.length} | ${quantile(cold, 0.5)} | ${quantile(cold, 0.95)} | ${quantile(warm, 0.5)} | ${quantile(warm, 0.95)} |`,
        );
      }
      allCold.sort((a, b) => a - b);
      allWarm.sort((a, b) => a - b);
      console.log(
        `| ${label} | all | ${allCold.length} | ${quantile(allCold, 0.5)} | ${quantile(allCold, 0.95)} | ${quantile(allWarm, 0.5)} | ${quantile(allWarm, 0.95)} |`,
      );
    }

    const tiles = chooseTiles(12, (u, v) => locateTile(west + u * (east - west), south + v * (north - south), 12));
    const requests = tiles.map((tile) => toRequest(12, tile, composite));
    const pool = openPool();
    await loadModules(pool, requests[0]);
    await Promise.all(requests.map((request) => pool.run(request)));
    const throughputBegan = performance.now();
    await Promise.all([...requests, ...requests, ...requests].map((request) => pool.run(request)));
    const perTile = (performance.now() - throughputBegan) / (requests.length * 3);
    console.log(
      `\nall threads busy, composite, zoom 12, warm: ${perTile.toFixed(1)} ms a tile (${(1000 / perTile).toFixed(0)} tiles a second)`,
    );
    await pool.close();
    compareWithGdal(folder, paths, tiles[0], perTile);
  } finally {
    await rm(folder, { recursive: true });
  }
}

function locateTile(lon: number, lat: number, z: number): [number, number] {
  const n = 2 ** z;
  const phi = (lat * Math.PI) / 180;
  return [Math.floor(((lon + 180) / 360) * n), Math.floor(((1 - Math.asinh(Math.tan(phi)) / Math.PI) / 2) * n)];
}

/** The same composite tile by the command-line tools: warp three bands to the tile, stretch to 8 bits, encode. */
function compareWithGdal(folder: string, paths: readonly string[], [x, y]: [number, number], ourMs: number): void {
  const half = 20037508.342789244;
  const side = (2 * half) / 2 ** 12;
  const extent = [-half + x * side, half - (y + 1) * side, -half + (x + 1) * side, half - y * side].map(String);
  const stack = join(folder, 'stack.vrt');
  execFileSync('gdalbuildvrt', ['-q', '-separate', stack, ...paths]);
  const warped = join(folder, 'warped.tif');
  const began = performance.now();
  const warp = ['-q', '-overwrite', '-t_srs', 'EPSG:3857', '-te', ...extent, '-ts', '256', '256', '-r', 'near'];
  execFileSync('gdalwarp', [...warp, stack, warped]);
  execFileSync('gdal_translate', ['-q', '-of', 'WEBP', '-ot', 'Byte', '-scale', warped, join(folder, 'tile.webp')]);
  const gdalMs = performance.now() - began;
  console.log(
    `gdalwarp + gdal_translate, two processes, tile 12/${x}/${y} (${getTileBounds({ z: 12, x, y }).west.toFixed(3)}° E): ${gdalMs.toFixed(0)} ms; ratio to ours ${(gdalMs / ourMs).toFixed(0)}`,
  );
}

await main();
