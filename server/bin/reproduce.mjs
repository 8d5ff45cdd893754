import { join } from 'node:path';
import { ensureBuild } from './setup/build.mjs';
import { claimDataDir, prepareDataDir } from './setup/data-folder.mjs';
import { startMariadb } from './setup/mariadb.mjs';
import { checkNodeVersion, ensureNodeModules } from './setup/node-modules.mjs';
import { buildDir } from './setup/paths.mjs';
import { runCommand } from './setup/run-command.mjs';
import { describeRunningMariadb } from './setup/running-mariadb.mjs';
import { describeFailure } from './setup/setup-error.mjs';
import { isGiven, loadEnvFile, readSettings, usesExternalDatabase } from './setup/settings.mjs';

/**
 * `npm run reproduce -- <run>`: makes a finished run once more and compares the bytes; beside a running product, or with a
 * database started for it.
 */
async function start() {
  checkNodeVersion();
  loadEnvFile();
  await ensureNodeModules();
  const config = await readSettings();
  await ensureBuild();
  const dataDir = prepareDataDir(config.dataDir);
  const env = {
    ...process.env,
    GROUNDSEL_DATA_DIR: dataDir,
    NODE_ENV: 'production',
    ...(isGiven('GROUNDSEL_SESSION_SECRET')
      ? {}
      : { GROUNDSEL_SESSION_SECRET: 'no sessions are made by this command' }),
  };
  const args = ['--enable-source-maps', join(buildDir, 'server/reproduce-run.js'), ...process.argv.slice(2)];
  if (usesExternalDatabase()) return runCommand(process.execPath, args, { env });
  const running = describeRunningMariadb(dataDir);
  if (running) return runCommand(process.execPath, args, { env: { ...env, ...running } });
  const claim = claimDataDir(dataDir);
  try {
    const database = await startMariadb({ dataDir });
    try {
      const own = describeRunningMariadb(dataDir) ?? {};
      return await runCommand(process.execPath, args, { env: { ...env, ...own } });
    } finally {
      await database.stop();
    }
  } finally {
    claim.release();
  }
}

try {
  process.exitCode = await start();
} catch (error) {
  console.error(describeFailure(error));
  process.exitCode = 1;
}
