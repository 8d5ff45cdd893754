/** A pool of worker threads that runs one kind of task; rejects with the signal's reason when aborted. */
export interface Pool<Task, Result> {
  run(task: Task, options?: { signal?: AbortSignal; transferList?: readonly ArrayBuffer[] }): Promise<Result>;
  /** Threads, so that callers can cut work to fit. */
  readonly threads: number;
  close(): Promise<void>;
}

/** The worker threads of this process: small ones for tiles, so that maps stay quick while a run computes. */
export interface WorkerPools {
  close(): Promise<void>;
}
