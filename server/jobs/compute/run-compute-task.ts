import type { Pool } from '../worker-pools.ts';
import type { ComputeKind, ComputeResult, ComputeTask, ComputeTasks, SharedProgress } from './tasks.ts';

export type ComputePool = Pool<ComputeTask, ComputeResult>;

/** Runs one task in the compute threads. Aborting the signal ends the thread in the middle of its work. */
export async function runComputeTask<K extends ComputeKind>(
  pool: ComputePool,
  kind: K,
  input: ComputeTasks[K]['input'],
  signal: AbortSignal,
): Promise<ComputeTasks[K]['result']> {
  // The pool knows the union only; a task's result belongs to its kind (see ComputeTasks).
  return (await pool.run({ kind, ...input } as ComputeTask, { signal })) as ComputeTasks[K]['result'];
}

const LOOK_EVERY_MS = 200;

/** Runs a task that counts in shared memory, and passes the count on while it works. */
export async function runWatched<T>(
  total: number,
  onProgress: (done: number, total: number) => void,
  run: (progress: SharedProgress) => Promise<T>,
): Promise<T> {
  const progress = new Int32Array(new SharedArrayBuffer(4));
  const timer = setInterval(() => onProgress(Atomics.load(progress, 0), total), LOOK_EVERY_MS);
  try {
    return await run(progress);
  } finally {
    clearInterval(timer);
  }
}
