import type { ArealGeometry } from '../../shared/contracts/geometry.ts';
import { rasterisePolygon } from '../analysis/sampling/rasterise-polygon.ts';
import type { App } from '../app-context.ts';
import type { Band } from '../entities/band.ts';
import type { Sample } from '../entities/sample.ts';
import { keepInside } from '../jobs/compute/study-area-mask.ts';
import { hasPixelWithData } from '../raster/pixel-features.ts';
import { drawInPixels, openSceneInput, type PlacedScene } from './run-scene.ts';

/** Keeps a run's training set and its bookkeeping within memory. */
export const MAX_SAMPLE_PIXELS = 5_000_000;

export interface UsableSamples {
  usable: Sample[];
  /** Samples without a single usable pixel in this scene. */
  outside: Sample[];
  /** Pixels of the usable samples together. */
  nPixels: number;
}

/**
 * Sorts samples by whether the scene can use them: at least one pixel whose centre is inside, with data in all bands and within
 * the study area. Samples belong to the project, so those drawn on another scene count where they fall into this one.
 */
export async function findUsableSamples(
  app: App,
  placed: PlacedScene,
  bands: readonly Band[],
  studyAreaDegrees: ArealGeometry | null,
  samples: readonly Sample[],
): Promise<UsableSamples> {
  const { bandPaths, studyArea } = await openSceneInput(app, placed, bands, studyAreaDegrees);
  const files = await Promise.all(bandPaths.map((path) => app.bands.open(path)));
  const { grid } = placed;
  const found: UsableSamples = { usable: [], outside: [], nPixels: 0 };
  for (const sample of samples) {
    const polygon = drawInPixels(placed, sample.geometry);
    const all = polygon ? rasterisePolygon(polygon, grid.width, grid.height) : new Uint32Array();
    const isInside = new Uint8Array(all.length).fill(1);
    keepInside(isInside, all, grid, studyArea);
    const pixels = all.filter((_, i) => isInside[i] === 1);
    found.nPixels += pixels.length;
    const isUsable = pixels.length > 0 && (await hasPixelWithData(grid, files, pixels));
    found[isUsable ? 'usable' : 'outside'].push(sample);
  }
  return found;
}

/** Bands whose files are missing or damaged; why is logged. */
export async function findUnreadableBands(app: App, bands: readonly Band[]): Promise<Band[]> {
  const unreadable: Band[] = [];
  for (const band of bands) {
    try {
      await app.bands.open(await app.files.localPath(band.fileKey));
    } catch (error) {
      app.log.error({ err: error, band: band.id }, 'band file cannot be read');
      unreadable.push(band);
    }
  }
  return unreadable;
}
