import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { ConfigError, readConfig } from './config.ts';
import { loadDemoOnce } from './demo/load-demo.ts';
import { inviteFirstAdmin } from './services/first-admin.ts';
import { startServer } from './start-server.ts';

/** The built client lies beside the built server; in development there is none and Vite serves it. */
function findClientDir(): string | null {
  const dir = join(import.meta.dirname, '../client');
  return existsSync(join(dir, 'assets')) ? dir : null;
}

async function main(): Promise<void> {
  const config = readConfig(process.env);
  const server = await startServer(config, findClientDir());
  let stopping = false;
  const stop = () => {
    if (stopping) return;
    stopping = true;
    server.stop().then(
      () => process.exit(0),
      (error: unknown) => {
        server.app.log.fatal({ err: error }, 'stopping failed');
        process.exit(1);
      },
    );
  };
  process.on('SIGINT', stop);
  process.on('SIGTERM', stop);
  const lines = [...(await inviteFirstAdmin(server.app)), ...(config.demo ? await loadDemoOnce(server.app) : [])];
  console.log([`Groundsel is open at ${config.publicUrl}`, ...lines].join('\n'));
}

main().catch((error: unknown) => {
  console.error(error instanceof ConfigError ? error.message : error);
  process.exit(1);
});
