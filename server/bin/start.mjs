import { join } from 'node:path';
import { ensureBuild } from './setup/build.mjs';
import { ensureDebianPackages, serverPackages } from './setup/debian-packages.mjs';
import { checkNodeVersion, ensureNodeModules } from './setup/node-modules.mjs';
import { buildDir } from './setup/paths.mjs';
import { runServices } from './setup/services.mjs';
import { describeFailure } from './setup/setup-error.mjs';
import { loadEnvFile, readSettings, usesExternalDatabase } from './setup/settings.mjs';

/** `npm start`: everything from a fresh checkout to the running server. */
async function start() {
  checkNodeVersion();
  loadEnvFile();
  const packages = serverPackages.filter((name) => name !== 'mariadb-server' || !usesExternalDatabase());
  await ensureDebianPackages(packages);
  await ensureNodeModules();
  const config = await readSettings();
  await ensureBuild();
  return runServices(config, 'production', (env) => [
    { args: ['--enable-source-maps', join(buildDir, 'server/main.js')], env },
  ]);
}

try {
  process.exitCode = await start();
} catch (error) {
  console.error(describeFailure(error));
  process.exitCode = 1;
}
