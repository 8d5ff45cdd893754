import type { App } from '../app-context.ts';
import { Job } from '../entities/job.ts';
import type { Run } from '../entities/run.ts';
import { Conflict, NotFound } from '../errors.ts';
import { presentJobEvent } from '../jobs/job-event.ts';
import { recordActivity } from './activities.ts';
import { runFiles } from './run-files.ts';
import { findRun } from './runs.ts';

/**
 * Puts a failed or cancelled run back into the queue with its recipe and snapshot. A failed one goes on from the parts and strips
 * it has, unless it is to begin anew; of a cancelled one nothing is kept.
 * @throws Conflict when it waits, works or is finished
 */
export async function retryRun(app: App, run: Run, byId: string, { anew }: { anew: boolean }): Promise<Run> {
  const refuse = (state: string) => {
    throw new Conflict(
      'Only a failed or cancelled run can be tried again.',
      { found: `it is ${state}`, wanted: 'a failed or cancelled run' },
      'not-retryable',
    );
  };
  if (run.job.state !== 'failed' && run.job.state !== 'cancelled') refuse(run.job.state);
  if (anew) await app.files.remove(runFiles(run.id).root);
  await app.db.transaction(async (manager) => {
    const job = await manager.findOne(Job, { where: { id: run.jobId }, lock: { mode: 'pessimistic_write' } });
    if (!job) throw new NotFound();
    if (job.state !== 'failed' && job.state !== 'cancelled') refuse(job.state);
    await app.jobs.enqueueAgain(manager, job.id);
    await recordActivity(manager, run.projectId, byId, `tried run ${run.number} again`, `runs/${run.id}`);
  });
  const after = await findRun(app, run.id);
  if (!after) throw new NotFound();
  await app.events.publish(run.projectId, presentJobEvent(after.job));
  await app.events.publish(run.projectId, { type: 'changed', what: 'runs', id: run.id, by: byId });
  return after;
}
