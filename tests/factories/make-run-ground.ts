import type { App } from '../../server/app-context.ts';
import type { LandClass } from '../../server/entities/land-class.ts';
import type { Project } from '../../server/entities/project.ts';
import type { Sample } from '../../server/entities/sample.ts';
import type { Scene } from '../../server/entities/scene.ts';
import type { Recipe } from '../../shared/contracts/run.ts';
import { makeClass } from './make-class.ts';
import type { RasterSpec } from './make-raster.ts';
import { makeSample } from './make-sample.ts';
import { makeScene } from './make-scene.ts';

/** Random-looking, the same everywhere: 0 to `range` − 1. */
function speckle(column: number, row: number, band: number, range: number): number {
  let h = Math.imul(column + 1, 374761393) ^ Math.imul(row + 1, 668265263) ^ Math.imul(band + 1, 2246822519);
  h = Math.imul(h ^ (h >>> 13), 1274126177);
  return ((h ^ (h >>> 16)) >>> 0) % range;
}

/** Three covers side by side; the second and third overlap in value, so that a map of them makes mistakes. */
function overlappingCovers(width: number): RasterSpec['value'] {
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
  /** Upper left pixel of each sample's 6 × 6 pixels. */
  places: Map<string, { column: number; row: number }>;
  recipe: Recipe;
}

let grounds = 0;

/** Ids decide which samples are held out, so they are the same in each run of a test file. */
function fixedId(kind: 'class' | 'sample', ground: number, index: number): string {
  const digits = String(ground * 10_000 + index).padStart(12, '0');
  return `${kind === 'class' ? 'c1a55000' : '5a3b1e00'}-0000-4000-8000-${digits}`;
}

/**
 * All that a run needs: a scene of three covers (four bands, a corner without data), three classes, and polygons of
 * 6 × 6 pixels in each cover.
 */
export async function makeRunGround(
  app: App,
  project: Project,
  { width = 96, height = 96, polygonsPerClass = 8, trees = 15, isFirstBandDoubled = false } = {},
): Promise<RunGround> {
  grounds++;
  const ground = grounds;
  const bandNames = ['Blue', 'Green', 'Red', 'Near infrared'];
  const covers = overlappingCovers(width);
  const value: RasterSpec['value'] = (band, column, row) =>
    covers(isFirstBandDoubled && band === 1 ? 0 : band, column, row);
  const scene = await makeScene(app, project, {}, { width, height, bandNames, value });
  const classes = [
    await makeClass(app, project, { id: fixedId('class', ground, 0), name: 'Open water', code: 3, colour: '#2266aa' }),
    await makeClass(app, project, {
      id: fixedId('class', ground, 1),
      name: 'Heath & moor',
      code: 7,
      colour: '#aa66cc',
    }),
    await makeClass(app, project, { id: fixedId('class', ground, 2), name: '=Arable', code: 21, colour: '#ccbb44' }),
  ];
  const third = width / 3;
  const samples: Sample[] = [];
  const places: RunGround['places'] = new Map();
  for (const [cover, landClass] of classes.entries()) {
    for (let i = 0; i < polygonsPerClass; i++) {
      const column = Math.floor(cover * third + 3 + (i % 2) * (third / 2));
      const row = Math.floor(2 + i * ((height - 9) / polygonsPerClass));
      const id = fixedId('sample', ground, samples.length);
      const sample = await makeSample(app, scene, landClass, { column, row, width: 6, height: 6 }, { id });
      samples.push(sample);
      places.set(sample.id, { column, row });
    }
  }
  return {
    scene,
    classes,
    samples,
    places,
    recipe: {
      sceneId: scene.id,
      bandIds: scene.bands.map(({ id }) => id),
      classIds: classes.map(({ id }) => id),
      sampleStates: ['draft', 'submitted', 'accepted'],
      heldOutShare: 0.4,
      seed: 7,
      maxPixelsPerClass: 120,
      classifier: {
        kind: 'random-forest',
        trees,
        maxDepth: 25,
        minLeaf: 1,
        featuresPerTree: null,
        classWeights: 'none',
      },
      minShare: 0,
    },
  };
}
