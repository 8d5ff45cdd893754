import type { Piscina } from 'piscina';
import type { Config } from '../config.ts';
import type { ComputeResult, ComputeTask } from './compute/tasks.ts';
import { openTilePool } from './open-tile-pool.ts';
import { createWorkerPool } from './worker-pool.ts';
import type { Pool, WorkerPools } from './worker-pools.ts';

/** Threads of a run that have nothing to do give their memory back after this long. */
const COMPUTE_IDLE_MS = 30_000;

function toPool<Task, Result>(piscina: Piscina<Task, Result>): Pool<Task, Result> {
  return {
    threads: piscina.maxThreads,
    run: (task, { signal, transferList } = {}) =>
      piscina.run(task, {
        ...(signal ? { signal } : {}),
        ...(transferList ? { transferList: [...transferList] } : {}),
      }),
    close: () => piscina.destroy(),
  };
}

/** Opens the threads of this process; they start with their first task. */
export function openWorkerPools(config: Pick<Config, 'workerThreads' | 'tileCacheMb'>): WorkerPools {
  const compute = toPool(
    createWorkerPool<ComputeTask, ComputeResult>({
      entry: new URL('./compute-worker.ts', import.meta.url),
      threads: config.workerThreads,
      idleTimeoutMs: COMPUTE_IDLE_MS,
    }),
  );
  const tiles = openTilePool(config);
  return {
    compute,
    tiles,
    async close() {
      await compute.close();
      await tiles.close();
    },
  };
}
