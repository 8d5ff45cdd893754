import { randomBytes } from 'node:crypto';
import {
  chmodSync,
  existsSync,
  linkSync,
  mkdirSync,
  readFileSync,
  realpathSync,
  rmSync,
  unlinkSync,
  writeFileSync,
} from 'node:fs';
import { join } from 'node:path';
import { identifyProcess, isErrno } from './process-identity.mjs';
import { SetupError } from './setup-error.mjs';

/**
 * Makes the data folder, closed to other users. Run by root, others may pass through it (not look into it), because
 * MariaDB then runs as a user of its own.
 *
 * @param {string} dir absolute
 * @returns {string} the folder's path with symbolic links resolved
 * @throws {SetupError} when it cannot be made or written
 */
export function prepareDataDir(dir) {
  try {
    if (!existsSync(dir)) {
      mkdirSync(dir, { recursive: true });
      chmodSync(dir, process.getuid?.() === 0 ? 0o711 : 0o700);
    }
    const probe = join(dir, `.probe-${process.pid}`);
    writeFileSync(probe, '');
    unlinkSync(probe);
    return realpathSync(dir);
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error);
    throw new SetupError(`GROUNDSEL_DATA_DIR: ${dir} cannot be written (${reason}); wanted a folder this user owns.`);
  }
}

/**
 * A secret kept in a file only its owner can read, made at first need.
 *
 * @param {string} path
 * @returns {string} 64 hexadecimal digits
 * @throws {SetupError} when the file holds something else
 */
export function readOrCreateSecret(path) {
  if (!existsSync(path)) writeFileSync(path, randomBytes(32).toString('hex'), { mode: 0o600, flag: 'wx' });
  const secret = readFileSync(path, 'utf8').trim();
  if (!/^[0-9a-f]{64}$/.test(secret)) {
    throw new SetupError(`${path} does not hold a secret of 64 hexadecimal digits; delete it to have a new one made.`);
  }
  return secret;
}

/**
 * Takes the data folder for this process, so that two servers never work in one. A claim left by a killed process
 * is taken over.
 *
 * @param {string} dataDir
 * @returns {{ tookOver: boolean, release: () => void }}
 * @throws {SetupError} when a living process holds it
 */
export function claimDataDir(dataDir) {
  const path = join(dataDir, 'running');
  const claim = identifyProcess(process.pid) ?? '';
  const draft = `${path}-${process.pid}`;
  writeFileSync(draft, claim, { mode: 0o600 });
  try {
    let tookOver = false;
    // A link is made whole or not at all, where a written file could be read half-written.
    for (let attempt = 0; attempt < 5; attempt++) {
      try {
        linkSync(draft, path);
        return { tookOver, release: () => releaseClaim(path, claim) };
      } catch (error) {
        if (!isErrno(error, 'EEXIST')) throw error;
      }
      const holder = readClaim(path);
      const pid = Number(holder?.split(' ')[1]);
      if (holder !== null && identifyProcess(pid) === holder) {
        throw new SetupError(
          `Groundsel already runs on ${dataDir} (process ${pid}); stop it, or set GROUNDSEL_DATA_DIR to another folder.`,
        );
      }
      rmSync(path, { force: true });
      tookOver = true;
    }
    throw new SetupError(`${path} is taken and left by others again and again; is something else starting Groundsel?`);
  } finally {
    rmSync(draft, { force: true });
  }
}

/** @param {string} path */
function readClaim(path) {
  try {
    return readFileSync(path, 'utf8');
  } catch (error) {
    if (isErrno(error, 'ENOENT')) return null;
    throw error;
  }
}

/**
 * @param {string} path
 * @param {string} claim
 */
function releaseClaim(path, claim) {
  if (readClaim(path) === claim) rmSync(path, { force: true });
}
