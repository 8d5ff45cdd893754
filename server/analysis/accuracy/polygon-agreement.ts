import { addToConfusionMatrix, createConfusionMatrix, type ConfusionMatrix } from './confusion-matrix.ts';

/** One held-out polygon: its reference class and how many of its pixels the map gives to each class. */
export interface PolygonCounts {
  id: string;
  referenceClass: number;
  /** Pixels mapped as class 0, 1, … (length nClasses); unclassified pixels are left out. */
  mappedCounts: ArrayLike<number>;
}

export interface PolygonAgreement {
  /** One count for each polygon: its majority mapped class against its reference class. */
  matrix: ConfusionMatrix;
  /** Majority class of each polygon in the order given; `null` when none of its pixels is classified. */
  majority: (number | null)[];
  /** Polygons with no classified pixel, which are not in the matrix. */
  skippedIds: string[];
}

/**
 * Judges each held-out polygon once, by the class most of its pixels are mapped as.
 *
 * Tie rule: a tie never counts in favour of the map. The reference class must hold strictly more pixels than any other
 * class; otherwise the lowest index among the other leading classes is taken.
 * @throws RangeError when a polygon has not nClasses counts or a reference class out of range.
 */
export function countPolygonAgreement(polygons: readonly PolygonCounts[], nClasses: number): PolygonAgreement {
  const matrix = createConfusionMatrix(nClasses);
  const majority: (number | null)[] = [];
  const skippedIds: string[] = [];
  for (const { id, referenceClass, mappedCounts } of polygons) {
    if (mappedCounts.length !== nClasses) {
      throw new RangeError(`Polygon ${id} has counts of ${mappedCounts.length} classes, expected ${nClasses}.`);
    }
    const winner = majorityAgainst(referenceClass, mappedCounts);
    majority.push(winner);
    if (winner === null) skippedIds.push(id);
    else addToConfusionMatrix(matrix, winner, referenceClass);
  }
  return { matrix, majority, skippedIds };
}

function majorityAgainst(referenceClass: number, counts: ArrayLike<number>): number | null {
  let best: number | null = null;
  for (let c = 0; c < counts.length; c++) {
    if (counts[c] === 0) continue;
    const ahead = best === null || counts[c] > counts[best];
    const tieWithReference = best === referenceClass && counts[c] === counts[best];
    if (ahead || tieWithReference) best = c;
  }
  return best;
}
