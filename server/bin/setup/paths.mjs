import { dirname, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';

/** Top folder of the project. */
export const projectDir = resolve(dirname(fileURLToPath(import.meta.url)), '../../..');

/** Folder of everything compiled; can be deleted at any time. */
export const buildDir = resolve(projectDir, '.build');

/**
 * Path of the script behind a package's command, so that it runs as our own child: killing an npx process leaves its
 * program running.
 *
 * @param {'tsc' | 'vite' | 'vitest' | 'eslint' | 'tsx'} name
 */
export function findTool(name) {
  const scripts = {
    tsc: 'typescript/bin/tsc',
    vite: 'vite/bin/vite.js',
    vitest: 'vitest/vitest.mjs',
    eslint: 'eslint/bin/eslint.js',
    tsx: 'tsx/dist/cli.mjs',
  };
  return resolve(projectDir, 'node_modules', scripts[name]);
}
