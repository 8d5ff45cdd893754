import { readdirSync, readFileSync } from 'node:fs';

const PAGE_BYTES = 4096;

/** Resident memory of a process and all that it started, bytes; pages that several of them share count for each. */
export function measureProcessTree(rootPid: number): number {
  const parents = new Map<number, { parent: number; bytes: number }>();
  for (const name of readdirSync('/proc')) {
    if (!/^\d+$/.test(name)) continue;
    try {
      // The command's name, in brackets, may hold spaces; the fields after it do not.
      const fields = readFileSync(`/proc/${name}/stat`, 'utf8').split(') ').at(-1)!.split(' ');
      parents.set(Number(name), { parent: Number(fields[1]), bytes: Number(fields[21]) * PAGE_BYTES });
    } catch (error) {
      if (!['ENOENT', 'ESRCH'].includes(String((error as NodeJS.ErrnoException).code))) throw error;
    }
  }
  const belongs = (pid: number): boolean => pid === rootPid || belongsToParent(pid);
  const belongsToParent = (pid: number): boolean => {
    const parent = parents.get(pid)?.parent ?? 0;
    return parent > 1 && belongs(parent);
  };
  let total = 0;
  for (const [pid, { bytes }] of parents) if (belongs(pid)) total += bytes;
  return total;
}
