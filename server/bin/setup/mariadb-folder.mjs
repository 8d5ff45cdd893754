import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import {
  chmodSync,
  chownSync,
  existsSync,
  lstatSync,
  mkdirSync,
  readdirSync,
  renameSync,
  rmSync,
  statSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { basename, dirname, join } from 'node:path';
import { findProgram } from './debian-packages.mjs';
import { runCommand } from './run-command.mjs';
import { SetupError, say } from './setup-error.mjs';

/**
 * @typedef {object} MariadbFolder
 * @property {string} dir holds everything below
 * @property {string} tables MariaDB's own data directory
 * @property {string} socket
 * @property {string} pidFile
 * @property {string} errorLog
 * @property {{ uid: number, gid: number }} owner the system user MariaDB runs as
 */

/** The kernel refuses longer socket paths (sun_path, with its closing zero). */
const MAX_SOCKET_PATH_BYTES = 107;

/**
 * Makes MariaDB's folder and its first system tables, unless they are there.
 *
 * @param {string} dataDir absolute, symbolic links resolved
 * @returns {Promise<MariadbFolder>}
 * @throws {SetupError} when the folder belongs to somebody else or MariaDB cannot fill it
 */
export async function prepareMariadbFolder(dataDir) {
  const dir = join(dataDir, 'db');
  const tables = join(dir, 'data');
  const owner = chooseOwner(dataDir, tables);
  mkdirSync(dir, { recursive: true, mode: 0o700 });
  takeOwnership(dir, owner);

  const folder = {
    dir,
    tables,
    socket: join(prepareSocketDir(dataDir, owner), 's.sock'),
    pidFile: join(dir, 'mariadb.pid'),
    errorLog: join(dir, 'mariadb.log'),
    owner,
  };
  if (!existsSync(tables)) await createSystemTables(folder);
  return folder;
}

/**
 * The word for --user, which only root may and must give.
 *
 * @param {MariadbFolder} folder
 * @returns {string[]}
 */
export function listUserOptions(folder) {
  return process.getuid?.() === 0 ? [`--user=${folder.owner.uid === 0 ? 'root' : folder.owner.uid}`] : [];
}

/**
 * Tables that exist keep their owner. New ones made by root belong to Debian's mysql user, if it can reach them.
 *
 * @param {string} dataDir
 * @param {string} tables
 */
function chooseOwner(dataDir, tables) {
  const own = { uid: process.getuid?.() ?? 0, gid: process.getgid?.() ?? 0 };
  if (existsSync(tables)) {
    const { uid, gid } = statSync(tables);
    if (own.uid !== 0 && uid !== own.uid) {
      throw new SetupError(
        `${tables} belongs to user ${uid}, and this is user ${own.uid}; start Groundsel as that user or as root, or set ` +
          'GROUNDSEL_DATA_DIR to another folder.',
      );
    }
    return { uid, gid };
  }
  if (own.uid !== 0) return own;
  const mysql = lookUpUser('mysql');
  return mysql !== null && canTraverse(dataDir, mysql) ? mysql : own;
}

/**
 * @param {string} name
 * @returns {{ uid: number, gid: number } | null}
 */
function lookUpUser(name) {
  const { status, stdout } = spawnSync('getent', ['passwd', name], { encoding: 'utf8' });
  if (status !== 0) return null;
  const [, , uid, gid] = stdout.split(':');
  return { uid: Number(uid), gid: Number(gid) };
}

/**
 * Whether a user can reach what lies in a folder: needs the x bit there and on each folder above.
 *
 * @param {string} dir
 * @param {{ uid: number, gid: number }} user
 * @returns {boolean}
 */
function canTraverse(dir, user) {
  const { mode, uid, gid } = statSync(dir);
  const bit = uid === user.uid ? 0o100 : gid === user.gid ? 0o010 : 0o001;
  if ((mode & bit) === 0) return false;
  const parent = dirname(dir);
  return parent === dir || canTraverse(parent, user);
}

/**
 * @param {string} path
 * @param {{ uid: number, gid: number }} owner
 */
function takeOwnership(path, owner) {
  if (process.getuid?.() === 0) chownSync(path, owner.uid, owner.gid);
  chmodSync(path, 0o700);
}

/**
 * A short private folder for the socket, the same at each start; the data folder's own path may be too long for one.
 *
 * @param {string} dataDir
 * @param {{ uid: number, gid: number }} owner
 */
function prepareSocketDir(dataDir, owner) {
  const name = `groundsel-${createHash('sha256').update(dataDir).digest('hex').slice(0, 12)}`;
  const roomy = Buffer.byteLength(join(tmpdir(), name, 's.sock')) <= MAX_SOCKET_PATH_BYTES;
  const dir = join(roomy ? tmpdir() : '/tmp', name);
  if (!existsSync(dir)) {
    mkdirSync(dir, { mode: 0o700 });
    takeOwnership(dir, owner);
  }
  // Anybody may write to /tmp: a folder laid out there by somebody else would let them stand between us and MariaDB.
  const found = lstatSync(dir);
  if (!found.isDirectory() || found.uid !== owner.uid || (found.mode & 0o077) !== 0) {
    throw new SetupError(
      `${dir} is not a private folder of user ${owner.uid}; remove it, or set TMPDIR to another folder.`,
    );
  }
  return dir;
}

/** @param {MariadbFolder} folder */
async function createSystemTables(folder) {
  const program = findProgram('mariadb-install-db');
  if (program === null) throw new SetupError('mariadb-install-db is not on this machine; install mariadb-server.');
  say('Creating the database folder');
  // Filled under another name first: tables left by an interrupted start must not pass for whole ones.
  const draft = `${folder.tables}.new`;
  rmSync(draft, { recursive: true, force: true });
  mkdirSync(draft, { mode: 0o700 });
  takeOwnership(draft, folder.owner);
  const code = await runCommand(
    program,
    // With the socket method no account has an empty password, not even for a moment.
    [
      '--no-defaults',
      // Its script splits a path at blanks, so it is given one without any, from the folder it runs in.
      `--datadir=./${basename(draft)}`,
      ...listUserOptions(folder),
      '--auth-root-authentication-method=socket',
      ...(process.getuid?.() === 0 ? ['--auth-root-socket-user=root'] : []),
      '--skip-test-db',
    ],
    { cwd: folder.dir, quiet: true },
  );
  if (code !== 0 || readdirSync(draft).length === 0) {
    throw new SetupError(`mariadb-install-db failed in ${draft} (exit code ${code}); its own message stands above.`);
  }
  renameSync(draft, folder.tables);
}
