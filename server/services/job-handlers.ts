import type { App } from '../app-context.ts';
import type { JobHandler } from '../jobs/job-queue.ts';

/** What does the work of each kind of job. */
export function createJobHandlers(_app: App): Record<'ingest' | 'run', JobHandler> {
  return { ingest: () => Promise.reject(new Error('no ingest')), run: () => Promise.reject(new Error('no run')) };
}
