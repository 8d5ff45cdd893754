import { createRng, hashText } from './rng.ts';

export interface SplitCandidate {
  id: string;
  classId: string;
}

export interface SampleSplit {
  /** Ids in ascending order. */
  trainingIds: string[];
  heldOutIds: string[];
  /** Classes with a single polygon: it goes to training and the class has nothing to be checked with. */
  classesWithoutHeldOut: string[];
}

/**
 * Holds out a share of the sample polygons of each class, by whole polygon and never by pixel.
 *
 * A class of n ≥ 2 polygons gives round(share·n) of them, at least 1 and at most n − 1. The result depends on the seed,
 * the ids and the classes alone, not on the order given; classes do not influence each other.
 * @throws RangeError when heldOutShare is not strictly between 0 and 1 or an id comes twice.
 */
export function splitSamples(polygons: readonly SplitCandidate[], heldOutShare: number, seed: number): SampleSplit {
  if (!(heldOutShare > 0 && heldOutShare < 1)) {
    throw new RangeError(`The held-out share must lie between 0 and 1, got ${heldOutShare}.`);
  }
  const idsByClass = new Map<string, string[]>();
  const seen = new Set<string>();
  for (const { id, classId } of polygons) {
    if (seen.has(id)) throw new RangeError(`Polygon ${id} is given twice.`);
    seen.add(id);
    const ids = idsByClass.get(classId);
    if (ids) ids.push(id);
    else idsByClass.set(classId, [id]);
  }

  const split: SampleSplit = { trainingIds: [], heldOutIds: [], classesWithoutHeldOut: [] };
  for (const [classId, ids] of idsByClass) {
    if (ids.length === 1) {
      split.classesWithoutHeldOut.push(classId);
      split.trainingIds.push(ids[0]);
      continue;
    }
    createRng(seed, hashText(classId)).shuffle(ids.sort(compareText));
    const nHeldOut = Math.min(ids.length - 1, Math.max(1, Math.round(heldOutShare * ids.length)));
    split.heldOutIds.push(...ids.slice(0, nHeldOut));
    split.trainingIds.push(...ids.slice(nHeldOut));
  }
  split.trainingIds.sort(compareText);
  split.heldOutIds.sort(compareText);
  split.classesWithoutHeldOut.sort(compareText);
  return split;
}

/** Code-unit order: the same on every machine, whatever its locale. */
function compareText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
