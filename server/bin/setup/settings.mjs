import { existsSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { pathToFileURL } from 'node:url';
import { projectDir } from './paths.mjs';
import { SetupError } from './setup-error.mjs';

const STAND_IN = {
  GROUNDSEL_DB_HOST: '127.0.0.1',
  GROUNDSEL_DB_USER: 'groundsel',
  GROUNDSEL_DB_PASSWORD: 'made-at-start',
};
const STAND_IN_SECRET = { GROUNDSEL_SESSION_SECRET: 'made-at-start'.repeat(3) };

/** Reads `.env` beside package.json, if it is there; variables that are set already win. */
export function loadEnvFile() {
  const path = join(projectDir, '.env');
  if (existsSync(path)) process.loadEnvFile(path);
}

/**
 * Whether the operator brings a MariaDB of their own.
 *
 * @throws {SetupError} when its other settings are given without its host: they would be passed over in silence
 */
export function usesExternalDatabase() {
  if (isGiven('GROUNDSEL_DB_HOST')) return true;
  const stray = ['PORT', 'USER', 'PASSWORD', 'NAME'].map((word) => `GROUNDSEL_DB_${word}`).filter(isGiven);
  if (stray.length === 0) return false;
  throw new SetupError(
    `${stray.join(', ')}: found without GROUNDSEL_DB_HOST; give the host of your MariaDB server too, or none of them ` +
      'to have Groundsel run its own.',
  );
}

/**
 * Checks all settings by the server's own rules before anything is started. What start-up makes itself (database,
 * session secret) need not be given. The data folder is counted from the project's top folder.
 *
 * @returns {Promise<import('../../config.ts').Config>}
 * @throws {Error} a ConfigError with everything that is wrong
 */
export async function readSettings() {
  // Settings are checked by the TypeScript source, so that a mistake in them is said before the build.
  const { tsImport } = await import('tsx/esm/api');
  const { readConfig } = /** @type {typeof import('../../config.ts')} */ (
    await tsImport(pathToFileURL(join(projectDir, 'server/config.ts')).href, import.meta.url)
  );
  const config = readConfig({
    ...process.env,
    ...(usesExternalDatabase() ? {} : STAND_IN),
    ...(isGiven('GROUNDSEL_SESSION_SECRET') ? {} : STAND_IN_SECRET),
  });
  return { ...config, dataDir: resolve(projectDir, process.env['GROUNDSEL_DATA_DIR']?.trim() || '.data') };
}

/** @param {string} name */
export function isGiven(name) {
  return (process.env[name] ?? '').trim() !== '';
}
