import { createServer, type RequestListener, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { pino, type DestinationStream, type Logger, type LoggerOptions } from 'pino';
import { createHttpApp } from './app.ts';
import type { App } from './app-context.ts';
import type { Config } from './config.ts';
import { createDataSource } from './data-source.ts';
import { DatabaseJobQueue } from './jobs/database-job-queue.ts';
import { EventLog } from './jobs/event-log.ts';
import { readLaneLimits } from './jobs/job-lanes.ts';
import { JobRunner } from './jobs/job-runner.ts';
import { openWorkerPools } from './jobs/open-worker-pools.ts';
import { createMailer } from './mail/mailer.ts';
import { BandStore } from './raster/band-store.ts';
import { createJobHandlers } from './services/job-handlers.ts';
import { sweepSessions } from './services/session-sweep.ts';
import { LocalFileStore } from './storage/local-file-store.ts';

export interface RunningServer {
  app: App;
  /** Where it listens, for programs on this machine. */
  url: string;
  stop(): Promise<void>;
}

function listen(server: Server, port: number, host: string): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, host, () => {
      server.off('error', reject);
      resolve();
    });
  });
}

/** Connections on which nothing moves for so long are closed; event streams say something oftener. */
const IDLE_MS = 120_000;
/** For the head of a request, which no slow line needs longer for. */
const HEADERS_MS = 60_000;

/** A server that lets an upload take its time, as long as something comes: Node would end any request after five minutes. */
export function createHttpServer(handler: RequestListener): Server {
  const server = createServer({ requestTimeout: 0, headersTimeout: HEADERS_MS }, handler);
  server.setTimeout(IDLE_MS);
  return server;
}

/** One JSON object a line, to standard output unless told otherwise. */
export function createLogger(config: Pick<Config, 'logLevel'>, out?: DestinationStream): Logger {
  const options: LoggerOptions = {
    level: config.logLevel,
    redact: [
      'req.headers.cookie',
      'req.headers.authorization',
      'res.headers["set-cookie"]',
      // What a failed query was to store: sessions, digests of passwords, whole outlines.
      'err.parameters',
      'err.sql',
      'err.driverError',
    ],
  };
  return out ? pino(options, out) : pino(options);
}

/**
 * Opens everything a server needs, runs pending migrations, and takes up background work unless told not to; not yet
 * listening.
 */
export async function openApp(
  config: Config,
  log: Logger,
  { takesJobs = true } = {},
): Promise<{ app: App; close(): Promise<void> }> {
  const db = createDataSource(config.db);
  await db.initialize();
  await db.runMigrations({ transaction: 'each' });
  const files = new LocalFileStore(config.dataDir);
  await files.sweepScratch();
  const events = new EventLog(db, log);
  const workers = openWorkerPools(config);
  const bands = new BandStore({ cacheMb: 64, decode: 'async' });
  const wake: { now: () => void; cancelled: (jobId: string) => void } = {
    now: () => log.debug('no runner yet'),
    cancelled: () => log.debug('no runner yet'),
  };
  const app: App = {
    config,
    db,
    log,
    files,
    jobs: new DatabaseJobQueue(db, events, { now: () => wake.now(), cancelled: (id) => wake.cancelled(id) }),
    events,
    mail: createMailer(config, log),
    workers,
    bands,
  };
  const runner = new JobRunner(db, events, log, createJobHandlers(app), readLaneLimits(config.jobs));
  wake.now = runner.wake;
  wake.cancelled = runner.stopCancelled;
  await events.start();
  if (takesJobs) await runner.start();
  const sweeper = sweepSessions(app);
  return {
    app,
    async close() {
      sweeper.stop();
      await runner.stop();
      await workers.close();
      await bands.close();
      await events.stop();
      await db.destroy();
    },
  };
}

/** Starts the whole server; `clientDir` holds the built client, null in development, where Vite serves it. */
export async function startServer(
  config: Config,
  clientDir: string | null,
  log = createLogger(config),
): Promise<RunningServer> {
  const { app, close } = await openApp(config, log);
  const server = createHttpServer(createHttpApp(app, clientDir));
  try {
    await listen(server, config.port, config.host);
  } catch (error) {
    await close();
    throw error;
  }
  const { port } = server.address() as AddressInfo;
  return {
    app,
    url: `http://${config.host}:${port}`,
    async stop() {
      const closed = new Promise<void>((resolve) => server.close(() => resolve()));
      server.closeAllConnections();
      await closed;
      await close();
    },
  };
}
