import type { Config } from '../config.ts';
import type { TileRequest } from '../raster/tile-request.ts';
import type { TileWorkerData } from '../raster/tile-worker.ts';
import { WaitingLine } from './waiting-line.ts';
import { createWorkerPool } from './worker-pool.ts';
import type { Pool } from './worker-pools.ts';

/** Threads that drew nothing for so long are ended, and with them the blocks they keep. */
const TILE_IDLE_MS = 15 * 60_000;

/** The threads that draw tiles, apart from those of runs; they share the memory set aside for decoded blocks. */
export function openTilePool(
  config: Pick<Config, 'workerThreads' | 'tileCacheMb'>,
): Pool<TileRequest, Uint8Array | null> {
  const threads = config.workerThreads;
  const settings: TileWorkerData = { cacheMb: Math.max(1, Math.floor(config.tileCacheMb / threads)) };
  const pool = createWorkerPool<TileRequest, Uint8Array | null>({
    entry: new URL('../raster/tile-worker.ts', import.meta.url),
    threads,
    workerData: { ...settings },
    idleTimeoutMs: TILE_IDLE_MS,
  });
  const line = new WaitingLine(threads);
  return {
    threads,
    run: (task, { signal } = {}) => line.run(() => pool.run(task), signal),
    close: () => pool.destroy(),
  };
}
