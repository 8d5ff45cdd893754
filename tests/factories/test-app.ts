import { randomBytes } from 'node:crypto';
import { mkdtemp, rm } from 'node:fs/promises';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { createConnection } from 'mysql2/promise';
import { pino } from 'pino';
import request from 'supertest';
import type { App } from '../../server/app-context.ts';
import { createHttpApp } from '../../server/app.ts';
import type { Config } from '../../server/config.ts';
import { openApp } from '../../server/start-server.ts';
import { PASSWORD } from './make-user.ts';

export type Agent = ReturnType<typeof request.agent>;

/** The whole server on a database and a data folder of its own, listening on a free port. */
export interface TestApp {
  app: App;
  url: string;
  dataDir: string;
  /** Somebody who is not signed in. */
  stranger: Agent;
  /** A browser of its own, signed in as the user; paths begin with /api/v1. */
  signedIn(user: { email: string }): Promise<Agent>;
  close(): Promise<void>;
}

function readDatabaseServer() {
  const { GROUNDSEL_TEST_DB_HOST, GROUNDSEL_TEST_DB_PORT, GROUNDSEL_TEST_DB_USER, GROUNDSEL_TEST_DB_PASSWORD } =
    process.env;
  if (!GROUNDSEL_TEST_DB_HOST || !GROUNDSEL_TEST_DB_USER) {
    throw new Error(
      'API tests need a MariaDB: run them with npm test, or set GROUNDSEL_TEST_DB_HOST, _PORT, _USER and _PASSWORD.',
    );
  }
  return {
    host: GROUNDSEL_TEST_DB_HOST,
    port: Number(GROUNDSEL_TEST_DB_PORT ?? 3306),
    user: GROUNDSEL_TEST_DB_USER,
    password: GROUNDSEL_TEST_DB_PASSWORD ?? '',
  };
}

/** Settings with a database and a data folder of their own; `dispose()` removes both. */
export async function makeTestConfig(
  overrides: Partial<Config> = {},
): Promise<{ config: Config; dispose(): Promise<void> }> {
  const server = readDatabaseServer();
  const name = `test_${randomBytes(8).toString('hex')}`;
  const admin = await createConnection(server);
  await admin.query(`CREATE DATABASE ${name} CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_ci`);
  const dataDir = await mkdtemp(join(tmpdir(), 'groundsel-api-'));
  const config: Config = {
    nodeEnv: 'test',
    host: '127.0.0.1',
    port: 0,
    publicUrl: 'http://localhost:4310',
    dataDir,
    db: { ...server, name },
    sessionSecret: 'a secret that only the tests know, 32 long',
    sessionDays: 14,
    trustProxy: 0,
    smtpUrl: null,
    mailFrom: 'Groundsel <groundsel@localhost>',
    uploadLimitBytes: 64 * 1024 * 1024,
    maxScenePixels: 10_000_000,
    ingest: { timeoutSeconds: 120, memoryMb: 2048 },
    workerThreads: 2,
    jobs: { long: 1, short: 1, perProject: 1 },
    tileCacheMb: 32,
    demo: false,
    adminEmail: null,
    logLevel: 'silent',
    ...overrides,
  };
  return {
    config,
    async dispose() {
      await admin.query(`DROP DATABASE ${name}`);
      await admin.end();
      await rm(dataDir, { recursive: true, force: true });
    },
  };
}

/** Opens a server for one test file; call `close()` in afterAll. */
export async function openTestApp(overrides: Partial<Config> = {}): Promise<TestApp> {
  const { config, dispose } = await makeTestConfig(overrides);
  const { dataDir } = config;
  const log = pino({ level: process.env['GROUNDSEL_TEST_LOG'] ?? config.logLevel });
  const { app, close: closeApp } = await openApp(config, log);
  const http = createServer(createHttpApp(app, null));
  await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', resolve));
  const url = `http://127.0.0.1:${(http.address() as AddressInfo).port}`;
  return {
    app,
    url,
    dataDir,
    stranger: request.agent(url),
    async signedIn(user) {
      const agent = request.agent(url);
      await agent.post('/api/v1/session').send({ email: user.email, password: PASSWORD }).expect(200);
      return agent;
    },
    async close() {
      const closed = new Promise<void>((resolve) => http.close(() => resolve()));
      http.closeAllConnections();
      await closed;
      await closeApp();
      await dispose();
    },
  };
}
