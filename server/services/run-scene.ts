import { createHash } from 'node:crypto';
import type { ArealGeometry, Polygon } from '../../shared/contracts/geometry.ts';
import type { App } from '../app-context.ts';
import type { Band } from '../entities/band.ts';
import type { RunClass } from '../entities/run.ts';
import type { Scene } from '../entities/scene.ts';
import type { SceneInput } from '../jobs/compute/tasks.ts';
import { toPixelPolygon, type PixelPolygon } from '../raster/pixel-polygon.ts';
import type { RasterGrid } from '../raster/raster-grid.ts';
import { getSceneGeometry } from '../raster/tile-geometry.ts';

/** The parts of a ready scene that a run needs. */
export interface PlacedScene {
  grid: RasterGrid;
  proj4: string;
  wkt: string;
}

/** Grid and reference system of a scene; null while it is not ready. */
export function placeScene(scene: Scene): PlacedScene | null {
  const { width, height, originX, originY, pixelWidth, pixelHeight, crsProj4, crsWkt } = scene;
  const isPlaced =
    width !== null &&
    height !== null &&
    originX !== null &&
    originY !== null &&
    pixelWidth !== null &&
    pixelHeight !== null &&
    crsProj4 !== null &&
    crsWkt !== null;
  if (scene.state !== 'ready' || !isPlaced) return null;
  return { grid: { width, height, originX, originY, pixelWidth, pixelHeight }, proj4: crsProj4, wkt: crsWkt };
}

/** A drawing in the scene's pixels; null where its projection has no place for it. */
export function drawInPixels(placed: PlacedScene, geometry: Polygon): PixelPolygon | null {
  return toPixelPolygon(geometry.coordinates, getSceneGeometry(placed.grid, placed.proj4));
}

/** @throws Error when the study area cannot be drawn in the scene's projection */
function drawStudyArea(placed: PlacedScene, studyArea: ArealGeometry | null): PixelPolygon[] | null {
  if (!studyArea) return null;
  const polygons = studyArea.type === 'Polygon' ? [studyArea.coordinates] : studyArea.coordinates;
  return polygons.map((rings) => {
    const polygon = toPixelPolygon(rings, getSceneGeometry(placed.grid, placed.proj4));
    if (!polygon)
      throw new Error('The study area reaches to where the scene’s projection has no place. Make it smaller.');
    return polygon;
  });
}

/** What the compute threads read: band files brought to this machine, in the recipe's order. */
export async function openSceneInput(
  app: App,
  placed: PlacedScene,
  bands: readonly Band[],
  studyArea: ArealGeometry | null,
): Promise<SceneInput> {
  const bandPaths: string[] = [];
  for (const band of bands) bandPaths.push(await app.files.localPath(band.fileKey));
  return { grid: placed.grid, bandPaths, studyArea: drawStudyArea(placed, studyArea) };
}

interface InputSample {
  sampleId: string;
  sampleVersion: number;
  classId: string;
  part: string;
  geometry: Polygon;
}

/** SHA-256 over all that a class map depends on besides the recipe: samples, classes, study area, band files. */
export function digestInput(input: {
  samples: readonly InputSample[];
  classes: readonly RunClass[];
  bands: readonly Band[];
  studyArea: ArealGeometry | null;
}): string {
  const samples = input.samples
    .map(({ sampleId, sampleVersion, classId, part, geometry }) => [
      sampleId,
      sampleVersion,
      classId,
      part,
      geometry.coordinates,
    ])
    .sort(([a], [b]) => (String(a) < String(b) ? -1 : 1));
  const classes = input.classes.map(({ id, code }) => [id, code]);
  const bands = input.bands.map(({ number, sha256 }) => [number, sha256]);
  const studyArea = input.studyArea?.coordinates ?? null;
  return createHash('sha256').update(JSON.stringify({ samples, classes, bands, studyArea })).digest('hex');
}
