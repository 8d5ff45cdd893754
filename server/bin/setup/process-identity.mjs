import { readFileSync } from 'node:fs';

/**
 * What tells one process from a later one with the same number: the machine's boot and the start time after it.
 * Containers hand out the same low numbers at every start, so the number alone proves nothing.
 *
 * @param {number} pid
 * @returns {string | null} null when there is no such process
 */
export function identifyProcess(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    // The second field, the program's name, may hold spaces and brackets: count from its end. Z is an ended process
    // whose parent has not asked for its exit code yet.
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    if (fields[0] === 'Z') return null;
    return `${readFileSync('/proc/sys/kernel/random/boot_id', 'utf8').trim()} ${pid} ${fields[19]}`;
  } catch (error) {
    if (isErrno(error, 'ENOENT') || isErrno(error, 'ESRCH')) return null;
    throw error;
  }
}

/**
 * The words a process was started with; empty when it is gone or hidden from us.
 *
 * @param {number} pid
 * @returns {string[]}
 */
export function readCommandLine(pid) {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, 'utf8').split('\0').filter(Boolean);
  } catch (error) {
    if (isErrno(error, 'ENOENT') || isErrno(error, 'ESRCH') || isErrno(error, 'EACCES')) return [];
    throw error;
  }
}

/**
 * Waits until a process has ended.
 *
 * @param {number} pid
 * @param {number} timeoutMs
 * @returns {Promise<boolean>} false when it still runs after that time
 */
export async function waitForProcessEnd(pid, timeoutMs) {
  const identity = identifyProcess(pid);
  const deadline = Date.now() + timeoutMs;
  while (identity !== null && identifyProcess(pid) === identity) {
    if (Date.now() > deadline) return false;
    await new Promise((wake) => setTimeout(wake, 50));
  }
  return true;
}

/**
 * @param {unknown} error
 * @param {string} code such as ENOENT
 */
export function isErrno(error, code) {
  return error instanceof Error && 'code' in error && error.code === code;
}
