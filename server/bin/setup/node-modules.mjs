import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { projectDir } from './paths.mjs';
import { runCommand } from './run-command.mjs';
import { SetupError, say } from './setup-error.mjs';

const MINIMUM_NODE = [20, 19];

/**
 * Stops on a Node too old for the build tools, which would fail with something harder to read.
 *
 * @throws {SetupError}
 */
export function checkNodeVersion() {
  const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
  const [wantedMajor = 0, wantedMinor = 0] = MINIMUM_NODE;
  if (major > wantedMajor || (major === wantedMajor && minor >= wantedMinor)) return;
  throw new SetupError(`Node ${process.versions.node} is too old; wanted ${MINIMUM_NODE.join('.')} or newer.`);
}

/**
 * Installs the packages of package-lock.json, unless exactly those were installed last time.
 *
 * @throws {SetupError} when npm fails
 */
export async function ensureNodeModules() {
  const stampFile = join(projectDir, 'node_modules', '.groundsel-lock');
  const stamp = digestLockFile();
  if (existsSync(stampFile) && readFileSync(stampFile, 'utf8') === stamp) return;

  say('Installing npm packages');
  // Under npm the very npm that started us is used; the build needs the development packages whatever NODE_ENV says.
  const npmScript = process.env['npm_execpath'];
  const [command, ...first] = npmScript?.endsWith('.js') ? [process.execPath, npmScript] : ['npm'];
  const code = await runCommand(String(command), [...first, 'ci', '--include=dev', '--no-audit', '--no-fund']);
  if (code !== 0) throw new SetupError(`npm ci failed (exit code ${code}); its own message stands above.`);
  writeFileSync(stampFile, stamp);
}

/** Packages with native parts differ by Node's ABI and the processor, so both belong to the stamp. */
function digestLockFile() {
  const lock = readFileSync(join(projectDir, 'package-lock.json'));
  const hash = createHash('sha256').update(lock).update(`${process.versions.modules} ${process.arch}`);
  return hash.digest('hex');
}
