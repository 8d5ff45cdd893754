import { join } from 'node:path';
import { claimDataDir, prepareDataDir, readOrCreateSecret } from './data-folder.mjs';
import { startMariadb } from './mariadb.mjs';
import { checkPortFree } from './ports.mjs';
import { isGiven, usesExternalDatabase } from './settings.mjs';
import { supervise, waitForStop } from './supervise.mjs';

/** A server whose launcher was killed closes by itself, and may take this long over it. */
const CLOSING_SERVER_MS = 15_000;
const SECRET = 'GROUNDSEL_SESSION_SECRET';

/**
 * Brings up what the server needs (the data folder, its secrets, MariaDB), runs it until it ends or a stop is asked
 * for, and shuts everything down again in the opposite order.
 *
 * @param {import('../../config.ts').Config} config
 * @param {'production' | 'development'} nodeEnv
 * @param {(env: NodeJS.ProcessEnv) => Parameters<typeof supervise>[0]} listPrograms
 * @returns {Promise<number>} exit code
 */
export async function runServices(config, nodeEnv, listPrograms) {
  const dataDir = prepareDataDir(config.dataDir);
  const claim = claimDataDir(dataDir);
  const stopAsked = waitForStop();
  try {
    await checkPortFree(config.port, config.host, claim.tookOver ? CLOSING_SERVER_MS : 0);
    const database = usesExternalDatabase() ? null : await startMariadb({ dataDir });
    try {
      const secret = isGiven(SECRET) ? {} : { [SECRET]: readOrCreateSecret(join(dataDir, 'session-secret')) };
      const given = { GROUNDSEL_DATA_DIR: dataDir, NODE_ENV: nodeEnv };
      const programs = listPrograms({ ...process.env, ...secret, ...describeDatabase(database), ...given });
      return await superviseWithDatabase(programs, stopAsked, database);
    } finally {
      await database?.stop();
    }
  } finally {
    claim.release();
  }
}

/**
 * @param {Parameters<typeof supervise>[0]} programs
 * @param {Promise<string>} stopAsked
 * @param {import('./mariadb.mjs').Mariadb | null} database
 */
async function superviseWithDatabase(programs, stopAsked, database) {
  if (database === null) return supervise(programs, stopAsked);
  let databaseLost = false;
  const lost = database.ended.then((code) => {
    databaseLost = true;
    return `MariaDB has ended by itself (exit code ${code}); see db/mariadb.log in the data folder`;
  });
  const code = await supervise(programs, Promise.race([stopAsked, lost]));
  return databaseLost ? 1 : code;
}

/** @param {import('./mariadb.mjs').Mariadb | null} database */
function describeDatabase(database) {
  if (database === null) return {};
  return {
    GROUNDSEL_DB_HOST: database.host,
    GROUNDSEL_DB_PORT: String(database.port),
    GROUNDSEL_DB_USER: database.user,
    GROUNDSEL_DB_PASSWORD: database.password,
    GROUNDSEL_DB_NAME: database.name,
  };
}
