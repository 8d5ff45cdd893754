import { hostname } from 'node:os';
import type { Logger } from 'pino';
import { In, LessThan, Like, type DataSource } from 'typeorm';
import { Job } from '../entities/job.ts';
import { isProcessAlive } from '../is-process-alive.ts';
import type { EventLog } from './event-log.ts';
import { presentJobEvent } from './job-event.ts';
import type { JobHandler } from './job-queue.ts';
import { ProgressMeter } from './progress-meter.ts';

const TICK_MS = 1_000;
const HEARTBEAT_MS = 3_000;
/** A running job without a heartbeat for this long has lost its server. */
const STALE_MS = 30_000;
const MAX_ATTEMPTS = 5;
/** Jobs of a kind at the same time in one process; each already uses all cores through the worker pool. */
const SLOTS: Record<Job['kind'], number> = { ingest: 1, run: 1 };

/** Why a job's work was told to stop. */
type StopReason = 'cancelled' | 'shutdown';

interface Running {
  job: Job;
  abort: AbortController;
  settled: Promise<void>;
}

/** Takes jobs up, one of each kind at a time, keeps their heartbeat, and brings back those whose server died. */
export class JobRunner {
  private readonly owner = `${hostname()}:${process.pid}:${Date.now()}`;
  private readonly running = new Map<string, Running>();
  private timers: NodeJS.Timeout[] = [];
  private ticking: Promise<void> | null = null;
  private stopping = false;

  constructor(
    private readonly db: DataSource,
    private readonly events: EventLog,
    private readonly log: Logger,
    private readonly handlers: Record<Job['kind'], JobHandler>,
  ) {}

  private get jobs() {
    return this.db.getRepository(Job);
  }

  async start(): Promise<void> {
    await this.bringBackOrphans();
    this.timers = [setInterval(() => this.wake(), TICK_MS), setInterval(() => void this.beat(), HEARTBEAT_MS)];
    this.wake();
  }

  /** Stops the work under way and puts it back into the queue, to go on at the next start. */
  async stop(): Promise<void> {
    this.stopping = true;
    this.timers.forEach(clearInterval);
    await this.ticking;
    for (const { abort } of this.running.values()) abort.abort('shutdown' satisfies StopReason);
    await Promise.all([...this.running.values()].map(({ settled }) => settled));
  }

  /** Looks for work now instead of at the next tick. */
  readonly wake = (): void => {
    this.ticking ??= this.tick()
      .catch((error: unknown) => this.log.error({ err: error }, 'looking for jobs failed'))
      .finally(() => (this.ticking = null));
  };

  /** Stops a job of this process that was cancelled; those of other processes see it at their heartbeat. */
  readonly stopCancelled = (jobId: string): void => {
    this.running.get(jobId)?.abort.abort('cancelled' satisfies StopReason);
  };

  /** At start: jobs left by processes of this machine that no longer live. */
  private async bringBackOrphans(): Promise<void> {
    const mine = await this.jobs.find({ where: { state: 'running', owner: Like(`${hostname()}:%`) } });
    for (const job of mine) {
      const pid = Number(job.owner?.split(':')[1]);
      if (!isProcessAlive(pid) || pid === process.pid) await this.bringBack(job);
    }
  }

  private async bringBack(job: Job): Promise<void> {
    const given = job.attempts >= MAX_ATTEMPTS;
    const change = given
      ? {
          state: 'failed' as const,
          endedAt: new Date(),
          error: `The server stopped ${job.attempts} times during this work; it was given up.`,
        }
      : { state: 'queued' as const, step: 'Waiting to go on', owner: null };
    const result = await this.jobs.update({ id: job.id, state: 'running', owner: job.owner ?? undefined }, change);
    if (result.affected) await this.announce(job.id);
  }

  private async tick(): Promise<void> {
    const stale = await this.jobs.find({
      where: { state: 'running', heartbeatAt: LessThan(new Date(Date.now() - STALE_MS)) },
    });
    for (const job of stale) if (!this.running.has(job.id)) await this.bringBack(job);
    for (const kind of Object.keys(SLOTS) as Job['kind'][]) {
      while (!this.stopping && this.countRunning(kind) < SLOTS[kind]) {
        const job = await this.claim(kind);
        if (!job) break;
        this.execute(job);
      }
    }
  }

  private countRunning(kind: Job['kind']): number {
    return [...this.running.values()].filter(({ job }) => job.kind === kind).length;
  }

  private claim(kind: Job['kind']): Promise<Job | null> {
    return this.db.transaction(async (manager) => {
      const [row] = await manager.query<{ id: string }[]>(
        "SELECT id FROM jobs WHERE state = 'queued' AND kind = ? ORDER BY createdAt, id LIMIT 1 FOR UPDATE SKIP LOCKED",
        [kind],
      );
      if (!row) return null;
      const job = await manager.findOneByOrFail(Job, { id: row.id });
      const now = new Date();
      return manager.save(Job, {
        ...job,
        state: 'running' as const,
        owner: this.owner,
        heartbeatAt: now,
        startedAt: job.startedAt ?? now,
        attempts: job.attempts + 1,
      });
    });
  }

  private execute(job: Job): void {
    const abort = new AbortController();
    const settled = this.work(job, abort.signal).finally(() => {
      this.running.delete(job.id);
      if (!this.stopping) this.wake();
    });
    this.running.set(job.id, { job, abort, settled });
  }

  private async work(job: Job, signal: AbortSignal): Promise<void> {
    const meter = new ProgressMeter(job.share, async (progress) => {
      await this.jobs.update({ id: job.id, owner: this.owner }, progress);
      await this.announce(job.id);
    });
    let ending: Partial<Job>;
    try {
      this.log.info({ job: job.id, kind: job.kind, attempt: job.attempts }, 'job started');
      await this.handlers[job.kind]({ job, signal, report: meter.report });
      ending = { state: 'finished', share: 1, secondsLeft: 0, step: 'Finished', error: null };
    } catch (error) {
      ending = this.endingOf(job, signal, error);
    }
    try {
      await meter.close();
      const ended = ending.state === 'queued' ? {} : { endedAt: new Date() };
      await this.jobs.update({ id: job.id, owner: this.owner }, { ...ending, ...ended });
      await this.announce(job.id);
      this.log.info({ job: job.id, kind: job.kind, state: ending.state }, 'job ended');
    } catch (error) {
      // The row stays "running" without a heartbeat, so another tick brings it back.
      this.log.error({ err: error, job: job.id }, 'the end of a job could not be written');
    }
  }

  private endingOf(job: Job, signal: AbortSignal, error: unknown): Partial<Job> {
    const reason = signal.aborted ? (signal.reason as StopReason) : null;
    // An orderly stop is no failed attempt.
    if (reason === 'shutdown') {
      return { state: 'queued', step: 'Waiting to go on', owner: null, attempts: job.attempts - 1 };
    }
    if (reason === 'cancelled') return { state: 'cancelled', step: 'Cancelled', secondsLeft: null };
    this.log.error({ err: error, job: job.id, kind: job.kind }, 'job failed');
    return {
      state: 'failed',
      step: 'Failed',
      secondsLeft: null,
      error: error instanceof Error ? error.message : String(error),
    };
  }

  private async beat(): Promise<void> {
    const ids = [...this.running.keys()];
    if (ids.length === 0) return;
    try {
      await this.jobs.update({ id: In(ids), owner: this.owner }, { heartbeatAt: new Date() });
      const asked = await this.jobs.find({ where: { id: In(ids), cancelAsked: true }, select: { id: true } });
      for (const { id } of asked) this.stopCancelled(id);
    } catch (error) {
      this.log.error({ err: error }, 'heartbeat failed');
    }
  }

  private async announce(jobId: string): Promise<void> {
    const job = await this.jobs.findOneBy({ id: jobId });
    if (job) await this.events.publish(job.projectId, presentJobEvent(job));
  }
}
