import type { TuningPlan } from '../../shared/contracts/tuning.ts';
import { assignBlockFolds } from '../analysis/sampling/block-folds.ts';
import type { RunClass } from '../entities/run.ts';
import type { TuningSample } from '../entities/tuning.ts';
import type { RunPolygon } from '../jobs/compute/tasks.ts';
import { measurePixelAreas } from './run-areas.ts';
import { drawInPixels, type PlacedScene } from './run-scene.ts';

export interface TuningFolds {
  /** Training polygons of each fold. */
  folds: RunPolygon[][];
  /** Never learned from and never judged by; their pixels are left out of the folds. */
  heldOut: RunPolygon[];
  notes: string[];
}

/**
 * Puts the training samples of a tuning into folds by blocks of ground; held-out samples stay apart.
 * @throws RangeError when the blocks do not give so many folds
 */
export function planFolds(
  placed: PlacedScene,
  samples: readonly TuningSample[],
  classes: readonly RunClass[],
  plan: Pick<TuningPlan, 'folds' | 'blockMeters' | 'seed'>,
): TuningFolds {
  const draw = ({ id, classId, geometry }: TuningSample): RunPolygon => {
    const polygon = drawInPixels(placed, geometry);
    if (!polygon) throw new RangeError('A sample has no place in the scene’s projection.');
    return { id, classIndex: classes.findIndex((one) => one.id === classId), polygon };
  };
  const training = samples.filter(({ part }) => part === 'training').map(draw);
  const heldOut = samples.filter(({ part }) => part === 'held-out').map(draw);
  const { rowAreaM2 } = measurePixelAreas(placed);
  const pixelMeters = Math.sqrt(rowAreaM2[Math.floor(rowAreaM2.length / 2)] ?? 1);
  const blockPixels = plan.blockMeters / pixelMeters;
  const middles = training.map(({ id, polygon }) => ({ id, ...takeMiddle(polygon[0] ?? []) }));
  let foldOf: Map<string, number>;
  try {
    foldOf = assignBlockFolds(middles, blockPixels, plan.folds, plan.seed);
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    throw new RangeError(
      `${error.message} Make the blocks smaller than ${plan.blockMeters} m, or ask for fewer folds.`,
    );
  }
  const folds = Array.from({ length: plan.folds }, (_, fold) => training.filter(({ id }) => foldOf.get(id) === fold));
  return { folds, heldOut, notes: describeFolds(folds, classes) };
}

function takeMiddle(ring: readonly (readonly number[])[]): { x: number; y: number } {
  const xs = ring.map(([x = 0]) => x);
  const ys = ring.map(([, y = 0]) => y);
  return { x: (Math.min(...xs) + Math.max(...xs)) / 2, y: (Math.min(...ys) + Math.max(...ys)) / 2 };
}

function describeFolds(folds: readonly RunPolygon[][], classes: readonly RunClass[]): string[] {
  const sizes = folds.map(({ length }) => length);
  const notes = [`Training polygons in the folds: ${sizes.join(', ')}. Held-out samples take no part.`];
  const lonely = classes.filter(
    (_, c) => folds.filter((fold) => fold.some(({ classIndex }) => classIndex === c)).length < 2,
  );
  if (lonely.length > 0) {
    notes.push(
      `${lonely.map(({ name }) => name).join(', ')}: all training polygons lie in one fold, so that the trials judged there have not learned the class. Make the blocks smaller, or draw samples further apart.`,
    );
  }
  return notes;
}
