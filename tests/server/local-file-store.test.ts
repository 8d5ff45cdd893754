import { spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { LocalFileStore } from '../../server/storage/local-file-store.ts';

let dir: string;
let store: LocalFileStore;
beforeEach(() => {
  dir = mkdtempSync(join(tmpdir(), 'groundsel-store-'));
  store = new LocalFileStore(dir);
});
afterEach(() => rmSync(dir, { recursive: true, force: true }));

describe('the local file store', () => {
  it('takes over a finished file and gives it back by its key', async () => {
    const work = await store.scratch('upload');
    writeFileSync(join(work.path, '1'), 'pixels');
    await store.adopt('scenes/a/band-01.tif', join(work.path, '1'));
    expect(readdirSync(work.path)).toEqual([]);
    expect(readFileSync(await store.localPath('scenes/a/band-01.tif'), 'utf8')).toBe('pixels');
    expect(await store.list('scenes/')).toEqual(['scenes/a/band-01.tif']);
    expect(await store.usedBytes('scenes/')).toBe(6);
    await store.remove('scenes/a/');
    expect(await store.has('scenes/a/band-01.tif')).toBe(false);
  });

  it('keeps keys within its folder', async () => {
    await expect(store.read('../secret')).rejects.toThrow();
    await expect(store.write('scenes/../../secret', new Uint8Array(1))).rejects.toThrow('leaves the store');
  });

  it('sweeps the working folders of processes that are gone, and of no other', async () => {
    const { pid } = spawnSync(process.execPath, ['-e', '']);
    const scratch = join(dir, 'scratch');
    for (const owner of [pid, process.ppid]) mkdirSync(join(scratch, `ingest.${owner}.some-id`), { recursive: true });
    await store.sweepScratch();
    expect(readdirSync(scratch)).toEqual([`ingest.${process.ppid}.some-id`]);
    const work = await store.scratch('run');
    expect(existsSync(work.path)).toBe(true);
    await work.dispose();
    expect(existsSync(work.path)).toBe(false);
  });
});
