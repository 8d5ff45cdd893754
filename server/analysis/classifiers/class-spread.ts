import { computeSignatures, type ClassSignature } from '../spectral/class-signature.ts';
import type { TrainingSet } from './classifier.ts';

/** Means and covariances of the classes of a training set. */
export interface ClassSpread {
  classes: ClassSignature[];
  /**
   * Covariance about the class means, over all classes together, divisor nRows − nClasses; row-major nFeatures ×
   * nFeatures. `null` when there are no more rows than classes.
   */
  pooled: Float64Array | null;
}

/** @throws RangeError when a class has no row. */
export function measureClassSpread(set: TrainingSet): ClassSpread {
  const { features, labels, nRows, nFeatures, nClasses } = set;
  const classes = computeSignatures(features, labels, nFeatures, nClasses);
  const empty = classes.findIndex(({ nPixels }) => nPixels === 0);
  if (empty >= 0) throw new RangeError(`${nameClass(set, empty)} has no training pixels, wanted at least one.`);
  if (nRows <= nClasses) return { classes, pooled: null };
  const pooled = new Float64Array(nFeatures * nFeatures);
  for (const { nPixels, covariance } of classes) {
    if (!covariance) continue;
    for (let i = 0; i < pooled.length; i++) pooled[i] += (covariance[i] * (nPixels - 1)) / (nRows - nClasses);
  }
  return { classes, pooled };
}

/** How a class is called in messages. */
export function nameClass({ classNames }: TrainingSet, classIndex: number): string {
  const name = classNames?.[classIndex];
  return name === undefined ? `Class ${classIndex}` : `Class “${name}”`;
}
