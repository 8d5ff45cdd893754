import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { delimiter, join } from 'node:path';
import { runCommand } from './run-command.mjs';
import { SetupError, say } from './setup-error.mjs';

/** Debian keeps server programs where an ordinary user's PATH does not look. */
const SYSTEM_DIRS = ['/usr/local/sbin', '/usr/sbin', '/usr/bin', '/sbin', '/bin'];

/**
 * What shows that a Debian package is there: programs on the PATH, or files.
 *
 * @type {Record<string, { programs?: string[], files?: string[] }>}
 */
const EVIDENCE = {
  'mariadb-server': { programs: ['mariadbd', 'mariadb-install-db', 'mariadb-dump'] },
  'gdal-bin': { programs: ['gdalinfo', 'gdal_translate', 'gdalwarp', 'ogr2ogr'] },
  chromium: { programs: ['chromium'] },
  'python3-gdal': { files: ['/usr/lib/python3/dist-packages/osgeo/__init__.py'] },
  'python3-sklearn': { files: ['/usr/lib/python3/dist-packages/sklearn/__init__.py'] },
};

/** Packages the server runs on. */
export const serverPackages = ['mariadb-server', 'gdal-bin'];

/** Packages only the tests use: a browser, and independent implementations to compare with. */
export const testPackages = ['chromium', 'python3-gdal', 'python3-sklearn'];

/**
 * Full path of a program, or null.
 *
 * @param {string} name
 */
export function findProgram(name) {
  const dirs = [...(process.env['PATH'] ?? '').split(delimiter).filter(Boolean), ...SYSTEM_DIRS];
  return dirs.map((dir) => join(dir, name)).find((path) => existsSync(path)) ?? null;
}

/**
 * The packages of a list that are not on this machine.
 *
 * @param {readonly string[]} packages
 */
export function listMissingPackages(packages) {
  return packages.filter((name) => {
    const evidence = EVIDENCE[name];
    if (evidence === undefined) throw new Error(`Nothing is known that would show whether ${name} is installed.`);
    const { programs = [], files = [] } = evidence;
    return !programs.every(findProgram) || !files.every((path) => existsSync(path));
  });
}

/**
 * Installs from Debian what is missing, when this user may without being asked for a password.
 *
 * @param {readonly string[]} packages
 * @throws {SetupError} one line naming what to install, where this user may not or Debian could not
 */
export async function ensureDebianPackages(packages) {
  const missing = listMissingPackages(packages);
  if (missing.length === 0) return;
  const byHand = `apt-get install --no-install-recommends ${missing.join(' ')}`;

  const prefix = findRootPrefix();
  if (prefix === null) throw new SetupError(`Missing Debian packages; install them as root: ${byHand}`);
  if (findProgram('apt-get') === null) throw new SetupError(`Missing, and there is no apt-get: ${missing.join(', ')}`);

  say(`Installing from Debian: ${missing.join(', ')}`);
  const install = ['install', '--yes', '--quiet', '--no-install-recommends', ...missing];
  for (const args of [['update', '--quiet'], install]) {
    const [command, ...rest] = [...prefix, 'apt-get', '-o', 'DPkg::Lock::Timeout=300', ...args];
    const code = await runCommand(String(command), rest, {
      env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
      quiet: true,
    });
    if (code !== 0) throw new SetupError(`apt-get ${args[0]} failed (exit code ${code}); install by hand: ${byHand}`);
  }
  const still = listMissingPackages(missing);
  if (still.length > 0) throw new SetupError(`Debian installed them, yet these are not found: ${still.join(', ')}`);
}

/** Words to put before a command that needs root, or null where this user may not. */
function findRootPrefix() {
  if (process.getuid?.() === 0) return [];
  const sudo = findProgram('sudo');
  if (sudo === null || spawnSync(sudo, ['-n', 'true']).status !== 0) return null;
  return [sudo, '-n', 'env', 'DEBIAN_FRONTEND=noninteractive'];
}
