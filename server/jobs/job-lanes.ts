import type { JobKind } from '../../shared/contracts/job.ts';

/** What waits for each other: long work, work somebody waits for at the screen, and uploads being taken in. */
export type JobLane = 'long' | 'short' | 'intake';

/** A kind that is done in seconds belongs to `short`, so that it never waits for a run. */
export const JOB_LANES: Record<JobKind, JobLane> = {
  ingest: 'intake',
  run: 'long',
  reproduce: 'long',
  tune: 'long',
  'post-process': 'short',
};

export const jobLanes: readonly JobLane[] = ['long', 'short', 'intake'];

/** Jobs that may work at the same time: of a lane in one process, and of one project over all processes. */
export interface LaneLimit {
  slots: number;
  perProject: number;
}
export type LaneLimits = Record<JobLane, LaneLimit>;

/** The limits that the settings ask for; uploads are taken in one by one, because each may need much memory. */
export function readLaneLimits(jobs: { long: number; short: number; perProject: number }): LaneLimits {
  return {
    long: { slots: jobs.long, perProject: jobs.perProject },
    short: { slots: jobs.short, perProject: jobs.short },
    intake: { slots: 1, perProject: 1 },
  };
}

/** The kinds of a lane. */
export function listKinds(lane: JobLane): JobKind[] {
  return (Object.keys(JOB_LANES) as JobKind[]).filter((kind) => JOB_LANES[kind] === lane);
}
