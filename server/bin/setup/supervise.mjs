import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { projectDir } from './paths.mjs';
import { say } from './setup-error.mjs';

/** Requests and jobs under way may take this long to be put away before the server is ended by force. */
const CLOSE_GRACE_MS = 30_000;

const followParent = new URL('./follow-parent.mjs', import.meta.url).href;

/**
 * Runs programs until one ends or a stop is asked for, then ends the others too.
 *
 * @param {readonly { args: readonly string[], env: NodeJS.ProcessEnv }[]} programs arguments to Node, with the environment
 * @param {Promise<string>} stopAsked resolves with the reason to stop
 * @returns {Promise<number>} exit code of the first that ended; 0 for a stop that was asked for and went well
 */
export async function supervise(programs, stopAsked) {
  const children = programs.map(({ args, env }) =>
    // In process groups of their own, so that a Ctrl+C reaches them once, through us; the channel tells them, see
    // follow-parent.mjs, when we are gone.
    spawn(process.execPath, ['--import', followParent, ...args], {
      cwd: projectDir,
      env,
      detached: true,
      stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
    }),
  );
  const exits = children.map((child) => once(child, 'exit'));
  const reason = await Promise.race([stopAsked, ...exits.map((exit) => exit.then(() => null))]);
  if (reason !== null) say(`Stopping: ${reason}`);

  const running = children.filter((child) => child.exitCode === null && child.signalCode === null);
  const firstDone = children.find((child) => !running.includes(child));
  for (const child of running) child.kill('SIGTERM');
  const force = setTimeout(() => {
    say(`Not closed after ${CLOSE_GRACE_MS / 1000} s; ending it by force`);
    for (const child of running) child.kill('SIGKILL');
  }, CLOSE_GRACE_MS);
  await Promise.all(exits);
  clearTimeout(force);

  if (firstDone !== undefined) return firstDone.exitCode ?? 128;
  const failed = children.find((child) => child.exitCode !== 0 && child.signalCode !== 'SIGTERM');
  return failed === undefined ? 0 : (failed.exitCode ?? 128);
}

/**
 * Resolves when this process shall stop: by signal, or because npm, which started it, is gone without passing one on.
 *
 * @returns {Promise<string>} the reason, for the terminal
 */
export function waitForStop() {
  return new Promise((resolve) => {
    for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) {
      process.on(signal, () => resolve(`received ${signal}`));
    }
    if (process.env['npm_lifecycle_event'] === undefined) return;
    const parent = process.ppid;
    const watch = setInterval(() => {
      if (process.ppid === parent) return;
      clearInterval(watch);
      resolve('npm has ended');
    }, 500);
    watch.unref();
  });
}
