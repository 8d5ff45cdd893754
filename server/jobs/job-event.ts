import type { Job as JobContract, ProjectEvent } from '../../shared/contracts/job.ts';
import type { Job } from '../entities/job.ts';

export function presentJob(job: Job): JobContract {
  return {
    id: job.id,
    kind: job.kind,
    state: job.state,
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
  return { type: 'job', sceneId: job.sceneId, runId: job.runId, job: presentJob(job) };
}
