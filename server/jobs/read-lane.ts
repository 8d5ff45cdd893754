import { In, type EntityManager } from 'typeorm';
import { Job } from '../entities/job.ts';
import type { LaneState } from './fair-order.ts';
import { listKinds, type JobLane, type LaneLimits } from './job-lanes.ts';

/** How a lane stands over all processes. */
export async function readLane(
  manager: EntityManager,
  lane: JobLane,
  limits: LaneLimits,
): Promise<LaneState & { running: Job[]; queued: Job[] }> {
  const kinds = listKinds(lane);
  if (kinds.length === 0) {
    return { waiting: [], working: new Map(), servedAtMs: new Map(), perProject: 1, running: [], queued: [] };
  }
  const jobs = await manager.find(Job, { where: { kind: In(kinds), state: In(['running', 'queued']) } });
  const running = jobs.filter(({ state }) => state === 'running');
  const queued = jobs.filter(({ state }) => state === 'queued');
  const working = new Map<string, number>();
  for (const { projectId } of running) working.set(projectId, (working.get(projectId) ?? 0) + 1);
  const servedAtMs = new Map<string, number>();
  const projectIds = [...new Set(queued.map(({ projectId }) => projectId))];
  if (projectIds.length > 0) {
    const rows = await manager
      .createQueryBuilder(Job, 'job')
      .select('job.projectId', 'projectId')
      .addSelect('MAX(job.startedAt)', 'servedAt')
      .where({ kind: In(kinds), projectId: In(projectIds) })
      .groupBy('job.projectId')
      .getRawMany<{ projectId: string; servedAt: Date | null }>();
    for (const { projectId, servedAt } of rows) if (servedAt) servedAtMs.set(projectId, servedAt.getTime());
  }
  return {
    waiting: queued.map(({ id, projectId, priority, place, createdAt }) => ({
      ...{ id, projectId, priority, place },
      queuedAtMs: createdAt.getTime(),
    })),
    working,
    servedAtMs,
    perProject: limits[lane].perProject,
    running,
    queued,
  };
}
