import { spawn } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { existsSync } from 'node:fs';
import { mkdtemp, rm } from 'node:fs/promises';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { createConnection } from 'mysql2/promise';
import { chromium, type Browser } from 'playwright-core';

const root = join(import.meta.dirname, '../..');
/** The demo is loaded before the address is printed. */
const START_MS = 180_000;

/** The compiled product as a process of its own, and a browser before it. */
export interface Product {
  url: string;
  browser: Browser;
  /** What the server has printed so far. */
  printed(): string;
  close(): Promise<void>;
}

function findFreePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const { port } = probe.address() as { port: number };
      probe.close(() => resolve(port));
    });
  });
}

async function waitUntil(isSo: () => boolean, what: string, describe: () => string): Promise<void> {
  const deadline = Date.now() + START_MS;
  while (!isSo()) {
    if (Date.now() > deadline) throw new Error(`${what} within ${START_MS / 1000} s:\n${describe()}`);
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}

/** Starts what `npm start` starts, on a database and a data folder of its own, and Debian's Chromium. */
export async function openProduct(settings: Record<string, string>): Promise<Product> {
  const main = join(root, '.build/server/main.js');
  if (!existsSync(main)) throw new Error('Browser tests drive the built product: run them with npm test.');
  const {
    GROUNDSEL_TEST_DB_HOST: host,
    GROUNDSEL_TEST_DB_PORT: dbPort,
    GROUNDSEL_TEST_DB_USER: user,
    GROUNDSEL_TEST_DB_PASSWORD: password,
  } = process.env;
  if (!host || !dbPort || !user || !password) throw new Error('Browser tests need a MariaDB: run them with npm test.');
  const admin = await createConnection({ host, port: Number(dbPort), user, password });
  const name = `browser_${randomBytes(8).toString('hex')}`;
  await admin.query(`CREATE DATABASE ${name} CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_ci`);
  const dataDir = await mkdtemp(join(tmpdir(), 'groundsel-browser-'));
  const port = await findFreePort();
  let output = '';
  const server = spawn(process.execPath, ['--enable-source-maps', main], {
    env: {
      ...{
        PATH: process.env['PATH'],
        HOME: process.env['HOME'],
        NODE_ENV: 'production',
        GROUNDSEL_PORT: String(port),
        GROUNDSEL_DATA_DIR: dataDir,
      },
      ...{
        GROUNDSEL_DB_HOST: host,
        GROUNDSEL_DB_PORT: dbPort,
        GROUNDSEL_DB_USER: user,
        GROUNDSEL_DB_PASSWORD: password,
        GROUNDSEL_DB_NAME: name,
      },
      ...{ GROUNDSEL_SESSION_SECRET: randomBytes(24).toString('hex'), GROUNDSEL_LOG_LEVEL: 'warn', ...settings },
    },
  });
  const ended = new Promise<void>((resolve) => server.once('exit', () => resolve()));
  for (const stream of [server.stdout, server.stderr])
    stream.on('data', (bytes: Buffer) => (output += bytes.toString()));
  const stopServer = async () => {
    server.kill('SIGTERM');
    await ended;
    await admin.query(`DROP DATABASE ${name}`);
    await admin.end();
    await rm(dataDir, { recursive: true, force: true });
  };
  try {
    await waitUntil(
      () => output.includes('Groundsel is open at') || server.exitCode !== null,
      'the server did not start',
      () => output,
    );
    if (server.exitCode !== null) throw new Error(`the server ended:\n${output}`);
    const browser = await chromium.launch({
      executablePath: '/usr/bin/chromium',
      args: [
        ...(process.getuid?.() === 0 ? ['--no-sandbox'] : []),
        ...['--disable-background-networking', '--disable-component-update', '--disable-sync', '--no-first-run'],
      ],
    });
    return {
      url: `http://127.0.0.1:${port}`,
      browser,
      printed: () => output,
      async close() {
        await browser.close();
        await stopServer();
      },
    };
  } catch (error) {
    await stopServer();
    throw error;
  }
}
