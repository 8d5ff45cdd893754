import { chmodSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { bundleClient, compileTypeScript, isBuildCurrent, markBuildCurrent } from './setup/build.mjs';
import { prepareDataDir } from './setup/data-folder.mjs';
import { ensureDebianPackages, serverPackages, testPackages } from './setup/debian-packages.mjs';
import { startMariadb } from './setup/mariadb.mjs';
import { checkNodeVersion, ensureNodeModules } from './setup/node-modules.mjs';
import { findTool } from './setup/paths.mjs';
import { runCommand } from './setup/run-command.mjs';
import { describeFailure, say } from './setup/setup-error.mjs';
import { waitForStop } from './setup/supervise.mjs';
import { addCounts, countChecks, countVitestReport, describeCounts } from './setup/test-counts.mjs';

const stopAsked = new AbortController();

/** `npm test`: type check, lint, build, and every test against a MariaDB of their own. Arguments go to vitest. */
async function test() {
  checkNodeVersion();
  await ensureDebianPackages([...serverPackages, ...testPackages]);
  await ensureNodeModules();

  // From here on a Ctrl+C ends the program that runs, and what was started is still taken down again.
  void waitForStop().then((reason) => {
    say(`Stopping: ${reason}`);
    stopAsked.abort();
  });
  const vitestArgs = process.argv.slice(2);
  const checks = await runChecks(vitestArgs.length === 0);
  const dir = mkdtempSync(join(tmpdir(), 'groundsel-test-'));
  // Run by root, MariaDB works as a user of its own and has to pass through.
  if (process.getuid?.() === 0) chmodSync(dir, 0o711);
  try {
    return addCounts(checks, await runVitest(dir, vitestArgs));
  } finally {
    rmSync(dir, { recursive: true, force: true });
  }
}

/**
 * Each check counts as one test; when one fails the tests still run.
 *
 * @param {boolean} withLint left out when only some tests were asked for
 */
async function runChecks(withLint) {
  say('Checking types');
  const types = await compileTypeScript('.');
  /** @type {Record<string, number>} */
  const exitCodes = { types };
  if (!isBuildCurrent()) {
    say('Bundling the client');
    exitCodes['client build'] = await bundleClient();
    if (types === 0 && exitCodes['client build'] === 0) markBuildCurrent();
  }
  if (withLint) {
    say('Linting');
    exitCodes['lint'] = await runCommand(process.execPath, [findTool('eslint'), '.'], { signal: stopAsked.signal });
  }
  for (const [name, code] of Object.entries(exitCodes))
    if (code !== 0) say(`Check failed: ${name} (exit code ${code})`);
  return countChecks(exitCodes);
}

/**
 * @param {string} dir for the database and the report
 * @param {readonly string[]} args
 */
async function runVitest(dir, args) {
  const database = await startMariadb({ dataDir: prepareDataDir(dir), durable: false, mayCreateDatabases: true });
  const report = join(dir, 'report.json');
  try {
    const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`];
    const exitCode = await runCommand(process.execPath, [findTool('vitest'), 'run', ...reporters, ...args], {
      env: describeTestEnvironment(database),
      signal: stopAsked.signal,
    });
    if (exitCode !== 0) say(`Check failed: tests (vitest's exit code ${exitCode})`);
    return countVitestReport(report, exitCode);
  } finally {
    await database.stop();
  }
}

/**
 * The settings of whoever runs the tests must not change their outcome, so none of theirs is passed on.
 *
 * @param {import('./setup/mariadb.mjs').Mariadb} database
 * @returns {NodeJS.ProcessEnv}
 */
function describeTestEnvironment({ host, port, user, password }) {
  const rest = Object.entries(process.env).filter(([name]) => !name.startsWith('GROUNDSEL_') && name !== 'NODE_ENV');
  return {
    ...Object.fromEntries(rest),
    NODE_ENV: 'test',
    GROUNDSEL_TEST_DB_HOST: host,
    GROUNDSEL_TEST_DB_PORT: String(port),
    GROUNDSEL_TEST_DB_USER: user,
    GROUNDSEL_TEST_DB_PASSWORD: password,
  };
}

let counts = { passed: 0, failed: 0, skipped: 0 };
try {
  counts = await test();
} catch (error) {
  console.error(describeFailure(error));
  counts.failed += 1;
}
if (counts.passed + counts.failed === 0) counts.failed = 1;
process.exitCode = counts.failed === 0 ? 0 : 1;
say(describeCounts(counts));
