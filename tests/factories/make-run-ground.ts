import { randomUUID } from 'node:crypto';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { App } from '../../server/app-context.ts';
import { Job } from '../../server/entities/job.ts';
import type { LandClass } from '../../server/entities/land-class.ts';
import type { Project } from '../../server/entities/project.ts';
import { Sample } from '../../server/entities/sample.ts';
import { Scene } from '../../server/entities/scene.ts';
import { getCrsTransform } from '../../server/raster/crs-transform.ts';
import { ingestScene } from '../../server/services/ingest-scene.ts';
import type { Polygon } from '../../shared/contracts/geometry.ts';
import type { Recipe } from '../../shared/contracts/run.ts';
import { makeClass } from './make-class.ts';
import { makeRaster, type RasterSpec } from './make-raster.ts';

/** A scene that has been through the ingest, without the queue. */
export async function ingestRaster(app: App, project: Project, overrides: Partial<RasterSpec> = {}): Promise<Scene> {
  const dir = await mkdtemp(join(tmpdir(), 'groundsel-ground-'));
  try {
    const path = join(dir, 'scene.tif');
    await makeRaster(path, overrides);
    const scenes = app.db.getRepository(Scene);
    const key = `incoming/${randomUUID()}/scene.tif`;
    await app.files.adopt(key, path);
    const files = [{ name: 'scene.tif', bytes: 1, sha256: '0'.repeat(64), key }];
    const { id } = await scenes.save(scenes.create({ projectId: project.id, name: 'Late summer', files, failure: null }));
    const job = app.db.getRepository(Job).create({ kind: 'ingest', projectId: project.id, sceneId: id });
    await ingestScene(app, { job, signal: new AbortController().signal, report: () => undefined });
    return await scenes.findOneOrFail({ where: { id }, relations: { bands: true }, order: { bands: { number: 'ASC' } } });
  } finally {
    await rm(dir, { recursive: true, force: true });
  }
}

/** A rectangle of whole scene pixels: columns x0 to x1 − 1, rows y0 to y1 − 1, as longitudes and latitudes. */
export function pixelBox(scene: Scene, x0: number, y0: number, x1: number, y1: number): Polygon {
  const transform = getCrsTransform(scene.crsProj4!);
  const corner = (column: number, row: number) =>
    transform.toLonLat(scene.originX! + column * scene.pixelWidth!, scene.originY! - row * scene.pixelHeight!);
  const ring = [corner(x0, y0), corner(x0, y1), corner(x1, y1), corner(x1, y0), corner(x0, y0)];
  return { type: 'Polygon', coordinates: [ring] };
}

let drawn = 0;

export async function drawSample(
  app: App,
  scene: Scene,
  landClass: LandClass,
  geometry: Polygon,
  overrides: Partial<Sample> = {},
): Promise<Sample> {
  drawn++;
  const samples = app.db.getRepository(Sample);
  return samples.save(
    samples.create({
      id: randomUUID(),
      projectId: scene.projectId,
      number: drawn,
      sceneId: scene.id,
      classId: landClass.id,
      geometry,
      confidence: 'high',
      note: '',
      pixelCount: 1,
      areaHa: 1,
      createdById: null,
      updatedAt: new Date(),
      deletedAt: null,
      ...overrides,
    }),
  );
}

/** Random-looking, the same everywhere: 0 to `range` − 1. */
function speckle(column: number, row: number, band: number, range: number): number {
  let h = Math.imul(column + 1, 374761393) ^ Math.imul(row + 1, 668265263) ^ Math.imul(band + 1, 2246822519);
  h = Math.imul(h ^ (h >>> 13), 1274126177);
  return ((h ^ (h >>> 16)) >>> 0) % range;
}

/** Three covers side by side; the second and third overlap in value, so that a map of them makes mistakes. */
export function overlappingCovers(width: number): RasterSpec['value'] {
  return (band, column, row) => {
    if (column < 8 && row < 8) return 0;
    const cover = Math.min(2, Math.floor((column * 3) / width));
    return [600, 2000, 2260][cover]! + band * 90 + speckle(column, row, band, 420);
  };
}

export interface RunGround {
  scene: Scene;
  classes: LandClass[];
  samples: Sample[];
  recipe: Recipe;
}

/**
 * All that a run needs: a scene of three covers (four bands, a corner without data), three classes, and polygons of
 * 6 × 6 pixels in each cover.
 */
export async function makeRunGround(
  app: App,
  project: Project,
  { width = 96, height = 96, polygonsPerClass = 8, trees = 15 } = {},
): Promise<RunGround> {
  const scene = await ingestRaster(app, project, {
    width,
    height,
    bandNames: ['Blue', 'Green', 'Red', 'Near infrared'],
    value: overlappingCovers(width),
  });
  const classes = [
    await makeClass(app, project, { name: 'Open water', code: 3, colour: '#2266aa' }),
    await makeClass(app, project, { name: 'Heath & moor', code: 7, colour: '#aa66cc' }),
    await makeClass(app, project, { name: '=Arable', code: 21, colour: '#ccbb44' }),
  ];
  const third = width / 3;
  const samples: Sample[] = [];
  for (const [cover, landClass] of classes.entries()) {
    for (let i = 0; i < polygonsPerClass; i++) {
      const x = Math.floor(cover * third + 3 + (i % 2) * (third / 2));
      const y = Math.floor(2 + i * ((height - 9) / polygonsPerClass));
      samples.push(await drawSample(app, scene, landClass, pixelBox(scene, x, y, x + 6, y + 6)));
    }
  }
  return {
    scene,
    classes,
    samples,
    recipe: {
      sceneId: scene.id,
      bandIds: scene.bands.map(({ id }) => id),
      classIds: classes.map(({ id }) => id),
      heldOutShare: 0.4,
      seed: 7,
      maxPixelsPerClass: 120,
      classifier: { kind: 'random-forest', trees, maxDepth: 25, minLeaf: 1, featuresPerTree: null },
    },
  };
}
