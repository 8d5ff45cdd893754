import { In, type DataSource, type EntityManager } from 'typeorm';
import { Job } from '../entities/job.ts';
import { presentJobEvent } from './job-event.ts';
import type { EventLog } from './event-log.ts';
import type { JobQueue, JobRequest } from './job-queue.ts';

/** The queue as a MariaDB table. */
export class DatabaseJobQueue implements JobQueue {
  constructor(
    private readonly db: DataSource,
    private readonly events: EventLog,
    private readonly wake: { now: () => void; cancelled: (jobId: string) => void },
  ) {}

  async enqueue(manager: EntityManager, request: JobRequest): Promise<Job> {
    const { id } = await manager.save(
      Job,
      manager.create(Job, {
        sceneId: null,
        runId: null,
        subjectId: null,
        ...request,
        state: 'queued',
        step: 'Waiting',
      }),
    );
    setImmediate(this.wake.now);
    return manager.findOneByOrFail(Job, { id });
  }

  async enqueueAgain(manager: EntityManager, jobId: string): Promise<void> {
    await manager.update(
      Job,
      { id: jobId, state: In(['failed', 'cancelled']) },
      {
        ...{ state: 'queued', step: 'Waiting', done: 0, total: 0, share: 0, secondsLeft: null, error: null },
        ...{ cancelAsked: false, attempts: 0, owner: null, startedAt: null, endedAt: null, place: null },
      },
    );
    setImmediate(this.wake.now);
  }

  async cancel(jobId: string): Promise<void> {
    const jobs = this.db.getRepository(Job);
    const ended = await jobs.update(
      { id: jobId, state: 'queued' },
      { state: 'cancelled', cancelAsked: true, endedAt: new Date(), step: 'Cancelled' },
    );
    await jobs.update({ id: jobId, state: In(['running']) }, { cancelAsked: true });
    this.wake.cancelled(jobId);
    if (ended.affected) {
      const job = await jobs.findOneByOrFail({ id: jobId });
      await this.events.publish(job.projectId, presentJobEvent(job));
    }
  }
}
