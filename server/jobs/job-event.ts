import type { Job as JobContract, ProjectEvent } from '../../shared/contracts/job.ts';
import type { Job } from '../entities/job.ts';

export function presentJob(job: Job): JobContract {
  return {
    id: job.id,
    kind: job.kind,
    state: job.state,
    priority: job.priority,
    step: job.step,
    done: job.done,
    total: job.total,
    share: job.share,
    secondsLeft: job.secondsLeft,
    error: job.error,
    queuedAt: job.createdAt.toISOString(),
    startedAt: job.startedAt?.toISOString() ?? null,
    endedAt: job.endedAt?.toISOString() ?? null,
  };
}

/** A job as the event stream carries it. */
export function presentJobEvent(job: Job): ProjectEvent {
  // Only the job that makes a scene or run is shown as its own; other work on it would push that aside.
  const sceneId = job.kind === 'ingest' || job.kind === 'run' ? job.sceneId : null;
  return { type: 'job', sceneId, runId: job.kind === 'run' ? job.runId : null, job: presentJob(job) };
}
