import type { JobKind } from '../../shared/contracts/job.ts';
import type { App } from '../app-context.ts';
import type { JobHandler } from '../jobs/job-queue.ts';
import { ingestScene } from './ingest-scene.ts';
import { executePostProcessing } from './post-processing-execution.ts';
import { executeReproduction } from './reproduction-execution.ts';
import { executeRun } from './run-execution.ts';
import { executeTuning } from './tuning-execution.ts';

/** What does the work of each kind of job. */
export function createJobHandlers(app: App): Record<JobKind, JobHandler> {
  return {
    ingest: (context) => ingestScene(app, context),
    run: (context) => executeRun(app, context),
    reproduce: (context) => executeReproduction(app, context),
    tune: (context) => executeTuning(app, context),
    'post-process': (context) => executePostProcessing(app, context),
  };
}
