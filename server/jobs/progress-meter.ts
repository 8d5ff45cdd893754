import { TimeLeft } from './time-left.ts';

const WRITE_EVERY_MS = 500;

export interface Progress {
  step: string;
  done: number;
  total: number;
  share: number;
  secondsLeft: number | null;
}

/** Thins a stream of progress to a write every half second and works out the time left. */
export class ProgressMeter {
  private readonly timeLeft = new TimeLeft();
  private latest: Progress | null = null;
  private writing: Promise<void> = Promise.resolve();
  private timer: NodeJS.Timeout | null = null;

  constructor(private readonly write: (progress: Progress) => Promise<void>) {}

  readonly report = (step: string, done: number, total: number, share: number): void => {
    const bounded = Math.min(1, Math.max(0, share));
    this.latest = {
      step,
      done,
      total,
      share: bounded,
      secondsLeft: this.timeLeft.note(step, done, total, bounded, Date.now()),
    };
    this.timer ??= setTimeout(() => {
      this.timer = null;
      this.flush();
    }, WRITE_EVERY_MS);
  };

  /** Waits for the last write; an error of any write is thrown here. */
  async close(): Promise<void> {
    if (this.timer) clearTimeout(this.timer);
    this.timer = null;
    this.flush();
    await this.writing;
  }

  private flush(): void {
    const progress = this.latest;
    if (!progress) return;
    this.latest = null;
    this.writing = this.writing.then(() => this.write(progress));
    // Rejections are kept for close(); this only says that they are seen.
    this.writing.catch(() => undefined);
  }
}
