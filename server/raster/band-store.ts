import { BandFile } from './band-file.ts';
import { BandHandle } from './band-handle.ts';
import { BlockCache } from './block-cache.ts';
import { registerZlibDecoder } from './block-decoder.ts';

export interface BandStoreOptions {
  /** Budget for decoded blocks of all files together. */
  cacheMb?: number;
  maxOpenFiles?: number;
  /** `blocking` is faster and fit for worker threads; `async` keeps a thread that serves requests free. */
  decode?: 'blocking' | 'async';
}

/** The band files a thread reads: one cache of decoded blocks, and no more than so many open files. */
export class BandStore {
  readonly cache: BlockCache;
  readonly #files = new Map<string, BandFile>();
  readonly #handles = new Map<string, Promise<BandHandle>>();
  readonly #maxOpenFiles: number;

  constructor({ cacheMb = 128, maxOpenFiles = 48, decode = 'blocking' }: BandStoreOptions = {}) {
    registerZlibDecoder(decode);
    this.cache = new BlockCache(cacheMb * 1024 * 1024);
    this.#maxOpenFiles = maxOpenFiles;
  }

  /**
   * The band file at a path; opened on first use, and reopened unseen where it had to be closed.
   * @throws {Error} when the file is missing or no band file.
   */
  async open(path: string): Promise<BandFile> {
    let file = this.#files.get(path);
    if (file === undefined) {
      const handle = await this.acquire(path);
      file = new BandFile(path, handle, this);
      this.#files.set(path, file);
    }
    return file;
  }

  /** The open handle of a path, for `BandFile`; the least recently used handle is closed when there are too many. */
  acquire(path: string): Promise<BandHandle> {
    let handle = this.#handles.get(path);
    if (handle === undefined) {
      handle = BandHandle.open(path);
      handle.catch(() => this.#handles.delete(path));
    } else {
      this.#handles.delete(path);
    }
    this.#handles.set(path, handle);
    if (this.#handles.size > this.#maxOpenFiles) {
      const [oldestPath, oldest] = this.#handles.entries().next().value!;
      this.#handles.delete(oldestPath);
      // A handle that never opened has nothing to close; its opener has the error.
      void oldest.then(
        (open) => open.close(),
        () => undefined,
      );
    }
    return handle;
  }

  /** Forgets a file that was replaced or is about to be deleted; one still held open would go on giving what it held. */
  async forget(path: string): Promise<void> {
    this.#files.delete(path);
    const handle = this.#handles.get(path);
    this.#handles.delete(path);
    await (await handle)?.close();
  }

  async close(): Promise<void> {
    const paths = [...this.#handles.keys()];
    await Promise.all(paths.map((path) => this.forget(path)));
    this.#files.clear();
    this.cache.clear();
  }
}
