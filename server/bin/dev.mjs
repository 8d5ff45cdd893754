import { ensureDebianPackages, serverPackages } from './setup/debian-packages.mjs';
import { checkNodeVersion, ensureNodeModules } from './setup/node-modules.mjs';
import { findTool } from './setup/paths.mjs';
import { checkPortFree } from './setup/ports.mjs';
import { runServices } from './setup/services.mjs';
import { describeFailure } from './setup/setup-error.mjs';
import { isGiven, loadEnvFile, readSettings, usesExternalDatabase } from './setup/settings.mjs';

const CLIENT_HOST = '127.0.0.1';
const CLIENT_PORT = 5173;

/** `npm run dev`: the server restarts and the page reloads at each change of their source. */
async function develop() {
  checkNodeVersion();
  loadEnvFile();
  // People open Vite's address, which passes /api on; links and the check of a request's origin must go by it.
  if (!isGiven('GROUNDSEL_PUBLIC_URL')) process.env['GROUNDSEL_PUBLIC_URL'] = `http://${CLIENT_HOST}:${CLIENT_PORT}`;
  const packages = serverPackages.filter((name) => name !== 'mariadb-server' || !usesExternalDatabase());
  await ensureDebianPackages(packages);
  await ensureNodeModules();
  const config = await readSettings();
  await checkPortFree(CLIENT_PORT, CLIENT_HOST);
  return runServices(config, 'development', (env) => [
    {
      args: [findTool('tsx'), 'watch', '--clear-screen=false', '--tsconfig', 'server/tsconfig.json', 'server/main.ts'],
      env,
    },
    { args: [findTool('vite'), '--host', CLIENT_HOST, '--port', String(CLIENT_PORT), '--strictPort'], env },
  ]);
}

try {
  process.exitCode = await develop();
} catch (error) {
  console.error(describeFailure(error));
  process.exitCode = 1;
}
