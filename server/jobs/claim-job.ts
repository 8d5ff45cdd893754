import type { DataSource } from 'typeorm';
import { Job } from '../entities/job.ts';
import { pickNext } from './fair-order.ts';
import type { JobLane, LaneLimits } from './job-lanes.ts';
import { readLane } from './read-lane.ts';

const LOCK_SECONDS = 5;

/**
 * Takes up the job whose turn it is in a lane, for one process among several: they choose one after the other, so that no limit
 * is passed and no job taken twice.
 * @returns null when none may start now
 */
export async function claimJob(db: DataSource, lane: JobLane, limits: LaneLimits, owner: string): Promise<Job | null> {
  const runner = db.createQueryRunner();
  try {
    // A lock of MariaDB belongs to the connection and goes with it; each database has its own.
    const [lock] = (await runner.query("SELECT GET_LOCK(CONCAT(DATABASE(), ':jobs'), ?) AS held", [LOCK_SECONDS])) as {
      held: number | null;
    }[];
    if (Number(lock?.held) !== 1) return null;
    try {
      const next = pickNext(await readLane(runner.manager, lane, limits));
      if (!next) return null;
      const job = await runner.manager.findOneByOrFail(Job, { id: next.id });
      const now = new Date();
      const taken = {
        ...{ state: 'running' as const, owner, heartbeatAt: now, startedAt: now, attempts: job.attempts + 1 },
        place: null,
      };
      const { affected } = await runner.manager.update(Job, { id: next.id, state: 'queued' }, taken);
      return affected ? { ...job, ...taken } : null;
    } finally {
      await runner.query("SELECT RELEASE_LOCK(CONCAT(DATABASE(), ':jobs'))");
    }
  } finally {
    await runner.release();
  }
}
