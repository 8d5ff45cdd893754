import { In, IsNull } from 'typeorm';
import type { Recipe, RecipeCheck } from '../../shared/contracts/run.ts';
import { sampleStateSchema } from '../../shared/contracts/sample.ts';
import { splitSamples } from '../analysis/sampling/split-samples.ts';
import type { App } from '../app-context.ts';
import { Band } from '../entities/band.ts';
import { LandClass } from '../entities/land-class.ts';
import type { Project } from '../entities/project.ts';
import { Sample } from '../entities/sample.ts';
import { Scene } from '../entities/scene.ts';
import { findUnreadableBands, findUsableSamples, MAX_SAMPLE_PIXELS } from './recipe-samples.ts';
import { placeScene } from './run-scene.ts';

/** Common practice, no published source: fewer polygons than this say little about a class. */
const FEW_POLYGONS = 5;

interface RecipeProblem {
  severity: 'stops' | 'warns';
  /** Field of the recipe it is about. */
  path: string;
  text: string;
}

/** What a run would be made of, if nothing stops it. */
export interface RunPlan {
  scene: Scene;
  bands: Band[];
  classes: LandClass[];
  samples: { sample: Sample; part: 'training' | 'held-out' }[];
}

export interface CheckedRecipe {
  problems: RecipeProblem[];
  perClass: RecipeCheck['perClass'];
  /** Null when a problem stops the recipe. */
  plan: RunPlan | null;
}

/** Holds a recipe against its project: what stops it, what to think of, and how the samples would be split. */
export async function checkRecipe(app: App, project: Project, recipe: Recipe): Promise<CheckedRecipe> {
  const problems: RecipeProblem[] = [];
  const stop = (path: string, text: string) => void problems.push({ severity: 'stops', path, text });
  const warn = (path: string, text: string) => void problems.push({ severity: 'warns', path, text });

  const scene = await app.db.getRepository(Scene).findOneBy({ id: recipe.sceneId, projectId: project.id });
  const placed = scene && placeScene(scene);
  if (!scene) stop('recipe.sceneId', 'The scene is not in this project. Choose one that is.');
  else if (!placed) stop('recipe.sceneId', `The scene “${scene.name}” is not ready. Wait until it has been taken in.`);

  const bands = await findInOrder(recipe.bandIds, (ids) =>
    app.db.getRepository(Band).findBy({ id: In(ids), sceneId: recipe.sceneId }),
  );
  if (scene && bands.length < new Set(recipe.bandIds).size)
    stop('recipe.bandIds', 'A band does not belong to the scene. Choose bands of this scene.');
  if (new Set(recipe.bandIds).size < recipe.bandIds.length)
    stop('recipe.bandIds', 'A band is chosen twice. Choose each once.');

  const classes = await findInOrder(recipe.classIds, (ids) =>
    app.db.getRepository(LandClass).findBy({ id: In(ids), projectId: project.id }),
  );
  if (classes.length < new Set(recipe.classIds).size)
    stop('recipe.classIds', 'A class is not in the class scheme of this project.');
  if (new Set(recipe.classIds).size < recipe.classIds.length)
    stop('recipe.classIds', 'A class is chosen twice. Choose each once.');

  for (const { name } of await findUnreadableBands(app, bands)) {
    stop('recipe.bandIds', `The file of band ${name} cannot be read. Leave the band out, or upload the scene again.`);
  }

  const { classifier } = recipe;
  if ('featuresPerTree' in classifier && (classifier.featuresPerTree ?? 1) > recipe.bandIds.length) {
    stop(
      'recipe.classifier.featuresPerTree',
      `${classifier.featuresPerTree} bands are to be drawn of ${recipe.bandIds.length}. Draw at most as many as are chosen.`,
    );
  }

  const samples = await app.db
    .getRepository(Sample)
    .find({ where: { projectId: project.id, deletedAt: IsNull() }, order: { number: 'ASC' } });
  const ofClasses = samples.filter(({ classId }) => recipe.classIds.includes(classId));
  const unused = samples.length - ofClasses.length;
  if (unused > 0) {
    warn(
      'recipe.classIds',
      `${count(unused, 'sample belongs', 'samples belong')} to classes that are not chosen. The map cannot show these classes: their ground goes to others.`,
    );
  }
  const states = recipe.sampleStates;
  const chosen = ofClasses.filter(({ state }) => states.includes(state));
  const leftOut = sampleStateSchema.options.flatMap((state) => {
    const n = ofClasses.filter((sample) => sample.state === state).length;
    return n > 0 && !states.includes(state) ? [`${n} ${state}`] : [];
  });
  if (leftOut.length > 0) warn('recipe.sampleStates', `Samples left out by their review state: ${leftOut.join(', ')}.`);
  if (problems.some(({ severity }) => severity === 'stops') || !scene || !placed)
    return { problems, perClass: [], plan: null };

  const found = await findUsableSamples(app, placed, bands, project.studyArea, chosen);
  if (found.nPixels > MAX_SAMPLE_PIXELS) {
    stop(
      'recipe.classIds',
      `The samples hold ${found.nPixels} pixels together; at most ${MAX_SAMPLE_PIXELS} can be used. Draw smaller polygons.`,
    );
  }
  if (found.outside.length > 0) {
    const numbers = found.outside.map(({ number }) => number);
    warn(
      'recipe.sceneId',
      `Left out, because no pixel of the scene with data in all chosen bands and in the study area lies in them: ${listNumbers(numbers)}.`,
    );
  }

  const split = splitSamples(found.usable, recipe.heldOutShare, recipe.seed);
  const heldOutIds = new Set(split.heldOutIds);
  const perClass = classes.map(({ id, name }) => {
    const ofClass = found.usable.filter(({ classId }) => classId === id);
    const heldOutPolygons = ofClass.filter((sample) => heldOutIds.has(sample.id)).length;
    return { classId: id, name, trainingPolygons: ofClass.length - heldOutPolygons, heldOutPolygons };
  });
  for (const { name, trainingPolygons, heldOutPolygons } of perClass) {
    const total = trainingPolygons + heldOutPolygons;
    if (total < 2) {
      stop(
        'recipe.classIds',
        `${name} has ${count(total, 'usable sample', 'usable samples')}; at least two are needed, one to learn from and one held out. Draw more, or leave the class out.`,
      );
    } else if (total < FEW_POLYGONS) {
      warn(
        'recipe.classIds',
        `${name} has only ${total} usable samples. Fewer than ${FEW_POLYGONS} polygons a class say little about its accuracy (common practice, no published source).`,
      );
    }
  }
  const stops = problems.some(({ severity }) => severity === 'stops');
  const part = (id: string) => (heldOutIds.has(id) ? ('held-out' as const) : ('training' as const));
  const parted = found.usable.map((sample) => ({ sample, part: part(sample.id) }));
  return { problems, perClass, plan: stops ? null : { scene, bands, classes, samples: parted } };
}

async function findInOrder<T extends { id: string }>(
  ids: readonly string[],
  find: (ids: string[]) => Promise<T[]>,
): Promise<T[]> {
  const unique = [...new Set(ids)];
  const rows = await find(unique);
  return unique.flatMap((id) => rows.find((row) => row.id === id) ?? []);
}

function count(n: number, one: string, many: string): string {
  return `${n} ${n === 1 ? one : many}`;
}

const NUMBERS_SHOWN = 12;

function listNumbers(numbers: readonly number[]): string {
  const shown = numbers.slice(0, NUMBERS_SHOWN).join(', ');
  const more = numbers.length > NUMBERS_SHOWN ? ` and ${numbers.length - NUMBERS_SHOWN} more` : '';
  return `${numbers.length === 1 ? 'sample' : 'samples'} ${shown}${more}`;
}
