import { workerData } from 'node:worker_threads';
import { move } from 'piscina';
import sharp from 'sharp';
import { BandStore } from './band-store.ts';
import { renderTile } from './render-tile.ts';
import type { TileRequest } from './tile-request.ts';

/** Settings a pool of tile workers is started with. */
export interface TileWorkerData {
  /** Budget for decoded blocks in this thread. */
  cacheMb?: number;
}

// One tile at a time in each thread: the pool is the parallelism, and a tile is encoded once.
sharp.concurrency(1);
sharp.cache(false);

const { cacheMb = 128 } = (workerData ?? {}) as TileWorkerData;
const store = new BandStore({ cacheMb, decode: 'blocking' });

/** Worker entry: a WebP tile as an ArrayBuffer-backed array, or null when the tile shows nothing. */
export default async function renderTileTask(request: TileRequest): Promise<Uint8Array | null> {
  const tile = await renderTile(request, store);
  if (tile === null) return null;
  // Copied out of Node's shared buffer pool, which can't be handed to another thread.
  const owned = new Uint8Array(tile);
  return move(owned) as Uint8Array;
}
