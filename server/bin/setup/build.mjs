import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join, relative } from 'node:path';
import { buildDir, findTool, projectDir } from './paths.mjs';
import { runCommand } from './run-command.mjs';
import { SetupError, say } from './setup-error.mjs';

const SOURCE_DIRS = ['client', 'server', 'shared'];
const SOURCE_FILES = ['package-lock.json', 'tsconfig.json', 'vite.config.ts'];
const stampFile = join(buildDir, 'sources.sha256');

/**
 * Compiles the server and bundles the client, unless this very source was built last time.
 *
 * @throws {SetupError} when either fails
 */
export async function ensureBuild() {
  if (isBuildCurrent()) return;
  say('Building');
  const [serverCode, clientCode] = await Promise.all([compileTypeScript('server'), bundleClient()]);
  if (serverCode !== 0) throw new SetupError('The server does not compile; the messages stand above.');
  if (clientCode !== 0) throw new SetupError('The client cannot be bundled; the messages stand above.');
  markBuildCurrent();
}

/** Whether the source is what was last built. */
export function isBuildCurrent() {
  return existsSync(stampFile) && readFileSync(stampFile, 'utf8') === digestSources();
}

/** Records that the source as it stands is built. */
export function markBuildCurrent() {
  mkdirSync(buildDir, { recursive: true });
  writeFileSync(stampFile, digestSources());
}

/**
 * Type-checks and compiles a project and those it builds on.
 *
 * @param {string} project folder of a tsconfig.json, from the top folder
 * @returns {Promise<number>} exit code
 */
export function compileTypeScript(project) {
  for (const dir of ['server', 'shared']) removeOrphans(join(buildDir, dir));
  return runCommand(process.execPath, [findTool('tsc'), '-b', project]);
}

/** @returns {Promise<number>} exit code of the client's production bundling */
export function bundleClient() {
  const env = { ...process.env, NODE_ENV: 'production' };
  return runCommand(process.execPath, [findTool('vite'), 'build', '--logLevel', 'warn'], { env });
}

/**
 * Removes compiled files whose source is gone: a deleted migration must not run again from its compiled copy.
 *
 * @param {string} dir
 */
function removeOrphans(dir) {
  if (!existsSync(dir)) return;
  for (const path of listFiles(dir)) {
    const source = join(projectDir, relative(buildDir, path)).replace(/\.(?:d\.ts|js)(?:\.map)?$/, '');
    if (/\.(?:d\.ts|js)(?:\.map)?$/.test(path) && !existsSync(`${source}.ts`)) rmSync(path);
  }
}

function digestSources() {
  const hash = createHash('sha256');
  const paths = [
    ...SOURCE_FILES.map((name) => join(projectDir, name)),
    ...SOURCE_DIRS.flatMap((dir) => listFiles(join(projectDir, dir))),
  ];
  for (const path of paths.filter((name) => existsSync(name))) {
    hash.update(relative(projectDir, path)).update('\0').update(readFileSync(path)).update('\0');
  }
  return hash.digest('hex');
}

/**
 * All files below a folder, in a stable order.
 *
 * @param {string} dir
 * @returns {string[]}
 */
function listFiles(dir) {
  if (!existsSync(dir)) return [];
  const entries = readdirSync(dir, { recursive: true, withFileTypes: true });
  return entries
    .filter((entry) => entry.isFile())
    .map((entry) => join(entry.parentPath, entry.name))
    .sort();
}
