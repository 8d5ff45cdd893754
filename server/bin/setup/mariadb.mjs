import { spawn } from 'node:child_process';
import { existsSync, readFileSync, rmSync, writeFileSync, chownSync } from 'node:fs';
import { connect } from 'node:net';
import { dirname, join } from 'node:path';
import { readOrCreateSecret } from './data-folder.mjs';
import { findProgram } from './debian-packages.mjs';
import { listUserOptions, prepareMariadbFolder } from './mariadb-folder.mjs';
import { findFreePort } from './ports.mjs';
import { identifyProcess, readCommandLine, waitForProcessEnd } from './process-identity.mjs';
import { SetupError, say } from './setup-error.mjs';

/**
 * @typedef {object} Mariadb
 * @property {string} host
 * @property {number} port
 * @property {string} user
 * @property {string} password
 * @property {string} name of the database
 * @property {string} socket
 * @property {number} pid
 * @property {Promise<number>} ended its exit code, when it ends for whatever reason
 * @property {() => Promise<void>} stop shuts it down cleanly and waits for that
 */

const HOST = '127.0.0.1';
const NAME = 'groundsel';
const START_TIMEOUT_MS = 120_000;
const STOP_TIMEOUT_MS = 120_000;

/**
 * Starts MariaDB in a data folder, on loopback and a free port, with a database and a user of its own. One left
 * running there by a killed server is shut down cleanly first: there are never two on one folder.
 *
 * @param {object} options
 * @param {string} options.dataDir absolute, symbolic links resolved
 * @param {boolean} [options.durable] whether each commit reaches the disk before it is answered (only tests do without)
 * @param {boolean} [options.mayCreateDatabases] whether the user may make further databases
 * @returns {Promise<Mariadb>}
 * @throws {SetupError} with MariaDB's own last words when it does not come up
 */
export async function startMariadb({ dataDir, durable = true, mayCreateDatabases = false }) {
  const folder = await prepareMariadbFolder(dataDir);
  await stopLeftover(folder);
  const password = readOrCreateSecret(join(dataDir, 'db-password'));
  const initFile = writeInitFile(folder, password, mayCreateDatabases);
  const port = await findFreePort(HOST);
  const child = launch(folder, port, initFile, durable);

  /** @type {Promise<number>} */
  const ended = new Promise((resolve) => child.once('exit', (code) => resolve(code ?? 128)));
  const pid = child.pid ?? 0;
  const stop = async () => {
    await terminate(pid);
    await ended;
    rmSync(dirname(folder.socket), { recursive: true, force: true });
  };
  try {
    await waitUntilAnswering(port, ended);
  } catch (error) {
    await stop();
    throw new SetupError(
      `MariaDB did not start: ${describe(error)}. The end of ${folder.errorLog}:\n${readTail(folder.errorLog)}`,
    );
  } finally {
    rmSync(initFile, { force: true });
  }
  return { host: HOST, port, user: NAME, password, name: NAME, socket: folder.socket, pid, ended, stop };
}

/**
 * @param {import('./mariadb-folder.mjs').MariadbFolder} folder
 * @param {number} port
 * @param {string} initFile
 * @param {boolean} durable
 */
function launch(folder, port, initFile, durable) {
  const program = findProgram('mariadbd');
  if (program === null) throw new SetupError('mariadbd is not on this machine; install mariadb-server.');
  const options = [
    '--no-defaults', // must come first: it keeps the machine's own MariaDB settings out
    ...listUserOptions(folder),
    `--datadir=${folder.tables}`,
    `--socket=${folder.socket}`,
    `--pid-file=${folder.pidFile}`,
    `--log-error=${folder.errorLog}`,
    `--init-file=${initFile}`,
    `--bind-address=${HOST}`,
    `--port=${port}`,
    '--skip-name-resolve',
    '--local-infile=OFF',
    '--character-set-server=utf8mb4',
    '--collation-server=utf8mb4_unicode_ci',
    '--default-time-zone=+00:00',
    '--max-allowed-packet=64M',
    `--innodb-flush-log-at-trx-commit=${durable ? 1 : 2}`,
  ];
  // In a process group of its own, Ctrl+C reaches the server first, which needs the database to close its work.
  return spawn(program, options, { cwd: folder.dir, detached: true, stdio: 'ignore' });
}

/**
 * Statements MariaDB runs before it answers anybody: the account always has the password of our file, even when that
 * was made anew or a backup was put back.
 *
 * @param {import('./mariadb-folder.mjs').MariadbFolder} folder
 * @param {string} password
 * @param {boolean} mayCreateDatabases
 */
function writeInitFile(folder, password, mayCreateDatabases) {
  const accounts = [`'${NAME}'@'${HOST}'`, `'${NAME}'@'localhost'`];
  const statements = [
    `CREATE DATABASE IF NOT EXISTS ${NAME};`,
    ...accounts.flatMap((account) => [
      `CREATE USER IF NOT EXISTS ${account} IDENTIFIED BY '${password}';`,
      `ALTER USER ${account} IDENTIFIED BY '${password}';`,
      `GRANT ALL PRIVILEGES ON ${mayCreateDatabases ? '*' : NAME}.* TO ${account};`,
    ]),
  ];
  const path = join(folder.dir, 'init.sql');
  rmSync(path, { force: true });
  writeFileSync(path, `${statements.join('\n')}\n`, { mode: 0o600, flag: 'wx' });
  if (process.getuid?.() === 0) chownSync(path, folder.owner.uid, folder.owner.gid);
  return path;
}

/** @param {import('./mariadb-folder.mjs').MariadbFolder} folder */
async function stopLeftover(folder) {
  if (!existsSync(folder.pidFile)) return;
  const pid = Number(readFileSync(folder.pidFile, 'utf8').trim());
  // The number may long belong to another program.
  if (!Number.isInteger(pid) || !readCommandLine(pid).includes(`--datadir=${folder.tables}`)) return;
  say(`Shutting down the MariaDB (process ${pid}) that an earlier start left running`);
  await terminate(pid);
}

/**
 * SIGTERM is MariaDB's own signal for a clean shutdown.
 *
 * @param {number} pid
 * @throws {SetupError} when it still runs long after; it is never killed, which could cost a long recovery
 */
async function terminate(pid) {
  if (identifyProcess(pid) === null) return;
  process.kill(pid, 'SIGTERM');
  if (await waitForProcessEnd(pid, STOP_TIMEOUT_MS)) return;
  throw new SetupError(
    `MariaDB (process ${pid}) is still shutting down after ${STOP_TIMEOUT_MS / 1000} s; let it finish.`,
  );
}

/**
 * @param {number} port
 * @param {Promise<number>} ended
 */
async function waitUntilAnswering(port, ended) {
  /** @type {number | null} */
  let exitCode = null;
  void ended.then((code) => (exitCode = code));
  const deadline = Date.now() + START_TIMEOUT_MS;
  while (!(await greets(port))) {
    if (exitCode !== null) throw new Error(`it ended with exit code ${exitCode}`);
    if (Date.now() > deadline) throw new Error(`no answer on port ${port} within ${START_TIMEOUT_MS / 1000} s`);
    await new Promise((wake) => setTimeout(wake, 50));
  }
}

/**
 * Whether MariaDB answers: it speaks first, and only once its start-up statements are done.
 *
 * @param {number} port
 * @returns {Promise<boolean>}
 */
function greets(port) {
  return new Promise((resolve) => {
    const socket = connect({ port, host: HOST });
    socket.setTimeout(500);
    /** @param {boolean} answer */
    const finish = (answer) => {
      socket.destroy();
      resolve(answer);
    };
    socket.once('data', () => finish(true));
    for (const event of ['error', 'timeout', 'close']) socket.once(event, () => finish(false));
  });
}

/** @param {string} path */
function readTail(path) {
  if (!existsSync(path)) return '(no log was written)';
  return readFileSync(path, 'utf8').trimEnd().split('\n').slice(-15).join('\n');
}

/** @param {unknown} error */
function describe(error) {
  return error instanceof Error ? error.message : String(error);
}
