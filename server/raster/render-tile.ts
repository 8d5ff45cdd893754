import sharp from 'sharp';
import type { BandStore } from './band-store.ts';
import { colorClasses, colorComposite, colorSingle } from './color-tile.ts';
import { sampleBand, type SampledBand } from './sample-band.ts';
import { getSceneGeometry, validateTileAddress } from './tile-geometry.ts';
import type { TileRequest } from './tile-request.ts';
import { buildWarpGrid } from './warp-grid.ts';

/** The pixels of a tile before they are encoded: RGBA, row-major. */
export interface TilePixels {
  size: number;
  rgba: Uint8Array;
  isOpaque: boolean;
}

/**
 * Draws a Web Mercator tile of a scene or class map, reprojected from the band files, and encodes it as WebP:
 * lossy for imagery, lossless for classes. Pixels without data in any band shown, or outside, are transparent.
 * Returns null when nothing of the scene is on the tile.
 * @throws {RangeError} for a tile that doesn't exist.
 * @throws {Error} when a band file can't be read.
 */
export async function renderTile(request: TileRequest, store: BandStore): Promise<Buffer | null> {
  const pixels = await renderTilePixels(request, store);
  return pixels === null ? null : encodeTile(pixels, request.layer.kind === 'classes');
}

/** As `renderTile`, without the encoding. */
export async function renderTilePixels(request: TileRequest, store: BandStore): Promise<TilePixels | null> {
  const { z, x, y, size = 256, crs, grid, layer, resampling = 'nearest', gamma = 1 } = request;
  validateTileAddress({ z, x, y, size });
  const warp = buildWarpGrid({ z, x, y, size }, getSceneGeometry(grid, crs));
  if (warp === null) return null;

  const sampled = new Map<string, SampledBand | null>();
  const sample = async (path: string): Promise<SampledBand | null> => {
    let band = sampled.get(path);
    if (band === undefined) {
      const method = layer.kind === 'classes' ? 'nearest' : resampling;
      band = await sampleBand(await store.open(path), grid, warp, method);
      sampled.set(path, band);
    }
    return band;
  };

  const rgba = new Uint8Array(size * size * 4);
  let nShown = 0;
  if (layer.kind === 'composite') {
    const red = await sample(layer.bands[0]);
    const green = await sample(layer.bands[1]);
    const blue = await sample(layer.bands[2]);
    if (red === null || green === null || blue === null) return null;
    nShown = colorComposite([red, green, blue], layer.stretch, gamma, rgba);
  } else {
    const band = await sample(layer.band);
    if (band === null) return null;
    nShown =
      layer.kind === 'single'
        ? colorSingle(band, layer.stretch, gamma, layer.ramp, rgba)
        : colorClasses(band, layer.palette, rgba);
  }
  return nShown === 0 ? null : { size, rgba, isOpaque: nShown === size * size };
}

// Quality is enough for looking at imagery; values are read with the pixel probe, never from a tile.
const imageryQuality = 82;

async function encodeTile({ size, rgba, isOpaque }: TilePixels, isLossless: boolean): Promise<Buffer> {
  let image = sharp(rgba, { raw: { width: size, height: size, channels: 4 } });
  if (isOpaque) image = image.removeAlpha();
  return image
    .webp(
      isLossless
        ? { lossless: true, effort: 0, exact: false }
        : { quality: imageryQuality, alphaQuality: 100, effort: 0 },
    )
    .toBuffer();
}
