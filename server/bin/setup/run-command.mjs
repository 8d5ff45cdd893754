import { spawn } from 'node:child_process';
import { projectDir } from './paths.mjs';
import { SetupError } from './setup-error.mjs';

/**
 * Runs a program to its end, from the project's top folder unless told otherwise, its output shown as it comes.
 *
 * @param {string} command
 * @param {readonly string[]} args
 * @param {{ env?: NodeJS.ProcessEnv, cwd?: string, quiet?: boolean, signal?: AbortSignal }} [options] `quiet` shows the
 *   output only when the program fails; `signal` ends the program early.
 * @returns {Promise<number>} its exit code; 128 when a signal ended it
 * @throws {SetupError} when it cannot be started
 */
export function runCommand(command, args, { env = process.env, cwd = projectDir, quiet = false, signal } = {}) {
  return new Promise((resolvePromise, reject) => {
    const child = spawn(command, args, {
      cwd,
      env,
      signal,
      stdio: ['ignore', quiet ? 'pipe' : 'inherit', quiet ? 'pipe' : 'inherit'],
    });
    /** @type {Buffer[]} */
    const held = [];
    child.stdout?.on('data', (chunk) => held.push(chunk));
    child.stderr?.on('data', (chunk) => held.push(chunk));
    child.once('error', (error) => {
      // An aborted program still closes, with its exit code.
      if (error.name !== 'AbortError') reject(new SetupError(`${command} cannot be started: ${error.message}`));
    });
    child.once('close', (code) => {
      if (code !== 0 && held.length > 0) process.stderr.write(Buffer.concat(held));
      resolvePromise(code ?? 128);
    });
  });
}
