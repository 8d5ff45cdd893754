import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { createWorkerPool } from '../../server/jobs/worker-pool.ts';
import { BandStore } from '../../server/raster/band-store.ts';
import { ingestBands } from '../../server/raster/ingest-bands.ts';
import { inspectSource } from '../../server/raster/inspect-source.ts';
import { renderTile } from '../../server/raster/render-tile.ts';
import type { TileRequest } from '../../server/raster/tile-request.ts';
import { fillBand, makeGrid, makeRaster, middleTile, useTempFolder } from './make-raster.ts';

const folder = useTempFolder();
const pool = createWorkerPool<TileRequest, Uint8Array | null>({
  entry: new URL('../../server/raster/tile-worker.ts', import.meta.url),
  threads: 2,
  workerData: { cacheMb: 8 },
});
afterAll(() => pool.close());

describe('tile worker', async () => {
  const grid = makeGrid({ width: 300, height: 300, originX: 420000, originY: 5800000 });
  const source = makeRaster(join(folder, 'source.tif'), {
    bands: [fillBand(new Uint16Array(90000), 300, (col, row) => col * row)],
    dtype: 'uint16',
    width: 300,
    height: 300,
    grid,
    srs: 'EPSG:32628',
  });
  const info = await inspectSource(source);
  await ingestBands(source, info, join(folder, 'scene'));
  const band = join(folder, 'scene', 'band-01.tif');
  const request: TileRequest = {
    ...middleTile(info.bounds, 11),
    crs: info.crs.proj4,
    grid,
    layer: { kind: 'single', band, stretch: [0, 60000] },
  };

  it('draws in a thread what the same code draws here', async () => {
    const store = new BandStore();
    const here = (await renderTile(request, store))!;
    await store.close();
    const tiles = await Promise.all([request, request, request].map((one) => pool.run(one)));
    for (const tile of tiles) expect(Buffer.from(tile!)).toEqual(here);
  });

  it('answers null for a tile without the scene', async () => {
    expect(await pool.run({ ...request, x: 0 })).toBeNull();
  });

  it('passes errors on and goes on working', async () => {
    await expect(pool.run({ ...request, z: 1, x: 9 })).rejects.toThrow(/no tile 1\/9/);
    const missing = { ...request, layer: { ...request.layer, band: join(folder, 'gone.tif') } } as TileRequest;
    await expect(pool.run(missing)).rejects.toThrow(/ENOENT/);
    expect(await pool.run(request)).not.toBeNull();
  });

  it('stops waiting when the signal is aborted', async () => {
    const controller = new AbortController();
    const run = pool.run(request, { signal: controller.signal });
    controller.abort();
    await expect(run).rejects.toThrow(/abort/i);
    expect(await pool.run(request)).not.toBeNull();
  });
});
