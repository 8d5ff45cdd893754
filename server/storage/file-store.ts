import type { Readable } from 'node:stream';

/**
 * Stored files by key ("scenes/<id>/band-01.tif"). Nothing outside a call may assume that a file is on this machine:
 * `localPath` brings it here when it is not.
 */
export interface FileStore {
  /** Takes over a finished local file; the local path is gone afterwards. Replaces what the key held, at once or not at all. */
  adopt(key: string, localPath: string): Promise<void>;
  /** Writes bytes under a key, at once or not at all. */
  write(key: string, bytes: Uint8Array): Promise<void>;
  /** Path of a readable local copy. @throws when the key holds nothing */
  localPath(key: string): Promise<string>;
  read(key: string): Promise<Buffer>;
  stream(key: string): Promise<Readable>;
  has(key: string): Promise<boolean>;
  sizeBytes(key: string): Promise<number>;
  /** Keys below a prefix that ends in "/", sorted. */
  list(prefix: string): Promise<string[]>;
  /** Removes a key, or all below a prefix that ends in "/". Removing nothing is no error. */
  remove(keyOrPrefix: string): Promise<void>;
  /** Bytes stored below a prefix that ends in "/". */
  usedBytes(prefix: string): Promise<number>;
  /** A fresh private local folder for work in progress; `dispose` removes it. */
  scratch(name: string): Promise<{ path: string; dispose(): Promise<void> }>;
}
