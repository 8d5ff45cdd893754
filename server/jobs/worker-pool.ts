import { fileURLToPath } from 'node:url';
import { Piscina } from 'piscina';

export interface WorkerPoolOptions {
  /** Module whose default export is the task; its `.ts` URL, `new URL('./x.ts', import.meta.url)`, also when compiled. */
  entry: URL;
  threads: number;
  /** Readable in the worker as `workerData`. */
  workerData?: Record<string, unknown>;
  /** Tasks that may wait; more are refused. Unlimited where not given. */
  maxQueue?: number;
  /** Threads that did nothing for so long are ended; they stay for good where not given. */
  idleTimeoutMs?: number;
  /** Heap limit of each thread. */
  maxHeapMb?: number;
  /** Told of a thread that failed while it had no task; written to standard error where not given. */
  onError?: (error: Error) => void;
}

/**
 * A pool of worker threads that runs from the TypeScript sources and from the compiled server alike.
 * Run a task with `pool.run(task, { signal, transferList })`; an aborted task's thread, with whatever it
 * holds in memory, is ended and replaced if the task had begun.
 */
export function createWorkerPool<Task, Result>(options: WorkerPoolOptions): Piscina<Task, Result> {
  const { entry, threads, workerData = {}, maxQueue = Infinity, idleTimeoutMs, maxHeapMb } = options;
  const { onError = (error: Error) => console.error('worker thread failed:', error) } = options;
  const isCompiled = import.meta.url.endsWith('.js');
  const entryUrl = isCompiled ? new URL(entry.href.replace(/\.ts$/, '.js')) : entry;
  const bootUrl = new URL('./worker-boot.mjs', import.meta.url);
  const pool = new Piscina<Task, Result>({
    filename: fileURLToPath(isCompiled ? entryUrl : bootUrl),
    minThreads: idleTimeoutMs === undefined ? threads : 0,
    maxThreads: threads,
    maxQueue,
    idleTimeout: idleTimeoutMs ?? Infinity,
    // The atomics wait would freeze a worker's own asynchronous work between tasks.
    atomics: 'disabled',
    // geotiff can't be loaded in a worker without any workerData.
    workerData: { ...workerData, workerEntry: entryUrl.href },
    ...(maxHeapMb === undefined ? {} : { resourceLimits: { maxOldGenerationSizeMb: maxHeapMb } }),
  });
  // Without a listener an 'error' event would end the process.
  pool.on('error', (error: Error) => {
    // An aborted task may have had its answer on the way; nobody waits for it any more.
    if (error.message.startsWith('Unexpected message from Worker')) return;
    onError(error);
  });
  return pool;
}
