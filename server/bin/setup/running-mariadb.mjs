import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { readOrCreateSecret } from './data-folder.mjs';
import { readCommandLine } from './process-identity.mjs';

/**
 * The MariaDB that a running Groundsel has started on its data folder, as settings of a further process.
 *
 * @param {string} dataDir absolute, symbolic links resolved
 * @returns {NodeJS.ProcessEnv | null} null when none runs there
 */
export function describeRunningMariadb(dataDir) {
  const pidFile = join(dataDir, 'db', 'mariadb.pid');
  if (!existsSync(pidFile)) return null;
  const words = readCommandLine(Number(readFileSync(pidFile, 'utf8').trim()));
  // The number may long belong to another program.
  if (!words.includes(`--datadir=${join(dataDir, 'db', 'data')}`)) return null;
  const port = words.find((word) => word.startsWith('--port='))?.slice('--port='.length);
  if (port === undefined) return null;
  return {
    GROUNDSEL_DB_HOST: '127.0.0.1',
    GROUNDSEL_DB_PORT: port,
    GROUNDSEL_DB_USER: 'groundsel',
    GROUNDSEL_DB_PASSWORD: readOrCreateSecret(join(dataDir, 'db-password')),
    GROUNDSEL_DB_NAME: 'groundsel',
  };
}
