import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import {
  type ClassifierRecipe,
  type Recipe,
  type Run,
  type StartRun,
  startRunSchema,
} from '../../../../shared/contracts/run.ts';
import type { Band, Scene } from '../../../../shared/contracts/scene.ts';
import type { ClassifierKind } from './recipe-text.ts';

/** What the form holds once it can be sent. */
export interface RunDraft {
  name: string;
  note: string;
  recipe: Recipe;
}

/** One sample to learn from, one held out. */
export const MIN_SAMPLES_PER_CLASS = 2;

/** Roles left out at first: coarser than the rest, or no picture of the ground. They can be ticked. */
const LEFT_OUT_AT_FIRST: readonly Band['role'][] = ['thermal', 'cirrus', 'pan'];

/** The newest scene that is ready; null when there is none. */
export function newestReadyScene(scenes: readonly Scene[]): Scene | null {
  const ready = scenes.filter((scene) => scene.state === 'ready');
  return ready.toSorted((a, b) => b.createdAt.localeCompare(a.createdAt))[0] ?? null;
}

/** The bands a recipe starts with: all that see the ground at the scene's own pixel, or all when that leaves none. */
export function defaultBandIds(bands: readonly Band[]): string[] {
  const fit = bands.filter((band) => !LEFT_OUT_AT_FIRST.includes(band.role));
  return (fit.length > 0 ? fit : bands).map((band) => band.id);
}

/** A recipe to start from: the newest ready scene, its bands, and every class with enough samples to be split. */
export function defaultDraft(scenes: readonly Scene[], classes: readonly LandClass[]): RunDraft | null {
  const scene = newestReadyScene(scenes);
  if (!scene) return null;
  return {
    name: '',
    note: '',
    recipe: {
      sceneId: scene.id,
      bandIds: defaultBandIds(scene.bands),
      classIds: classes.filter((one) => one.sampleCount >= MIN_SAMPLES_PER_CLASS).map((one) => one.id),
      heldOutShare: 0.3,
      sampleStates: ['draft', 'submitted', 'accepted'],
      seed: 1,
      maxPixelsPerClass: 1000,
      classifier: defaultClassifier('random-forest'),
      minShare: 0,
    },
  };
}

/** A classifier's settings as the shared contract fills them in. */
export function defaultClassifier(kind: ClassifierKind): ClassifierRecipe {
  // The library's trees grow slowly: fewer of them make a first map in a bearable time.
  const input: StartRun['recipe']['classifier'] = kind === 'random-subspace-forest' ? { kind, trees: 25 } : { kind };
  return startRunSchema.shape.recipe.shape.classifier.parse(input);
}

/** A run's recipe to use again, less what is gone since: its scene, bands or classes. */
export function draftFromRun(
  run: Pick<Run, 'name' | 'note' | 'recipe'>,
  scenes: readonly Scene[],
  classes: readonly LandClass[],
): { draft: RunDraft; lost: string[] } {
  const { recipe } = run;
  const lost: string[] = [];
  const scene = scenes.find((one) => one.id === recipe.sceneId && one.state === 'ready');
  const other = scene ?? newestReadyScene(scenes);
  if (!scene) lost.push('its scene');
  const bandIds = scene ? recipe.bandIds.filter((id) => scene.bands.some((band) => band.id === id)) : [];
  if (scene && bandIds.length < recipe.bandIds.length) lost.push('some of its bands');
  const classIds = recipe.classIds.filter((id) => classes.some((one) => one.id === id));
  if (classIds.length < recipe.classIds.length) lost.push('some of its classes');
  return {
    draft: {
      name: run.name,
      note: run.note,
      recipe: {
        ...recipe,
        sceneId: other?.id ?? recipe.sceneId,
        bandIds: scene ? bandIds : defaultBandIds(other?.bands ?? []),
        classIds,
      },
    },
    lost,
  };
}
