import type { TileRequest } from '../raster/tile-request.ts';
import type { ComputeResult, ComputeTask } from './compute/tasks.ts';

/** A pool of worker threads that runs one kind of task; rejects with the signal's reason when aborted. */
export interface Pool<Task, Result> {
  run(task: Task, options?: { signal?: AbortSignal; transferList?: readonly ArrayBuffer[] }): Promise<Result>;
  /** Threads, so that callers can cut work to fit. */
  readonly threads: number;
  close(): Promise<void>;
}

/** The worker threads of this process: small ones for tiles, so that maps stay quick while a run computes. */
export interface WorkerPools {
  /** The heavy steps of runs: training, mapping. */
  readonly compute: Pool<ComputeTask, ComputeResult>;
  /** Draws tiles as WebP; null where a tile shows nothing. A signal stops only tiles that have not begun. */
  readonly tiles: Pool<TileRequest, Uint8Array | null>;
  close(): Promise<void>;
}
