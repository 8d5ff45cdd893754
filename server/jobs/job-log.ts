import type { DataSource } from 'typeorm';
import type { JobLogLevel } from '../../shared/contracts/queue.ts';
import { JobLogEntry } from '../entities/job-log-entry.ts';

const LONGEST_TEXT = 4_000;

/** Writes a job's log, line by line in order, without holding up the work. */
export class JobLog {
  private writing: Promise<unknown> = Promise.resolve();
  private step: { name: string; sinceMs: number; done: number; total: number } | null = null;

  constructor(
    private readonly db: DataSource,
    private readonly jobId: string,
    /** Whether an earlier attempt may have left work that need not be done again. */
    private readonly isResumed: boolean,
    private readonly now: () => number = Date.now,
  ) {}

  readonly add = (text: string, level: JobLogLevel = 'info'): void => {
    const entry = { jobId: this.jobId, at: new Date(this.now()), level, text: text.slice(0, LONGEST_TEXT) };
    this.writing = this.writing.then(() => this.db.getRepository(JobLogEntry).insert(entry));
    // Rejections are kept for close(); this only says that they are seen.
    this.writing.catch(() => undefined);
  };

  /** Notes a step's begin, and at its end how much was done and how long it took. */
  readonly follow = (name: string, done: number, total: number): void => {
    if (this.step?.name === name) {
      this.step.done = done;
      this.step.total = total;
      return;
    }
    // The next step begins when the last is through, though its last report may have come earlier.
    if (this.step) this.step.done = this.step.total;
    this.endStep();
    this.step = { name, sinceMs: this.now(), done, total };
    const left = this.isResumed && done > 0 ? `, ${done} of ${total} were there already` : '';
    this.add(`${name}: begun${left}.`);
  };

  endStep(): void {
    if (!this.step) return;
    const { name, sinceMs, done, total } = this.step;
    const amount = total > 0 ? `${done} of ${total} in ` : '';
    this.add(`${name}: ${amount}${describeSeconds((this.now() - sinceMs) / 1000)}.`);
    this.step = null;
  }

  /** Waits for the last line; an error of any write is thrown here. */
  async close(): Promise<void> {
    await this.writing;
  }
}

/** A duration as people say it: "0.4 s", "12 s", "3 min 5 s", "2 h 10 min". */
export function describeSeconds(seconds: number): string {
  if (seconds < 10) return `${seconds.toFixed(1)} s`;
  const whole = Math.round(seconds);
  if (whole < 60) return `${whole} s`;
  if (whole < 3600) return `${Math.floor(whole / 60)} min ${whole % 60} s`;
  return `${Math.floor(whole / 3600)} h ${Math.floor((whole % 3600) / 60)} min`;
}
