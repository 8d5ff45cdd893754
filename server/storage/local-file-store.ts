import { randomUUID } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { access, mkdir, readdir, readFile, rename, rm, stat, writeFile } from 'node:fs/promises';
import { dirname, join, resolve, sep } from 'node:path';
import type { Readable } from 'node:stream';
import { isProcessAlive } from '../is-process-alive.ts';
import type { FileStore } from './file-store.ts';

function isMissing(error: unknown): boolean {
  return (error as NodeJS.ErrnoException).code === 'ENOENT';
}

/** Keeps stored files in a folder of this machine. */
export class LocalFileStore implements FileStore {
  private readonly filesDir: string;
  private readonly scratchDir: string;

  constructor(dataDir: string) {
    this.filesDir = resolve(dataDir, 'files');
    this.scratchDir = resolve(dataDir, 'scratch');
  }

  private pathOf(key: string): string {
    const path = resolve(this.filesDir, key);
    if (!path.startsWith(this.filesDir + sep)) throw new Error(`Key ${key} leaves the store.`);
    return path;
  }

  async adopt(key: string, localPath: string): Promise<void> {
    const path = this.pathOf(key);
    await mkdir(dirname(path), { recursive: true });
    await rename(localPath, path);
  }

  async write(key: string, bytes: Uint8Array): Promise<void> {
    const path = this.pathOf(key);
    await mkdir(dirname(path), { recursive: true });
    const half = `${path}.${randomUUID()}.part`;
    await writeFile(half, bytes, { flush: true });
    await rename(half, path);
  }

  async localPath(key: string): Promise<string> {
    const path = this.pathOf(key);
    await access(path);
    return path;
  }

  async read(key: string): Promise<Buffer> {
    return readFile(this.pathOf(key));
  }

  async stream(key: string): Promise<Readable> {
    return createReadStream(await this.localPath(key));
  }

  async has(key: string): Promise<boolean> {
    return (await this.statOf(key)) !== null;
  }

  async sizeBytes(key: string): Promise<number> {
    return (await stat(this.pathOf(key))).size;
  }

  async list(prefix: string): Promise<string[]> {
    const keys: string[] = [];
    for (const entry of await this.entriesOf(prefix)) {
      const key = prefix + entry.name;
      if (entry.isDirectory()) keys.push(...(await this.list(`${key}/`)));
      else if (!entry.name.endsWith('.part')) keys.push(key);
    }
    return keys.sort();
  }

  async remove(keyOrPrefix: string): Promise<void> {
    await rm(this.pathOf(keyOrPrefix), { recursive: true, force: true });
  }

  async usedBytes(prefix: string): Promise<number> {
    let bytes = 0;
    for (const key of await this.list(prefix)) bytes += (await this.statOf(key))?.size ?? 0;
    return bytes;
  }

  async scratch(name: string): Promise<{ path: string; dispose(): Promise<void> }> {
    const path = join(this.scratchDir, `${name}.${process.pid}.${randomUUID()}`);
    await mkdir(path, { recursive: true, mode: 0o700 });
    return { path, dispose: () => rm(path, { recursive: true, force: true }) };
  }

  /** Removes working folders whose process is gone. To be called before this process makes its first. */
  async sweepScratch(): Promise<void> {
    await mkdir(this.scratchDir, { recursive: true });
    for (const name of await readdir(this.scratchDir)) {
      const pid = Number(name.split('.').at(-2));
      // A folder under this process's own number is of an earlier process that had it: numbers come round again.
      if (pid === process.pid || !isProcessAlive(pid))
        await rm(join(this.scratchDir, name), { recursive: true, force: true });
    }
  }

  private async statOf(key: string) {
    try {
      return await stat(this.pathOf(key));
    } catch (error) {
      if (isMissing(error)) return null;
      throw error;
    }
  }

  private async entriesOf(prefix: string) {
    try {
      return await readdir(this.pathOf(prefix), { withFileTypes: true });
    } catch (error) {
      if (isMissing(error)) return [];
      throw error;
    }
  }
}
