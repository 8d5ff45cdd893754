import { hostname } from 'node:os';
import type { Logger } from 'pino';
import { In, LessThan, Like, type DataSource } from 'typeorm';
import type { JobLogLevel } from '../../shared/contracts/queue.ts';
import { Job } from '../entities/job.ts';
import { isProcessAlive } from '../is-process-alive.ts';
import type { EventLog } from './event-log.ts';
import { claimJob } from './claim-job.ts';
import { presentJobEvent } from './job-event.ts';
import { JOB_LANES, jobLanes, listKinds, type JobLane, type LaneLimits } from './job-lanes.ts';
import { describeSeconds, JobLog } from './job-log.ts';
import type { JobHandler } from './job-queue.ts';
import { ProgressMeter } from './progress-meter.ts';

const TICK_MS = 1_000;
const HEARTBEAT_MS = 3_000;
/** How soon work of this process stops that another process was asked to cancel. */
const CANCEL_LOOK_MS = 400;
/** A running job without a heartbeat for this long has lost its server. */
const STALE_MS = 30_000;
const MAX_ATTEMPTS = 5;

/** Why a job's work was told to stop. */
type StopReason = 'cancelled' | 'shutdown';

interface Running {
  job: Job;
  abort: AbortController;
  settled: Promise<void>;
}

/** Takes jobs up as their turn comes in each lane, keeps their heartbeat, and brings back those whose server died. */
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
    private readonly limits: LaneLimits,
  ) {}

  private get jobs() {
    return this.db.getRepository(Job);
  }

  async start(): Promise<void> {
    await this.bringBackOrphans();
    this.timers = [
      setInterval(() => this.wake(), TICK_MS),
      setInterval(() => void this.beat(), HEARTBEAT_MS),
      setInterval(() => void this.stopAsked(), CANCEL_LOOK_MS),
    ];
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

  /** Stops a job of this process that was cancelled; those of other processes see it at their next look. */
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
    for (const lane of jobLanes) {
      while (!this.stopping && this.countRunning(lane) < this.limits[lane].slots) {
        if (!(await this.hasWaiting(lane))) break;
        const job = await claimJob(this.db, lane, this.limits, this.owner);
        if (!job) break;
        this.execute(job);
      }
    }
  }

  private countRunning(lane: JobLane): number {
    return [...this.running.values()].filter(({ job }) => JOB_LANES[job.kind] === lane).length;
  }

  /** Asked before the lock is taken, so that idle processes do not queue for it every second. */
  private hasWaiting(lane: JobLane): Promise<boolean> {
    const kinds = listKinds(lane);
    return kinds.length > 0 ? this.jobs.existsBy({ state: 'queued', kind: In(kinds) }) : Promise.resolve(false);
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
    const meter = new ProgressMeter(async (progress) => {
      await this.jobs.update({ id: job.id, owner: this.owner }, progress);
      await this.announce(job.id);
    });
    const log = new JobLog(this.db, job.id, job.attempts > 1);
    const began = Date.now();
    const report = (step: string, done: number, total: number, share: number): void => {
      log.follow(step, done, total);
      meter.report(step, done, total, share);
    };
    let ending: Partial<Job>;
    try {
      log.add(job.attempts > 1 ? `Taken up again, attempt ${job.attempts}.` : 'Taken up.');
      this.log.info({ job: job.id, kind: job.kind, attempt: job.attempts }, 'job started');
      await this.handlers[job.kind]({ job, signal, report, note: log.add });
      ending = { state: 'finished', share: 1, secondsLeft: 0, step: 'Finished', error: null };
    } catch (error) {
      ending = this.endingOf(job, signal, error);
    }
    try {
      log.endStep();
      log.add(...describeEnding(ending, (Date.now() - began) / 1000));
      await meter.close();
      await log.close();
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
    } catch (error) {
      this.log.error({ err: error }, 'heartbeat failed');
    }
  }

  private async stopAsked(): Promise<void> {
    const ids = [...this.running.keys()];
    if (ids.length === 0) return;
    try {
      const asked = await this.jobs.find({ where: { id: In(ids), cancelAsked: true }, select: { id: true } });
      for (const { id } of asked) this.stopCancelled(id);
    } catch (error) {
      this.log.error({ err: error }, 'looking for cancelled jobs failed');
    }
  }

  private async announce(jobId: string): Promise<void> {
    const job = await this.jobs.findOneBy({ id: jobId });
    if (job) await this.events.publish(job.projectId, presentJobEvent(job));
  }
}

/** The last line of an attempt in a job's log. */
function describeEnding({ state, error }: Partial<Job>, seconds: number): [string, JobLogLevel] {
  const after = `after ${describeSeconds(seconds)}`;
  switch (state) {
    case 'finished':
      return [`Finished ${after}.`, 'info'];
    case 'cancelled':
      return [`Cancelled ${after}.`, 'warning'];
    case 'failed':
      return [`Failed ${after}: ${error ?? 'no reason was given'}`, 'error'];
    default:
      return [`Stopped ${after}, because the server closed; it goes on from here at the next start.`, 'warning'];
  }
}
