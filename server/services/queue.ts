import { In, IsNull, Not } from 'typeorm';
import type { JobPriority } from '../../shared/contracts/job.ts';
import type { QueueEntry } from '../../shared/contracts/queue.ts';
import type { App } from '../app-context.ts';
import { JobLogEntry } from '../entities/job-log-entry.ts';
import { Job } from '../entities/job.ts';
import { Project } from '../entities/project.ts';
import { Run } from '../entities/run.ts';
import { Scene } from '../entities/scene.ts';
import { Tuning } from '../entities/tuning.ts';
import { Conflict } from '../errors.ts';
import { forecastTurns } from '../jobs/fair-order.ts';
import { JOB_LANES, jobLanes, readLaneLimits } from '../jobs/job-lanes.ts';
import { presentJobEvent } from '../jobs/job-event.ts';
import { readLane } from '../jobs/read-lane.ts';
import { recordActivity } from './activities.ts';
import { cancelRun, findRun } from './runs.ts';

/** Ended jobs from which the duration of such work is taken. */
const JOBS_LOOKED_AT = 20;

export function findJob(app: App, id: string): Promise<Job | null> {
  return app.db.getRepository(Job).findOneBy({ id });
}

/** All work of the site that is under way or waits, in the order of its turns, lane by lane. */
export async function readQueue(app: App): Promise<{ job: Job; entry: QueueEntry }[]> {
  const limits = readLaneLimits(app.config.jobs);
  const rows: { job: Job; entry: QueueEntry }[] = [];
  for (const lane of jobLanes) {
    const state = await readLane(app.db.manager, lane, limits);
    const seconds = await expectSeconds(app, state.queued);
    const working = state.running.map(({ projectId, secondsLeft }) => ({ projectId, endsInSeconds: secondsLeft }));
    const turns = forecastTurns(state, working, limits[lane].slots, (id) => seconds.get(id) ?? null);
    const started = state.running.toSorted((a, b) => Number(a.startedAt) - Number(b.startedAt));
    for (const job of started) rows.push({ job, entry: toEntry(job, null) });
    for (const turn of turns) {
      const job = state.queued.find(({ id }) => id === turn.id);
      if (job) rows.push({ job, entry: toEntry(job, turn) });
    }
  }
  await fillTitles(app, rows);
  return rows;
}

function toEntry(job: Job, turn: { position: number; startsInSeconds: number | null } | null): QueueEntry {
  return {
    jobId: job.id,
    title: '',
    kind: job.kind,
    lane: JOB_LANES[job.kind],
    runId: job.runId,
    projectName: null,
    state: turn ? 'queued' : 'running',
    priority: job.priority,
    isPlaced: job.place !== null,
    position: turn?.position ?? null,
    step: job.step,
    share: job.share,
    secondsLeft: turn ? null : job.secondsLeft,
    startsInSeconds: turn?.startsInSeconds ?? null,
    queuedAt: job.createdAt.toISOString(),
  };
}

/** How long waiting jobs may take: the median of the last ones of their kind, of the project where it has any. */
async function expectSeconds(app: App, waiting: readonly Job[]): Promise<Map<string, number>> {
  const kinds = [...new Set(waiting.map(({ kind }) => kind))];
  const expected = new Map<string, number>();
  for (const kind of kinds) {
    const find = (where: object) =>
      app.db.getRepository(Job).find({
        where: { kind, state: 'finished' as const, startedAt: Not(IsNull()), endedAt: Not(IsNull()), ...where },
        order: { endedAt: 'DESC' },
        take: JOBS_LOOKED_AT,
      });
    const all = takeMedian(await find({}));
    for (const projectId of new Set(waiting.filter((job) => job.kind === kind).map((job) => job.projectId))) {
      const seconds = takeMedian(await find({ projectId })) ?? all;
      if (seconds === null) continue;
      for (const job of waiting) if (job.kind === kind && job.projectId === projectId) expected.set(job.id, seconds);
    }
  }
  return expected;
}

function takeMedian(ended: readonly Job[]): number | null {
  const seconds = ended.map(({ startedAt, endedAt }) => (Number(endedAt) - Number(startedAt)) / 1000);
  seconds.sort((a, b) => a - b);
  return seconds[Math.floor(seconds.length / 2)] ?? null;
}

async function fillTitles(app: App, rows: readonly { job: Job; entry: QueueEntry }[]): Promise<void> {
  const ids = (pick: (job: Job) => string | null) => In([...new Set(rows.flatMap(({ job }) => pick(job) ?? []))]);
  const { db } = app;
  const runs = await db.getRepository(Run).find({
    where: { id: ids(({ runId }) => runId) },
    select: { id: true, number: true, name: true },
  });
  const scenes = await db.getRepository(Scene).find({
    where: { id: ids(({ sceneId }) => sceneId) },
    select: { id: true, name: true },
  });
  const tunings = await db.getRepository(Tuning).find({
    where: { id: ids(({ subjectId }) => subjectId) },
    select: { id: true, name: true },
  });
  const projects = await db.getRepository(Project).find({
    where: { id: ids(({ projectId }) => projectId) },
    select: { id: true, name: true },
  });
  for (const { job, entry } of rows) {
    const run = runs.find(({ id }) => id === job.runId);
    const runTitle = run ? `Run ${run.number}${run.name ? ` (${run.name})` : ''}` : 'A run';
    const sceneName = scenes.find(({ id }) => id === job.sceneId)?.name ?? 'a scene';
    const tuningName = tunings.find(({ id }) => id === job.subjectId)?.name;
    entry.projectName = projects.find(({ id }) => id === job.projectId)?.name ?? null;
    switch (job.kind) {
      case 'ingest':
        entry.title = `Taking in ${sceneName}`;
        break;
      case 'reproduce':
        entry.title = `Reproducing ${runTitle}`;
        break;
      case 'post-process':
        entry.title = `Post-processing of ${runTitle}`;
        break;
      case 'tune':
        entry.title = tuningName ? `Tuning (${tuningName})` : 'Tuning';
        break;
      case 'run':
        entry.title = runTitle;
    }
  }
}

/** The queue as a project's members may see it: of others' work only that it is there. */
export function hideOthers(rows: readonly { job: Job; entry: QueueEntry }[], projectId: string): QueueEntry[] {
  return rows.map(({ job, entry }) =>
    job.projectId === projectId
      ? { ...entry, projectName: null }
      : {
          ...entry,
          ...{ jobId: null, title: 'Work of another project', runId: null, projectName: null, step: '' },
        },
  );
}

/** Changes which of a project's waiting jobs goes first. @throws Conflict when it no longer waits */
export async function setPriority(app: App, job: Job, priority: JobPriority, byId: string): Promise<Job> {
  const jobs = app.db.getRepository(Job);
  const { affected } = await jobs.update({ id: job.id, state: 'queued' }, { priority });
  const after = await jobs.findOneByOrFail({ id: job.id });
  if (!affected && after.state !== 'queued') {
    throw new Conflict(
      'The work does not wait any more.',
      { found: `it is ${after.state}`, wanted: 'work that waits' },
      'not-waiting',
    );
  }
  await app.db.transaction((manager) =>
    recordActivity(manager, job.projectId, byId, `set a waiting job to ${priority} priority`, 'runs'),
  );
  await app.events.publish(job.projectId, presentJobEvent(after));
  return after;
}

/** Cancels any job that waits or works. @throws Conflict when it has ended */
export async function cancelJob(app: App, job: Job, byId: string): Promise<Job> {
  if (job.state !== 'queued' && job.state !== 'running') {
    throw new Conflict('The work has ended already.', { found: `it is ${job.state}` }, 'job-ended');
  }
  if (job.kind === 'ingest') {
    throw new Conflict(
      'A scene that is being taken in is stopped at the scene itself.',
      { found: 'a scene being taken in', advice: 'Open the scene and stop it there.' },
      'not-here',
    );
  }
  const run = job.kind === 'run' && job.runId ? await findRun(app, job.runId) : null;
  if (run) await cancelRun(app, run, byId);
  else await app.jobs.cancel(job.id);
  return app.db.getRepository(Job).findOneByOrFail({ id: job.id });
}

/** Puts waiting jobs before all others, in the order given; those left out wait for their fair turn. */
export async function orderQueue(app: App, jobIds: readonly string[]): Promise<void> {
  await app.db.transaction(async (manager) => {
    await manager.update(Job, { state: 'queued', place: Not(IsNull()) }, { place: null });
    for (const [i, id] of [...new Set(jobIds)].entries()) {
      await manager.update(Job, { id, state: 'queued' }, { place: i + 1 });
    }
  });
}

/** A job's log, oldest line first. */
export function readJobLog(app: App, jobId: string): Promise<JobLogEntry[]> {
  return app.db.getRepository(JobLogEntry).find({ where: { jobId }, order: { id: 'ASC' } });
}

/** The log as text, a line an entry: instant, level where it is no plain information, text. */
export function printJobLog(entries: readonly JobLogEntry[]): string {
  return entries
    .map(({ at, level, text }) => {
      const mark = level === 'info' ? '' : `${level.toUpperCase()}: `;
      return `${at.toISOString()}  ${mark}${text.replace(/\s+/g, ' ')}\n`;
    })
    .join('');
}
