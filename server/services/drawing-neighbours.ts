import type { ArealGeometry, Polygon } from '../../shared/contracts/geometry.ts';
import type { DrawingJudgement } from '../../shared/contracts/signature.ts';
import type { App } from '../app-context.ts';
import { RunSample } from '../entities/run-sample.ts';
import { Run } from '../entities/run.ts';
import type { Scene } from '../entities/scene.ts';
import { findDrawnPixels } from './drawing-check.ts';
import type { SampleListRow } from './samples-list.ts';
import { requireGrid } from './scenes.ts';

/** Pixels within which a held-out sample is said to be near. */
const NEAR_PIXELS = 5;
const METRES_A_DEGREE = 111_320;

type Bounds = readonly [west: number, south: number, east: number, north: number];

/** Samples of other classes that share pixels with a drawing, most pixels first. */
export function findOverlaps(
  scene: Scene,
  studyArea: ArealGeometry | null,
  pixels: Uint32Array,
  drawing: { classId: string; geometry: Polygon },
  samples: readonly SampleListRow[],
): DrawingJudgement['overlaps'] {
  const bounds = boundsOf(drawing.geometry);
  const held = new Set(pixels);
  return samples
    .filter(({ classId, geometry }) => classId !== drawing.classId && doMeet(bounds, boundsOf(geometry)))
    .map(({ id, number, classId, geometry }) => {
      const others = findDrawnPixels(scene, studyArea, geometry).pixels ?? new Uint32Array();
      return {
        sampleId: id,
        number,
        classId,
        pixels: others.reduce((sum, pixel) => sum + (held.has(pixel) ? 1 : 0), 0),
      };
    })
    .filter((overlap) => overlap.pixels > 0)
    .sort((a, b) => b.pixels - a.pixels);
}

/** The held-out sample of the latest finished run that lies nearest, if one is near; or that the drawing is one itself. */
export async function findHeldOutNear(
  app: App,
  projectId: string,
  scene: Scene,
  pixels: Uint32Array,
  sampleId: string | null,
): Promise<DrawingJudgement['heldOut']> {
  const run = await app.db
    .getRepository(Run)
    .createQueryBuilder('run')
    .where('run.projectId = :projectId AND run.result IS NOT NULL', { projectId })
    .orderBy('run.number', 'DESC')
    .getOne();
  if (!run) return null;
  const heldOut = await app.db.getRepository(RunSample).findBy({ runId: run.id, part: 'held-out' });
  const itself = heldOut.find((sample) => sample.sampleId === sampleId);
  const found = { runNumber: run.number, distanceMeters: 0 };
  if (itself) return { ...found, sampleNumber: itself.sampleNumber, isItself: true };
  const { grid } = requireGrid(scene);
  const pixelMeters =
    Math.sqrt(Math.abs(grid.pixelWidth * grid.pixelHeight)) * (isGeographic(scene) ? METRES_A_DEGREE : 1);
  let nearest: { sampleNumber: number; distance: number } | null = null;
  const window = windowOf(pixels, grid.width);
  for (const sample of heldOut) {
    const others = findDrawnPixels(scene, null, sample.geometry).pixels;
    if (!others || !areNear(window, windowOf(others, grid.width))) continue;
    const distance = pixelDistance(pixels, others, grid.width);
    if (distance <= NEAR_PIXELS && (!nearest || distance < nearest.distance)) {
      nearest = { sampleNumber: sample.sampleNumber, distance };
    }
  }
  if (!nearest) return null;
  const { sampleNumber, distance } = nearest;
  return { ...found, sampleNumber, distanceMeters: distance * pixelMeters, isItself: false };
}

function isGeographic({ crsProj4 }: Scene): boolean {
  return crsProj4?.includes('+proj=longlat') ?? false;
}

function boundsOf({ coordinates }: Polygon): Bounds {
  let [west, south, east, north] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const [lon, lat] of coordinates[0] ?? []) {
    west = Math.min(west, lon);
    east = Math.max(east, lon);
    south = Math.min(south, lat);
    north = Math.max(north, lat);
  }
  return [west, south, east, north];
}

function doMeet(one: Bounds, two: Bounds): boolean {
  return one[0] <= two[2] && two[0] <= one[2] && one[1] <= two[3] && two[1] <= one[3];
}

function windowOf(pixels: Uint32Array, width: number): Bounds {
  let [left, right] = [Infinity, -Infinity];
  for (const pixel of pixels) {
    left = Math.min(left, pixel % width);
    right = Math.max(right, pixel % width);
  }
  return [left, Math.floor((pixels[0] ?? 0) / width), right, Math.floor((pixels.at(-1) ?? 0) / width)];
}

function areNear(one: Bounds, [left, top, right, bottom]: Bounds): boolean {
  return doMeet(one, [left - NEAR_PIXELS, top - NEAR_PIXELS, right + NEAR_PIXELS, bottom + NEAR_PIXELS]);
}

/** Least distance between pixel centres of two sets, pixels; only pixels at the edge of a set can be nearest. */
function pixelDistance(one: Uint32Array, two: Uint32Array, width: number): number {
  const [edgeOne, edgeTwo] = [findEdge(one, width), findEdge(two, width)];
  let nearest = Infinity;
  for (const a of edgeOne) {
    for (const b of edgeTwo) {
      const distance = Math.hypot((a % width) - (b % width), Math.floor(a / width) - Math.floor(b / width));
      if (distance < nearest) nearest = distance;
    }
  }
  return nearest;
}

function findEdge(pixels: Uint32Array, width: number): number[] {
  const held = new Set(pixels);
  return [...pixels].filter(
    (pixel) => !(held.has(pixel - 1) && held.has(pixel + 1) && held.has(pixel - width) && held.has(pixel + width)),
  );
}
