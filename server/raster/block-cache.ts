import type { BandArray } from './band-dtype.ts';

/** Decoded blocks, least recently used first out, within a budget of bytes. */
export class BlockCache {
  readonly #blocks = new Map<string, BandArray>();
  #bytes = 0;

  constructor(readonly maxBytes: number) {}

  get bytes(): number {
    return this.#bytes;
  }

  get(key: string): BandArray | undefined {
    const block = this.#blocks.get(key);
    if (block !== undefined) {
      // A Map keeps insertion order: putting the block back makes it the youngest.
      this.#blocks.delete(key);
      this.#blocks.set(key, block);
    }
    return block;
  }

  set(key: string, block: BandArray): void {
    const before = this.#blocks.get(key);
    if (before !== undefined) {
      this.#bytes -= before.byteLength;
      this.#blocks.delete(key);
    }
    if (block.byteLength > this.maxBytes) return;
    this.#blocks.set(key, block);
    this.#bytes += block.byteLength;
    for (const [oldKey, old] of this.#blocks) {
      if (this.#bytes <= this.maxBytes) break;
      this.#blocks.delete(oldKey);
      this.#bytes -= old.byteLength;
    }
  }

  clear(): void {
    this.#blocks.clear();
    this.#bytes = 0;
  }
}
