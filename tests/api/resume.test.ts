import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { readdir } from 'node:fs/promises';
import { createServer, type AddressInfo } from 'node:net';
import { join } from 'node:path';
import { pino } from 'pino';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createDataSource } from '../../server/data-source.ts';
import { Job } from '../../server/entities/job.ts';
import { openApp } from '../../server/start-server.ts';
import type { Reproduction } from '../../shared/contracts/reproduction.ts';
import type { Run } from '../../shared/contracts/run.ts';
import { makeTeam, type Team } from '../factories/make-project.ts';
import { makeRunGround, type RunGround } from '../factories/make-run-ground.ts';
import { PASSWORD } from '../factories/make-user.ts';
import { makeTestConfig, type Agent } from '../factories/test-app.ts';
import { waitForRun } from '../factories/wait-for-run.ts';

const repository = join(import.meta.dirname, '../..');

let test: Awaited<ReturnType<typeof makeTestConfig>>;
let team: Team;
let ground: RunGround;
let port: number;
let server: ChildProcess | null = null;

async function findFreePort(): Promise<number> {
  const probe = createServer().listen(0, '127.0.0.1');
  await once(probe, 'listening');
  const { port: free } = probe.address() as AddressInfo;
  probe.close();
  await once(probe, 'close');
  return free;
}

/** What a process of its own needs to work on the test's database and files. */
function describeEnvironment(threads: number): NodeJS.ProcessEnv {
  const { db, dataDir, sessionSecret } = test.config;
  return {
    PATH: process.env['PATH'],
    TSX_TSCONFIG_PATH: join(repository, 'server/tsconfig.json'),
    NODE_ENV: 'test',
    GROUNDSEL_PORT: String(port),
    GROUNDSEL_DATA_DIR: dataDir,
    GROUNDSEL_DB_HOST: db.host,
    GROUNDSEL_DB_PORT: String(db.port),
    GROUNDSEL_DB_USER: db.user,
    GROUNDSEL_DB_PASSWORD: db.password,
    GROUNDSEL_DB_NAME: db.name,
    GROUNDSEL_SESSION_SECRET: sessionSecret,
    GROUNDSEL_WORKER_THREADS: String(threads),
    GROUNDSEL_DEMO: 'off',
    GROUNDSEL_LOG_LEVEL: 'error',
  };
}

/** Starts the server as a process of its own. */
async function startServer(threads: number): Promise<void> {
  const child = spawn(process.execPath, ['--import', 'tsx', 'server/main.ts'], {
    cwd: repository,
    stdio: ['ignore', 'pipe', 'pipe'],
    env: describeEnvironment(threads),
  });
  server = child;
  let said = '';
  for (const stream of [child.stdout, child.stderr]) stream.on('data', (part: Buffer) => (said += part.toString()));
  const until = Date.now() + 30_000;
  while (!said.includes('Groundsel is open')) {
    if (child.exitCode !== null || Date.now() > until) throw new Error(`the server did not start: ${said}`);
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}

/** As a power cut does it: no chance to tidy up. */
async function killServer(): Promise<void> {
  if (!server || server.exitCode !== null || server.signalCode !== null) return;
  server.kill('SIGKILL');
  await once(server, 'exit');
}

async function signIn(): Promise<Agent> {
  const agent = request.agent(`http://127.0.0.1:${port}`);
  await agent.post('/api/v1/session').send({ email: team.modeller.email, password: PASSWORD }).expect(200);
  return agent;
}

async function startRun(agent: Agent): Promise<string> {
  const path = `/api/v1/projects/${team.project.id}/runs`;
  const { body } = await agent.post(path).send({ recipe: ground.recipe }).expect(201);
  return (body as Run).id;
}

async function countFiles(runId: string, folder: string): Promise<string[]> {
  const dir = join(test.config.dataDir, 'files/runs', runId, folder);
  const names = await readdir(dir).catch((error: NodeJS.ErrnoException) => {
    if (error.code === 'ENOENT') return [];
    throw error;
  });
  return names.filter((name) => name.endsWith('.bin'));
}

/** Waits until an attempt under way has left at least so many files of a kind behind. */
async function waitForFiles(runId: string, folder: string, atLeast: number): Promise<string[]> {
  const until = Date.now() + 40_000;
  for (;;) {
    const names = await countFiles(runId, folder);
    if (names.length >= atLeast) return names;
    if (Date.now() > until) throw new Error(`only ${names.length} files in ${folder}`);
    await new Promise((resolve) => setTimeout(resolve, 15));
  }
}

beforeAll(async () => {
  port = await findFreePort();
  test = await makeTestConfig();
  const { app, close } = await openApp(test.config, pino({ level: 'silent' }));
  team = await makeTeam(app);
  // Four strips, and enough trees that there is something to interrupt in training and in mapping.
  ground = await makeRunGround(app, team.project, { width: 512, height: 1000, trees: 250 });
  await close();
  await startServer(2);
});

afterAll(async () => {
  await killServer();
  await test.dispose();
});

describe('a run whose server is killed', () => {
  it('goes on by itself and gives the bytes of a run left in peace, with one thread or two', async () => {
    const inPeace = await waitForRun(await signIn(), await startRun(await signIn()));
    expect(inPeace.job).toMatchObject({ state: 'finished', error: null });

    const runId = await startRun(await signIn());
    await waitForFiles(runId, 'parts', 5);
    await killServer();
    const parts = await countFiles(runId, 'parts');
    expect(parts.length).toBeLessThan(250);

    await startServer(1);
    await waitForFiles(runId, 'strips', 1);
    await killServer();
    const strips = await countFiles(runId, 'strips');
    expect(strips.length).toBeLessThan(4);
    // Training was done by then, so what the first attempt had trained was taken up.
    expect((await countFiles(runId, 'parts')).length).toBe(250);

    await startServer(2);
    const agent = await signIn();
    const resumed = await waitForRun(agent, runId);
    expect(resumed.job).toMatchObject({ state: 'finished', error: null });
    expect(resumed.classMapSha256).toBe(inPeace.classMapSha256);
    expect(resumed.areas).toEqual(inPeace.areas);
    expect(resumed.overallAccuracy).toBe(inPeace.overallAccuracy);
    expect(resumed.notes).toEqual(inPeace.notes);
    const names = await readdir(join(test.config.dataDir, 'files/runs', runId));
    expect(names.sort()).toEqual([
      'class-map.tif',
      'class-map.tif.aux.xml',
      'confidence.tif',
      'margin.tif',
      'model.bin',
    ]);
  }, 150_000);

  it('goes on after an orderly stop as well, from what it had', async () => {
    await killServer();
    await startServer(2);
    const runId = await startRun(await signIn());
    await waitForFiles(runId, 'parts', 5);
    server!.kill('SIGTERM');
    const [code] = (await once(server!, 'exit')) as [number | null];
    expect(code).toBe(0);
    const kept = await countFiles(runId, 'parts');
    expect(kept.length).toBeGreaterThanOrEqual(5);
    await startServer(2);
    const agent = await signIn();
    const resumed = await waitForRun(agent, runId);
    expect(resumed.job).toMatchObject({ state: 'finished', error: null });
    const { body } = await agent.get(`/api/v1/projects/${team.project.id}/runs`).expect(200);
    expect(new Set((body.runs as Run[]).map(({ classMapSha256 }) => classMapSha256)).size).toBe(1);
  }, 150_000);

  it('stays cancelled when it was cancelled while its server was gone', async () => {
    const runId = await startRun(await signIn());
    await waitForFiles(runId, 'parts', 1);
    await killServer();
    // What another server process does for somebody who cancels.
    const db = createDataSource(test.config.db);
    await db.initialize();
    await db.getRepository(Job).update({ runId }, { cancelAsked: true });
    await db.destroy();
    await startServer(2);
    const ended = await waitForRun(await signIn(), runId);
    expect(ended.job.state).toBe('cancelled');
    expect(await countFiles(runId, 'parts')).toEqual([]);
    expect(await countFiles(runId, 'strips')).toEqual([]);
  }, 60_000);
});

describe('a reproduction', () => {
  it('finds the same bytes with another number of threads, and after its server was killed in the middle', async () => {
    await killServer();
    await startServer(2);
    const run = await waitForRun(await signIn(), await startRun(await signIn()));
    expect(run.job.state).toBe('finished');
    await killServer();
    await startServer(1);
    const { body } = await (await signIn()).post(`/api/v1/runs/${run.id}/reproductions`).expect(201);
    const { id } = body as Reproduction;
    await waitForFiles(id, 'parts', 5);
    await killServer();
    expect((await countFiles(id, 'parts')).length).toBeLessThan(250);
    await startServer(1);
    const agent = await signIn();
    const row = await waitForReproduction(agent, run.id, id);
    expect(row).toMatchObject({ verdict: 'same', threads: 1, job: { state: 'finished' } });
    expect(row.checks[0]?.foundSha256).toBe(run.classMapSha256);

    // The same by command, beside the running server.
    const { code, said } = await runCommand(`${team.project.name}/${run.number}`);
    expect(said).toContain('The same bytes, after');
    expect(code).toBe(0);
    expect(await countFiles(id, 'strips')).toEqual([]);
    const listed = await agent.get(`/api/v1/runs/${run.id}/reproductions`).expect(200);
    expect((listed.body.reproductions as Reproduction[])[0]).toMatchObject({ verdict: 'same', job: null });
    const unknown = await runCommand(`${team.project.name}/999`);
    expect(unknown.said).toContain('has no run 999; wanted the id of a run');
    expect(unknown.code).toBe(1);
  }, 150_000);
});

async function waitForReproduction(agent: Agent, runId: string, id: string): Promise<Reproduction> {
  const until = Date.now() + 60_000;
  for (;;) {
    const { body } = await agent.get(`/api/v1/runs/${runId}/reproductions`).expect(200);
    const row = (body.reproductions as Reproduction[]).find((one) => one.id === id);
    if (row?.job && row.job.state !== 'queued' && row.job.state !== 'running') return row;
    if (Date.now() > until) throw new Error(`the reproduction is still ${row?.job?.state}`);
    await new Promise((resolve) => setTimeout(resolve, 60));
  }
}

/** What `npm run reproduce` starts. */
async function runCommand(run: string): Promise<{ code: number | null; said: string }> {
  const child = spawn(process.execPath, ['--import', 'tsx', 'server/reproduce-run.ts', run], {
    cwd: repository,
    stdio: ['ignore', 'pipe', 'pipe'],
    env: describeEnvironment(2),
  });
  let said = '';
  for (const stream of [child.stdout, child.stderr]) stream.on('data', (part: Buffer) => (said += part.toString()));
  const [code] = (await once(child, 'close')) as [number | null];
  return { code, said };
}
