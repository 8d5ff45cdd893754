import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { ConfigError, readConfig } from './config.ts';
import { loadDemoOnce } from './demo/load-demo.ts';
import { inviteFirstAdmin } from './services/first-admin.ts';
import { startServer, type RunningServer } from './start-server.ts';

/** The built client lies beside the built server; in development there is none and Vite serves it. */
function findClientDir(): string | null {
  const dir = join(import.meta.dirname, '../client');
  return existsSync(join(dir, 'assets')) ? dir : null;
}

let stopping = false;
const closing = new AbortController();

/** Closes once the start is through: tables half brought up to date would have to be mended by hand. */
async function stopAfter(starting: Promise<RunningServer>): Promise<void> {
  if (stopping) return;
  stopping = true;
  closing.abort();
  try {
    await (await starting).stop();
    process.exit(0);
  } catch (error) {
    console.error('Stopping failed:', error);
    process.exit(1);
  }
}

async function main(): Promise<void> {
  const config = readConfig(process.env);
  const starting = startServer(config, findClientDir());
  for (const signal of ['SIGINT', 'SIGTERM'] as const) process.on(signal, () => void stopAfter(starting));
  const server = await starting;
  if (stopping) return;
  const lines = [
    ...(await inviteFirstAdmin(server.app)),
    ...(config.demo ? await loadDemoOnce(server.app, console.log, closing.signal) : []),
  ];
  console.log([`Groundsel is open at ${config.publicUrl}`, ...lines].join('\n'));
}

main().catch((error: unknown) => {
  // Work cut short by the closing fails for that reason alone; stopAfter then gives the exit code.
  if (stopping) return;
  console.error(error instanceof ConfigError ? error.message : error);
  process.exit(1);
});
