import type { Polygon } from '../../shared/contracts/geometry.ts';
import type { GrownRegion } from '../../shared/contracts/sample.ts';
import { growRegion } from '../analysis/sampling/grow-region.ts';
import { traceRegion } from '../analysis/sampling/trace-region.ts';
import type { App } from '../app-context.ts';
import type { Project } from '../entities/project.ts';
import type { Scene } from '../entities/scene.ts';
import { NotFound } from '../errors.ts';
import { keepInside } from '../jobs/compute/study-area-mask.ts';
import { getCrsTransform } from '../raster/crs-transform.ts';
import { readPixelFeatures } from '../raster/pixel-features.ts';
import { pixelToMap } from '../raster/raster-grid.ts';
import { getSceneGeometry } from '../raster/tile-geometry.ts';
import { openSceneInput, placeScene } from './run-scene.ts';

/** Pixels to each side of the one pressed that are looked at. */
const REACH = 100;
/** An outline of more corners is no sample that anyone could mend. */
const MAX_CORNERS = 400;
/** How much smaller the next distance is when an outline has too many corners, and how often that is tried. */
const SHRINK = 0.7;
const MAX_TRIES = 10;
/** Degrees are kept to nine decimals, a tenth of a millimetre. */
const ROUND = 1e9;

/**
 * The connected pixels about a place whose spectrum is like the one there, as an outline to be accepted or mended. Distances are in
 * standard deviations of each band over the scene, so that bands of different units count alike.
 */
export async function growFromPixel(
  app: App,
  project: Project,
  scene: Scene,
  { lon, lat, distance: asked }: { lon: number; lat: number; distance: number },
): Promise<GrownRegion> {
  const placed = placeScene(scene);
  if (!placed) throw new NotFound();
  const { grid, proj4 } = placed;
  const [atColumn, atRow] = getSceneGeometry(grid, proj4).toPixel(lon, lat).map(Math.floor) as [number, number];
  if (!(atColumn >= 0 && atColumn < grid.width && atRow >= 0 && atRow < grid.height)) {
    return nothing('This place is outside the scene.');
  }
  const x = Math.max(0, atColumn - REACH);
  const y = Math.max(0, atRow - REACH);
  const width = Math.min(grid.width, atColumn + REACH + 1) - x;
  const height = Math.min(grid.height, atRow + REACH + 1) - y;
  const pixels = Uint32Array.from(
    { length: width * height },
    (_, i) => (y + Math.floor(i / width)) * grid.width + x + (i % width),
  );
  const { bandPaths, studyArea } = await openSceneInput(app, placed, scene.bands, project.studyArea);
  const files = await Promise.all(bandPaths.map((path) => app.bands.open(path)));
  const values = new Float32Array(pixels.length * files.length);
  const isUsable = await readPixelFeatures(grid, files, pixels, { features: values, keep: true });
  keepInside(isUsable, pixels, grid, studyArea);
  const scales = scene.bands.map(({ statistics }) => statistics.standardDeviation || 1);
  const window = { width, height, nFeatures: files.length, values, isUsable };
  const seed = { column: atColumn - x, row: atRow - y };
  let grown = growRegion(window, seed, scales, asked);
  let outline = traceRegion(grown.region, width, height);
  if (!outline) return nothing('This pixel has no data, or lies outside the study area.');
  let distance = asked;
  for (let tries = 0; countCorners(outline) > MAX_CORNERS && tries < MAX_TRIES; tries++) {
    distance *= SHRINK;
    grown = growRegion(window, seed, scales, distance);
    outline = traceRegion(grown.region, width, height) ?? outline;
  }
  const transform = getCrsTransform(proj4);
  const geometry: Polygon = {
    type: 'Polygon',
    coordinates: outline.map((ring) =>
      ring.map(([column, row]) => {
        const [east, north] = transform.toLonLat(...pixelToMap(grid, x + column, y + row));
        return [Math.round(east * ROUND) / ROUND, Math.round(north * ROUND) / ROUND];
      }),
    ),
  };
  const remarks = [
    ...(distance < asked
      ? [`At ${asked.toFixed(2)} σ its outline is too ragged; grown to ${distance.toFixed(2)} σ.`]
      : []),
    ...(grown.reachesEdge ? [`It goes on beyond ${REACH} pixels from the place pressed and is cut there.`] : []),
  ];
  return { geometry, pixelCount: grown.nPixels, distance, remark: remarks.join(' ') || null };
}

function countCorners(outline: readonly (readonly unknown[])[]): number {
  return outline.reduce((sum, ring) => sum + ring.length, 0);
}

function nothing(remark: string): GrownRegion {
  return { geometry: null, pixelCount: 0, distance: 0, remark };
}
