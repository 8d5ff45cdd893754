/** Something the person at the terminal has to mend; its message is all that is shown, without a stack. */
export class SetupError extends Error {
  /** @override */
  name = 'SetupError';
}

/** @param {string} line Progress for the person at the terminal. */
export function say(line) {
  process.stdout.write(`${line}\n`);
}

/**
 * Text for the terminal: the plain message where the person can act on it, the whole stack where it is our mistake.
 *
 * @param {unknown} error
 */
export function describeFailure(error) {
  if (error instanceof SetupError) return error.message;
  if (error instanceof Error && error.name === 'ConfigError') return error.message;
  return error instanceof Error ? (error.stack ?? error.message) : String(error);
}
