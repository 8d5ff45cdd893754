import { createBandArray, type BandArray, type BandDtype } from './band-dtype.ts';
import type { BandHandle, BandLevel } from './band-handle.ts';
import type { BlockCache } from './block-cache.ts';
import type { RasterGrid } from './raster-grid.ts';

/** What a band file needs of the store that holds it. */
interface HandleSource {
  readonly cache: BlockCache;
  acquire(path: string): Promise<BandHandle>;
  forget(path: string): Promise<void>;
}

/** One band of a scene, or a class map, on disk: full resolution and its overviews, read by blocks. */
export class BandFile {
  readonly dtype: BandDtype;
  /** Value of pixels without data, may be NaN; null where every pixel has data. */
  readonly nodata: number | null;
  readonly grid: RasterGrid;
  readonly levels: readonly BandLevel[];
  readonly #version: string;

  constructor(
    readonly path: string,
    handle: BandHandle,
    private readonly source: HandleSource,
  ) {
    this.dtype = handle.dtype;
    this.nodata = handle.nodata;
    this.grid = handle.grid;
    this.levels = handle.levels.map(({ width, height, blockWidth, blockHeight }) => ({
      width,
      height,
      blockWidth,
      blockHeight,
    }));
    this.#version = handle.version;
  }

  /** Full-resolution pixels per pixel of a level, along x; 1 for level 0. */
  getLevelFactor(level: number): number {
    return this.grid.width / this.levels[level].width;
  }

  /** The coarsest level whose pixels are no larger than `pixelsPerSample` full-resolution pixels, within five per cent. */
  chooseLevel(pixelsPerSample: number): number {
    let chosen = 0;
    for (let level = 1; level < this.levels.length; level++) {
      if (this.getLevelFactor(level) <= pixelsPerSample * 1.05) chosen = level;
    }
    return chosen;
  }

  /** Block (blockCol, blockRow) of a level, padded to full size beyond the edge; shared with the cache, so not to be written to. */
  async readBlock(level: number, blockCol: number, blockRow: number, keep = true): Promise<BandArray> {
    const key = `${this.path}|${this.#version}|${level}|${blockCol}|${blockRow}`;
    const cached = this.source.cache.get(key);
    if (cached !== undefined) return cached;
    let handle = await this.source.acquire(this.path);
    // Between the promise and this line the store may have closed it to open another file.
    while (handle.isClosed) handle = await this.source.acquire(this.path);
    if (handle.version !== this.#version) {
      // What is known here no longer fits the file; the next one to open it starts afresh.
      await this.source.forget(this.path);
      throw new Error(`${this.path} changed while it was being read`);
    }
    const block = await handle.decodeBlock(level, blockCol, blockRow);
    if (keep) this.source.cache.set(key, block);
    return block;
  }

  /**
   * Reads a window of a level, row-major, width × height samples.
   * @throws {RangeError} when the window is not wholly inside the level.
   */
  async readWindow(
    level: number,
    x: number,
    y: number,
    width: number,
    height: number,
    options: { keep?: boolean; into?: BandArray } = {},
  ): Promise<BandArray> {
    const { width: levelWidth, height: levelHeight, blockWidth, blockHeight } = this.levels[level];
    if (x < 0 || y < 0 || width < 1 || height < 1 || x + width > levelWidth || y + height > levelHeight) {
      throw new RangeError(
        `window ${width} × ${height} at ${x}, ${y} is not inside ${levelWidth} × ${levelHeight} (${this.path}, level ${level})`,
      );
    }
    const out = options.into ?? createBandArray(this.dtype, width * height);
    const lastBlockRow = Math.floor((y + height - 1) / blockHeight);
    const lastBlockCol = Math.floor((x + width - 1) / blockWidth);
    for (let blockRow = Math.floor(y / blockHeight); blockRow <= lastBlockRow; blockRow++) {
      for (let blockCol = Math.floor(x / blockWidth); blockCol <= lastBlockCol; blockCol++) {
        const block = await this.readBlock(level, blockCol, blockRow, options.keep);
        const fromX = Math.max(x, blockCol * blockWidth);
        const toX = Math.min(x + width, (blockCol + 1) * blockWidth);
        const fromY = Math.max(y, blockRow * blockHeight);
        const toY = Math.min(y + height, (blockRow + 1) * blockHeight);
        for (let row = fromY; row < toY; row++) {
          const start = (row - blockRow * blockHeight) * blockWidth + (fromX - blockCol * blockWidth);
          out.set(block.subarray(start, start + (toX - fromX)), (row - y) * width + (fromX - x));
        }
      }
    }
    return out;
  }
}
