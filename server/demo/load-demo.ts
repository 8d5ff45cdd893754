import { setTimeout as sleep } from 'node:timers/promises';
import type { App } from '../app-context.ts';
import { Job } from '../entities/job.ts';
import { Project } from '../entities/project.ts';
import { SiteSetting } from '../entities/site-setting.ts';
import { User } from '../entities/user.ts';
import { isSiteEmpty } from '../services/first-admin.ts';
import { deleteProjectWhole } from '../services/projects.ts';
import { shareDemoWork } from './demo-blocks.ts';
import { judgeDemoRun } from './demo-design.ts';
import { addDemoPeople, addDemoScheme, createDemoProject } from './demo-project.ts';
import { DEMO_PASSWORD, DEMO_PEOPLE } from './demo-people.ts';
import { drawDemoSamples } from './demo-samples.ts';
import { setUpDemoBands, uploadDemoScenes } from './demo-scenes.ts';
import { startDemoRun } from './demo-run.ts';
import { withIslandFiles } from './with-island-files.ts';

const SETTING = 'demo';
const POLL_MS = 200;

/** Thrown when the server stops while the demo is being loaded; the next start begins it anew. */
class Interrupted extends Error {}

/**
 * Loads the demo into an empty site, once; a load that was cut short is cleared away and begun anew.
 * Resolves to the lines that tell how to sign in, or to none where there is no demo.
 * @param say told of each step
 */
export async function loadDemoOnce(app: App, say: (line: string) => void, signal: AbortSignal): Promise<string[]> {
  const settings = app.db.getRepository(SiteSetting);
  const state = (await settings.findOneBy({ name: SETTING }))?.value ?? null;
  if (state === null) {
    if (!(await isSiteEmpty(app))) return [];
    await settings.save({ name: SETTING, value: 'loading' });
  }
  if (state === 'loading') await clearHalfLoaded(app);
  if (state !== 'loaded') {
    try {
      await load(app, say, signal);
    } catch (error) {
      if (error instanceof Interrupted || signal.aborted) return [];
      throw error;
    }
    await settings.save({ name: SETTING, value: 'loaded' });
  }
  return describeAccounts(app);
}

async function load(app: App, say: (line: string) => void, signal: AbortSignal): Promise<void> {
  const startedAt = Date.now();
  say('Loading the demo, the Isle of Vennory, once. It takes about a minute…');
  const people = await addDemoPeople(app);
  const project = await createDemoProject(app, people.lead);
  await withIslandFiles(app, async (island) => {
    stopIf(signal);
    say('  the island is made; taking in its scenes');
    const [spring, lateSummer] = await uploadDemoScenes(app, project.id, people.lead, island.scenes);
    await waitForJob(app, { sceneId: spring }, signal);
    await waitForJob(app, { sceneId: lateSummer }, signal);
    await setUpDemoBands(app, people.lead, [spring, lateSummer], island.scenes);
    const classIds = await addDemoScheme(app, project.id, people.lead);
    say('  drawing the samples of two labellers');
    await drawDemoSamples(app, project.id, lateSummer, classIds, people, island.samples, () => stopIf(signal));
    say('  running the first classification');
    const runId = await startDemoRun(app, project.id, people.modeller, lateSummer, classIds);
    await waitForJob(app, { runId }, signal);
    say('  sharing the work in blocks, reviewing the samples');
    await shareDemoWork(app, project.id, people);
    say('  two reviewers judge its map by reference points');
    await judgeDemoRun(app, project.id, runId, people, island.trueClass);
  });
  say(`  the demo is ready after ${Math.round((Date.now() - startedAt) / 1000)} s`);
}

function stopIf(signal: AbortSignal): void {
  if (signal.aborted) throw new Interrupted('the server stops');
}

/** Waits for the end of a demo job. @throws when it did not finish well */
async function waitForJob(
  app: App,
  which: { sceneId: string } | { runId: string },
  signal: AbortSignal,
): Promise<void> {
  for (;;) {
    stopIf(signal);
    const job = await app.db
      .getRepository(Job)
      .findOneByOrFail('runId' in which ? { ...which, kind: 'run' } : { ...which, kind: 'ingest' });
    if (job.state === 'finished') return;
    if (job.state === 'failed' || job.state === 'cancelled') {
      throw new Error(`The demo could not be loaded: its ${job.kind} job is ${job.state}: ${job.error ?? job.step}`);
    }
    await sleep(POLL_MS);
  }
}

/** Before the demo is loaded nobody can have signed in, so all there is was left by a load that was cut short. */
async function clearHalfLoaded(app: App): Promise<void> {
  for (const { id } of await app.db.getRepository(Project).find({ select: { id: true } }))
    await deleteProjectWhole(app, id);
  await app.db.getRepository(User).createQueryBuilder().delete().execute();
}

/** Accounts that still stand, whose password is the demo's. */
async function describeAccounts(app: App): Promise<string[]> {
  const users = await app.db.getRepository(User).find({ select: { email: true } });
  const emails = new Set(users.map(({ email }) => email));
  const accounts = DEMO_PEOPLE.filter(({ email }) => emails.has(email));
  if (accounts.length === 0) return [];
  return [
    `Demo accounts, password ${DEMO_PASSWORD} unless it was changed:`,
    ...accounts.map(({ email, name }) => `  ${email.padEnd(30)}${name}`),
  ];
}
