import type { App } from '../app-context.ts';
import type { JobHandler } from '../jobs/job-queue.ts';
import { ingestScene } from './ingest-scene.ts';
import { executeRun } from './run-execution.ts';

/** What does the work of each kind of job. */
export function createJobHandlers(app: App): Record<'ingest' | 'run', JobHandler> {
  return { ingest: (context) => ingestScene(app, context), run: (context) => executeRun(app, context) };
}
