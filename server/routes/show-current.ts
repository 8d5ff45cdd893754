import { Conflict } from '../errors.ts';

/** Runs a change; when it meets a newer version, the conflict carries that version as `current` shows it. */
export async function showCurrent<T>(change: () => Promise<T>, current: () => Promise<unknown>): Promise<T> {
  try {
    return await change();
  } catch (error) {
    if (!(error instanceof Conflict) || error.code !== 'stale-version') throw error;
    throw new Conflict(error.message, { ...error.detail, current: await current() }, error.code);
  }
}
