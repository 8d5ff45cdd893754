import type { Rng } from '../sampling/rng.ts';
import { percentileInterval, standardErrorOfReplicates } from './bootstrap-interval.ts';

export interface BootstrappedFigure {
  value: number | null;
  standardError: number | null;
  /** `null` when the figure is undefined, its replicates do not vary, or over a tenth of them are undefined. */
  low: number | null;
  high: number | null;
  nUndefined: number;
}

/**
 * Bootstraps a figure of points (any agreement of interpreters) by drawing whole points with replacement; interpreters
 * stay as they are, so the interval is about other points and the same people. Percentile interval.
 *
 * Source: Efron & Tibshirani 1993, An Introduction to the Bootstrap, ch. 13.
 * @throws RangeError when fewer than 50 replicates are asked for.
 */
export function bootstrapPoints<T>(
  points: readonly T[],
  measure: (points: readonly T[]) => number | null,
  rng: Rng,
  { nReplicates = 1000, confidence = 0.95 } = {},
): BootstrappedFigure {
  if (!Number.isInteger(nReplicates) || nReplicates < 50) {
    throw new RangeError(`At least 50 replicates are needed, got ${nReplicates}.`);
  }
  const value = points.length > 0 ? measure(points) : null;
  if (value === null) return { value, standardError: null, low: null, high: null, nUndefined: 0 };
  const defined: number[] = [];
  for (let r = 0; r < nReplicates; r++) {
    const replicate = measure(points.map(() => points[rng.nextBelow(points.length)]));
    if (replicate !== null) defined.push(replicate);
  }
  const sorted = Float64Array.from(defined).sort();
  const nUndefined = nReplicates - sorted.length;
  const isUsable = nUndefined <= nReplicates / 10 && sorted[sorted.length - 1] - sorted[0] > 1e-12;
  const interval = isUsable ? percentileInterval(sorted, (1 - confidence) / 2) : null;
  return {
    value,
    standardError: standardErrorOfReplicates(sorted),
    low: interval?.low ?? null,
    high: interval?.high ?? null,
    nUndefined,
  };
}
