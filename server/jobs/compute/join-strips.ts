import { open, readFile } from 'node:fs/promises';
import { inflateRawSync } from 'node:zlib';
import type { ComputeTasks } from './tasks.ts';

/** Joins deflated strips of a layer into one raw file, from top to bottom. */
export async function joinStrips({ stripPaths, rawPath }: ComputeTasks['join-strips']['input']): Promise<null> {
  const raw = await open(rawPath, 'w');
  try {
    for (const path of stripPaths) await raw.writeFile(inflateRawSync(await readFile(path)));
  } finally {
    await raw.close();
  }
  return null;
}
