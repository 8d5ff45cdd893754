import { execFileSync } from 'node:child_process';
import { cpus, loadavg } from 'node:os';
import { fileURLToPath } from 'node:url';

/** Debian's own Python, which has scikit-learn and GDAL. */
const PYTHON = '/usr/bin/python3';

/** Runs one of the scripts beside this file and reads the JSON it prints. */
export function runReference<T>(script: string, args: readonly string[]): T {
  const path = fileURLToPath(new URL(script, import.meta.url));
  const out = execFileSync(PYTHON, [path, ...args], { encoding: 'utf8', maxBuffer: 1 << 24 });
  return JSON.parse(out) as T;
}

/** A whole-number option of the command line, `--name=value`. */
export function readOption(name: string, fallback: number): number {
  const given = process.argv.find((argument) => argument.startsWith(`--${name}=`));
  return given === undefined ? fallback : Number(given.split('=')[1]);
}

export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
}

/** What the figures were measured on. */
export function describeMachine(): string {
  const load = loadavg()[0].toFixed(1);
  return `${cpus().length} × ${cpus()[0].model}, Node ${process.version}, load ${load} at the start`;
}

/** Ours against the reference, with every pass and the ratio of the medians. */
export function printRatio(what: string, ours: readonly number[], reference: readonly number[]): void {
  const seconds = (values: readonly number[]) => values.map((value) => value.toFixed(2)).join(' ');
  const ratio = median(reference) / median(ours);
  console.log(
    `${what}: ours ${median(ours).toFixed(2)} s (${seconds(ours)}), scikit-learn ${median(reference).toFixed(2)} s (${seconds(reference)}): ${ratio.toFixed(2)} × as fast`,
  );
}
