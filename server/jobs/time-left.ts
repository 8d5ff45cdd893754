/** A step's pace is taken over the later half of it, and over no less than this. */
const SHORTEST_WINDOW_SECONDS = 4;
const WINDOW_OF_STEP = 0.5;
/** A step says nothing of its pace before this time and, where it has many, so many units. */
const SOONEST_SECONDS = 0.5;
const SOONEST_UNITS = 4;
/** Points kept of a step; beyond, every other one is dropped. */
const MAX_POINTS = 256;

interface Step {
  name: string;
  /** When how many units were done, ascending, from the step's begin. */
  points: { seconds: number; done: number }[];
  fromShare: number;
}

/**
 * Works out the time left of a job of several steps. What is left of the step under way goes by that step's own pace of late; what
 * comes after it, by the pace of the whole job so far. So a wrong guess of how the work is shared out between steps is
 * outgrown as soon as the step that takes the time is under way.
 */
export class TimeLeft {
  private step: Step | null = null;
  private began: { seconds: number; share: number } | null = null;

  /**
   * @param done of `total` units of this step; `share` 0..1 of the whole job
   * @returns seconds left, rounded; null while it is too soon to say
   */
  note(name: string, done: number, total: number, share: number, nowMs: number): number | null {
    const now = nowMs / 1000;
    this.began ??= { seconds: now, share };
    if (this.step?.name !== name) {
      this.step = { name, points: [{ seconds: now, done }], fromShare: share };
      return this.guessWhole(share, now);
    }
    const { points, fromShare } = this.step;
    points.push({ seconds: now, done });
    if (points.length > MAX_POINTS) this.step.points = points.filter((_, i) => i % 2 === 0 || i === points.length - 1);
    const pace = takePace(this.step.points);
    const doneInStep = done - (points[0]?.done ?? 0);
    if (pace === null || total <= 0 || doneInStep < Math.min(SOONEST_UNITS, Math.ceil(total / 8)))
      return this.guessWhole(share, now);
    const unitsLeft = Math.max(0, total - done);
    const sharePerUnit = (share - fromShare) / doneInStep;
    const after = Math.max(0, 1 - share - sharePerUnit * unitsLeft);
    return Math.round(unitsLeft / pace + after * (this.secondsPerShare(share, now) ?? 0));
  }

  private secondsPerShare(share: number, now: number): number | null {
    const { began } = this;
    if (!began || share - began.share <= 0.01 || now - began.seconds < SOONEST_SECONDS) return null;
    return (now - began.seconds) / (share - began.share);
  }

  private guessWhole(share: number, now: number): number | null {
    const perShare = this.secondsPerShare(share, now);
    return perShare === null ? null : Math.round(perShare * (1 - share));
  }
}

/** Units a second over the later part of a step; null before it can be told. */
function takePace(points: Step['points']): number | null {
  const [first] = points;
  const last = points.at(-1);
  if (!first || !last || last.seconds - first.seconds < SOONEST_SECONDS) return null;
  const window = Math.max(SHORTEST_WINDOW_SECONDS, WINDOW_OF_STEP * (last.seconds - first.seconds));
  const from = points.findLast(({ seconds }) => seconds <= last.seconds - window) ?? first;
  return last.done > from.done ? (last.done - from.done) / (last.seconds - from.seconds) : null;
}
