/**
 * Peak memory of the living server (compiled, with HTTP, database client, and everything it starts) while a full-size scene is
 * uploaded, taken in and mapped. MariaDB itself is not counted. Needs `npm run build` and a test database.
 * Run: npm run bench:memory [-- --width=7600 --height=7800 --trees=100 --threads=2]
 */
import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { openAsBlob } from 'node:fs';
import { mkdtemp, rm } from 'node:fs/promises';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { basename, join } from 'node:path';
import { pino } from 'pino';
import { openApp } from '../../server/start-server.ts';
import { getCrsTransform } from '../../server/raster/crs-transform.ts';
import type { Run } from '../../shared/contracts/run.ts';
import type { Scene } from '../../shared/contracts/scene.ts';
import { makeTeam } from '../factories/make-project.ts';
import { PASSWORD } from '../factories/make-user.ts';
import { makeTestConfig } from '../factories/test-app.ts';
import { makeFullScene, nSceneClasses, type FullScene } from './full-scene.ts';
import { measureProcessTree } from './process-memory.ts';
import { describeMachine, readOption } from './reference-run.ts';

const LIMIT_MB = 700;
const LOOK_EVERY_MS = 200;
const POLYGONS_PER_CLASS = 6;
const POLYGON_PIXELS = 12;
const UTM_28 = '+proj=utm +zone=28 +datum=WGS84 +units=m +no_defs';
const repository = join(import.meta.dirname, '../..');

const [width, height] = [readOption('width', 7600), readOption('height', 7800)];
const threads = readOption('threads', 2);

async function findFreePort(): Promise<number> {
  const probe = createServer().listen(0, '127.0.0.1');
  await once(probe, 'listening');
  const { port } = probe.address() as AddressInfo;
  probe.close();
  await once(probe, 'close');
  return port;
}

async function startServer(config: Awaited<ReturnType<typeof makeTestConfig>>['config']): Promise<ChildProcess> {
  const { db } = config;
  const child = spawn(process.execPath, [join(repository, '.build/server/main.js')], {
    stdio: ['ignore', 'pipe', 'inherit'],
    env: {
      PATH: process.env['PATH'],
      NODE_ENV: 'production',
      GROUNDSEL_PORT: String(config.port),
      GROUNDSEL_DATA_DIR: config.dataDir,
      GROUNDSEL_DB_HOST: db.host,
      GROUNDSEL_DB_PORT: String(db.port),
      GROUNDSEL_DB_USER: db.user,
      GROUNDSEL_DB_PASSWORD: db.password,
      GROUNDSEL_DB_NAME: db.name,
      GROUNDSEL_SESSION_SECRET: config.sessionSecret,
      GROUNDSEL_WORKER_THREADS: String(threads),
      GROUNDSEL_DEMO: 'off',
      GROUNDSEL_LOG_LEVEL: 'error',
    },
  });
  let said = '';
  child.stdout?.on('data', (part: Buffer) => (said += part.toString()));
  while (!said.includes('Groundsel is open')) {
    if (child.exitCode !== null) throw new Error(`the server did not start: ${said}`);
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  return child;
}

/** Square samples of one class each, spread over the scene. */
function placeSamples(scene: FullScene): { classIndex: number; ring: [number, number][] }[] {
  const { toLonLat } = getCrsTransform(UTM_28);
  const { grid } = scene;
  const samples: { classIndex: number; ring: [number, number][] }[] = [];
  const counts = new Array<number>(nSceneClasses).fill(0);
  const step = Math.max(POLYGON_PIXELS * 2, Math.floor(Math.sqrt((grid.width * grid.height) / 4000)));
  for (let row = 30; row < grid.height - 30; row += step) {
    for (let column = 30; column < grid.width - 30; column += step) {
      const classIndex = scene.classAt(column + POLYGON_PIXELS / 2, row + POLYGON_PIXELS / 2);
      if ((counts[classIndex] ?? 0) >= POLYGONS_PER_CLASS) continue;
      counts[classIndex] = (counts[classIndex] ?? 0) + 1;
      const corner = (right: number, down: number): [number, number] => {
        const x = grid.originX + (column + right) * grid.pixelWidth;
        return toLonLat(x, grid.originY - (row + down) * grid.pixelHeight);
      };
      const n = POLYGON_PIXELS;
      samples.push({ classIndex, ring: [corner(0, 0), corner(0, n), corner(n, n), corner(n, 0), corner(0, 0)] });
    }
  }
  return samples;
}

const folder = await mkdtemp(join(tmpdir(), 'bench-memory-'));
const test = await makeTestConfig({ port: await findFreePort() });
let server: ChildProcess | null = null;
try {
  console.log(`${describeMachine()}; ${width} × ${height}, 6 bands of uint16, ${threads} threads`);
  const { app, close } = await openApp(test.config, pino({ level: 'silent' }));
  const team = await makeTeam(app);
  await close();
  const scene = await makeFullScene(width, height, folder);
  server = await startServer(test.config);
  const base = `http://127.0.0.1:${test.config.port}`;
  let cookie = '';
  const ask = async <T>(method: string, path: string, body?: FormData | object): Promise<T> => {
    const isForm = body instanceof FormData;
    const answer = await fetch(`${base}/api/v1${path}`, {
      method,
      headers: { cookie, origin: base, ...(body && !isForm ? { 'content-type': 'application/json' } : {}) },
      ...(body ? { body: isForm ? body : JSON.stringify(body) } : {}),
    });
    if (!answer.ok) throw new Error(`${method} ${path}: ${answer.status} ${await answer.text()}`);
    const [set] = answer.headers.getSetCookie();
    if (set) cookie = set.split(';')[0] ?? '';
    return (await answer.json()) as T;
  };

  const peaks: { phase: string; megabytes: number; seconds: number }[] = [];
  const { pid } = server;
  const watch = async <T>(phase: string, work: () => Promise<T>): Promise<T> => {
    const began = performance.now();
    let bytes = 0;
    const timer = setInterval(() => (bytes = Math.max(bytes, measureProcessTree(pid ?? 0))), LOOK_EVERY_MS);
    try {
      return await work();
    } finally {
      clearInterval(timer);
      const seconds = (performance.now() - began) / 1000;
      peaks.push({ phase, megabytes: bytes / 1024 ** 2, seconds });
      console.log(`${phase}: ${seconds.toFixed(1)} s, at most ${(bytes / 1024 ** 2).toFixed(0)} MB`);
    }
  };
  const waitFor = async <T extends { job: { state: string; error: string | null } | null }>(
    path: string,
    onLook: (seen: T) => void = () => undefined,
  ): Promise<T> => {
    for (;;) {
      const seen = await ask<T>('GET', path);
      onLook(seen);
      const state = seen.job?.state ?? '';
      if (state === 'finished') return seen;
      if (state === 'failed' || state === 'cancelled') throw new Error(`${path}: ${state}, ${seen.job?.error}`);
      await new Promise((resolve) => setTimeout(resolve, 500));
    }
  };

  await ask('POST', '/session', { email: team.lead.email, password: PASSWORD });
  const projectPath = `/projects/${team.project.id}`;
  const uploaded = await watch('upload', async () => {
    const form = new FormData();
    form.set('name', 'Full size');
    for (const path of scene.bandPaths) form.append('files', await openAsBlob(path), basename(path));
    return ask<Scene>('POST', `${projectPath}/scenes`, form);
  });
  await watch('taking the scene in', () => waitFor<Scene>(`/scenes/${uploaded.id}`));
  const ready = await ask<Scene>('GET', `/scenes/${uploaded.id}`);
  const classIds: string[] = [];
  for (let c = 0; c < nSceneClasses; c++) {
    const colour = `#${(0x204060 + c * 0x0d0b07).toString(16).padStart(6, '0')}`;
    const made = await ask<{ id: string }>('POST', `${projectPath}/classes`, { code: c + 1, name: `Class ${c + 1}`, colour }); // prettier-ignore
    classIds.push(made.id);
  }
  const used = new Set<number>();
  for (const { classIndex, ring } of placeSamples(scene)) {
    used.add(classIndex);
    const geometry = { type: 'Polygon', coordinates: [ring] };
    await ask('POST', `${projectPath}/samples`, { id: crypto.randomUUID(), classId: classIds[classIndex], sceneId: ready.id, geometry }); // prettier-ignore
  }
  const recipe = {
    sceneId: ready.id,
    bandIds: ready.bands.map(({ id }) => id),
    classIds: classIds.filter((_, c) => used.has(c)),
    classifier: { kind: 'random-forest', trees: readOption('trees', 100), maxDepth: 64 },
  };
  // What the run said of its time left, to hold against what was left in truth.
  const forecasts: { atMs: number; secondsLeft: number; share: number }[] = [];
  const run = await watch('run', async () => {
    const { id } = await ask<Run>('POST', `${projectPath}/runs`, { recipe });
    return waitFor<Run>(`/runs/${id}`, ({ job: { secondsLeft, share } }) => {
      if (secondsLeft !== null) forecasts.push({ atMs: Date.now(), secondsLeft, share });
    });
  });
  const endedMs = Date.parse(run.job.endedAt ?? '');
  const totalSeconds = (endedMs - Date.parse(run.job.startedAt ?? '')) / 1000;
  const settled = forecasts.filter(({ atMs }) => {
    const left = (endedMs - atMs) / 1000;
    return left > 0.1 * totalSeconds && left < 0.75 * totalSeconds;
  });
  const errors = settled.map(({ atMs, secondsLeft }) => {
    const left = (endedMs - atMs) / 1000;
    return Math.abs(secondsLeft - left) / left;
  });
  if (errors.length > 0) {
    const worst = Math.max(...errors) * 100;
    console.log(`time left, from a quarter to nine tenths of the run: at most ${worst.toFixed(0)} % off the truth`);
  }
  console.log(`class map ${run.classMapSha256}`);
  const peak = Math.max(...peaks.map(({ megabytes }) => megabytes));
  const verdict = peak < LIMIT_MB ? 'under' : 'NOT under';
  console.log(`peak of the server's process tree: ${peak.toFixed(0)} MB, ${verdict} ${LIMIT_MB} MB`);
  process.exitCode = peak < LIMIT_MB ? 0 : 1;
} finally {
  if (server && server.exitCode === null) {
    server.kill('SIGTERM');
    await once(server, 'exit');
  }
  await test.dispose();
  await rm(folder, { recursive: true, force: true });
}
