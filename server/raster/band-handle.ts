import { fromFile, type GeoTIFF, type GeoTIFFImage } from 'geotiff';
import { stat } from 'node:fs/promises';
import { viewBandArray, type BandArray, type BandDtype } from './band-dtype.ts';
import { getBlockDecoder } from './block-decoder.ts';
import type { RasterGrid } from './raster-grid.ts';

/** One resolution of a band file; level 0 is full resolution. */
export interface BandLevel {
  width: number;
  height: number;
  blockWidth: number;
  blockHeight: number;
}

type BlockDecoder = Awaited<ReturnType<typeof getBlockDecoder>>;

interface OpenLevel extends BandLevel {
  image: GeoTIFFImage;
  decoder: BlockDecoder;
}

/** An open band file: its facts, and blocks decoded on demand without any cache. */
export class BandHandle {
  #pendingReads = 0;
  #onIdle: (() => void) | null = null;
  #isClosed = false;

  private constructor(
    private readonly tiff: GeoTIFF,
    private readonly openLevels: readonly OpenLevel[],
    readonly dtype: BandDtype,
    readonly nodata: number | null,
    readonly grid: RasterGrid,
    /** Changes when the file is replaced, so that no cached block outlives its file. */
    readonly version: string,
  ) {}

  get levels(): readonly BandLevel[] {
    return this.openLevels;
  }

  /**
   * Opens a one-band, tiled, little-endian GeoTIFF.
   * @throws {Error} when the file is anything else.
   */
  static async open(path: string): Promise<BandHandle> {
    const { mtimeMs, size } = await stat(path);
    const tiff = await fromFile(path);
    try {
      const openLevels: OpenLevel[] = [];
      const count = await tiff.getImageCount();
      for (let index = 0; index < count; index++) {
        const image = await tiff.getImage(index);
        const directory = image.fileDirectory;
        if (!image.isTiled || image.getSamplesPerPixel() !== 1 || !image.littleEndian) {
          throw new Error(`${path} is not a band file: wanted one tiled, little-endian band`);
        }
        await directory.loadValue('TileOffsets');
        await directory.loadValue('TileByteCounts');
        const blockWidth = image.getTileWidth();
        const blockHeight = image.getTileHeight();
        const decoder = await getBlockDecoder(Number((await directory.loadValue('Compression')) ?? 1), {
          tileWidth: blockWidth,
          tileHeight: blockHeight,
          predictor: Number((await directory.loadValue('Predictor')) ?? 1),
          bitsPerSample: image.getBitsPerSample(),
          planarConfiguration: 1,
        });
        openLevels.push({
          width: image.getWidth(),
          height: image.getHeight(),
          blockWidth,
          blockHeight,
          image,
          decoder,
        });
      }
      const full = openLevels[0].image;
      // The tag is text; deferred in some files, so it is loaded before it is asked for.
      await full.fileDirectory.loadValue('GDAL_NODATA');
      const dtype = readDtype(full);
      const nodata = readNodata(full, dtype);
      return new BandHandle(tiff, openLevels, dtype, nodata, readGrid(full), `${mtimeMs}:${size}`);
    } catch (error) {
      await tiff.close();
      throw error;
    }
  }

  /** Decodes block (blockCol, blockRow) of a level: blockWidth × blockHeight samples, padded beyond the image's edge. */
  async decodeBlock(level: number, blockCol: number, blockRow: number): Promise<BandArray> {
    const { image, decoder } = this.openLevels[level];
    this.#pendingReads++;
    try {
      const { data } = await image.getTileOrStrip(blockCol, blockRow, 0, decoder);
      return viewBandArray(this.dtype, data as ArrayBuffer);
    } finally {
      this.#pendingReads--;
      if (this.#pendingReads === 0) this.#onIdle?.();
    }
  }

  /** Whether reads must go to a new handle. */
  get isClosed(): boolean {
    return this.#isClosed;
  }

  /** Closes the file once the reads under way are done. */
  async close(): Promise<void> {
    this.#isClosed = true;
    if (this.#pendingReads > 0) await new Promise<void>((resolve) => (this.#onIdle = resolve));
    await this.tiff.close();
  }
}

function readDtype(image: GeoTIFFImage): BandDtype {
  const kind = ({ 1: 'uint', 2: 'int', 3: 'float' } as Record<number, string>)[image.getSampleFormat() ?? 1];
  const dtype = `${kind}${image.getBitsPerSample()}`;
  if (!/^(u?int(8|16|32)|float(32|64))$/.test(dtype)) throw new Error(`unsupported sample type ${dtype}`);
  return dtype as BandDtype;
}

/** The declared nodata value as a sample of this type would hold it. */
function readNodata(image: GeoTIFFImage, dtype: BandDtype): number | null {
  const declared = image.getGDALNoData();
  return declared !== null && dtype === 'float32' ? Math.fround(declared) : declared;
}

function readGrid(image: GeoTIFFImage): RasterGrid {
  const [originX, originY] = image.getOrigin();
  const [pixelWidth, minusPixelHeight] = image.getResolution();
  const pixelHeight = Math.abs(minusPixelHeight);
  return { width: image.getWidth(), height: image.getHeight(), originX, originY, pixelWidth, pixelHeight };
}
