import type { Config } from '../config.ts';
import type { WorkerPools } from './worker-pools.ts';

export function openWorkerPools(_config: Pick<Config, 'workerThreads' | 'tileCacheMb'>): WorkerPools {
  return { close: () => Promise.resolve() };
}
