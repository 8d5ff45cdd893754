import type { JobPriority } from '../../shared/contracts/job.ts';

/** A job that waits, as far as the order is concerned. */
export interface WaitingJob {
  id: string;
  projectId: string;
  priority: JobPriority;
  /** Where a site administrator put it; null for its fair turn. */
  place: number | null;
  queuedAtMs: number;
}

/** What the next turn depends on, of one lane. */
export interface LaneState {
  waiting: readonly WaitingJob[];
  /** Jobs at work, by project. */
  working: ReadonlyMap<string, number>;
  /** When a project was last served, ms; a project that is missing never was. */
  servedAtMs: ReadonlyMap<string, number>;
  /** Jobs of one project that may work at the same time. */
  perProject: number;
}

const RANK: Record<JobPriority, number> = { high: 0, normal: 1, low: 2 };

/**
 * The job whose turn it is: what a site administrator placed, in that order; then of the project with the fewest jobs at work,
 * among those the one served longest ago. Within the project high goes before normal before low, then the oldest. A
 * project at its limit is passed over. So a project with a hundred jobs waiting holds nobody up for longer than one job.
 * @returns null when no job may start
 */
export function pickNext({ waiting, working, servedAtMs, perProject }: LaneState): WaitingJob | null {
  const free = waiting.filter(({ projectId }) => (working.get(projectId) ?? 0) < perProject);
  const placed = free.filter(({ place }) => place !== null);
  if (placed.length > 0) return findFirst(placed, (a, b) => (a.place ?? 0) - (b.place ?? 0) || byAge(a, b));
  const atWork = (job: WaitingJob) => working.get(job.projectId) ?? 0;
  const served = (job: WaitingJob) => servedAtMs.get(job.projectId) ?? Number.NEGATIVE_INFINITY;
  const turn = findFirst(free, (a, b) => atWork(a) - atWork(b) || Math.sign(served(a) - served(b)) || byAge(a, b));
  if (!turn) return null;
  const own = free.filter(({ projectId }) => projectId === turn.projectId);
  return findFirst(own, (a, b) => RANK[a.priority] - RANK[b.priority] || byAge(a, b));
}

function byAge(a: WaitingJob, b: WaitingJob): number {
  return a.queuedAtMs - b.queuedAtMs || (a.id < b.id ? -1 : 1);
}

function findFirst(jobs: readonly WaitingJob[], compare: (a: WaitingJob, b: WaitingJob) => number): WaitingJob | null {
  return jobs.reduce<WaitingJob | null>((best, job) => (best && compare(best, job) <= 0 ? best : job), null);
}

/** A waiting job's turn, as things stand. */
export interface Turn {
  id: string;
  /** 1 is next. */
  position: number;
  /** Expected seconds until it starts; null where how long something before it takes is unknown. */
  startsInSeconds: number | null;
}

interface Working {
  projectId: string;
  /** Null where unknown. */
  endsInSeconds: number | null;
}

/** Stands in for what is unknown, so that there is an order all the same. */
const UNKNOWN_SECONDS = 60;

/**
 * Plays the lane through to its end: who starts when, if every job takes as long as expected.
 * @param secondsOf expected duration of a waiting job; null where such work was never done
 */
export function forecastTurns(
  state: Omit<LaneState, 'working'>,
  working: readonly Working[],
  slots: number,
  secondsOf: (id: string) => number | null,
): Turn[] {
  const atWork = working.map(({ projectId, endsInSeconds }) => ({
    projectId,
    end: endsInSeconds ?? UNKNOWN_SECONDS,
    isKnown: endsInSeconds !== null,
  }));
  let waiting = [...state.waiting];
  const servedAtMs = new Map(state.servedAtMs);
  // Beyond all that was, so that whoever is served in the forecast was served last.
  let served = Math.max(0, ...servedAtMs.values());
  let now = 0;
  let isKnown = true;
  const turns: Turn[] = [];
  while (waiting.length > 0) {
    const counts = new Map<string, number>();
    for (const { projectId } of atWork) counts.set(projectId, (counts.get(projectId) ?? 0) + 1);
    const next = atWork.length < slots ? pickNext({ ...state, waiting, servedAtMs, working: counts }) : null;
    if (!next) {
      atWork.sort((a, b) => a.end - b.end);
      const ended = atWork.shift();
      // Nothing works and nothing may start: a limit of none, which the settings rule out.
      if (!ended) break;
      now = Math.max(now, ended.end);
      isKnown &&= ended.isKnown;
      continue;
    }
    turns.push({ id: next.id, position: turns.length + 1, startsInSeconds: isKnown ? Math.round(now) : null });
    const seconds = secondsOf(next.id);
    atWork.push({ projectId: next.projectId, end: now + (seconds ?? UNKNOWN_SECONDS), isKnown: seconds !== null });
    servedAtMs.set(next.projectId, ++served);
    waiting = waiting.filter(({ id }) => id !== next.id);
  }
  return turns;
}
