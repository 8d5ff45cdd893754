import type { Interval } from './interval.ts';
import { normalCdf, normalQuantile, studentTQuantile } from './quantiles.ts';

/**
 * Tail left out on each side of a bootstrap interval of few units, Φ(−t) with t the quantile of Student's t: what the
 * normal tail is widened to so that an interval from 4 polygons is not as sure as one from 400.
 *
 * Source: the expanded percentile interval of Hesterberg 2015, The American Statistician 69:371–386; without his factor
 * √(n/(n − 1)), which the weights of the resampling already carry.
 * @throws RangeError when the degrees of freedom are not positive or confidence is outside (0, 1).
 */
export function expandedTail(degreesOfFreedom: number, confidence = 0.95): number {
  return normalCdf(studentTQuantile((1 - confidence) / 2, degreesOfFreedom));
}

/**
 * Percentile interval of sorted bootstrap replicates, with linear interpolation between order statistics; `null`
 * without replicates. `tail` is the share left out on each side.
 *
 * Source: Efron & Tibshirani 1993, An Introduction to the Bootstrap, ch. 13.
 */
export function percentileInterval(sorted: Float64Array, tail = 0.025): Interval | null {
  if (sorted.length === 0) return null;
  return { low: quantileOfSorted(sorted, tail), high: quantileOfSorted(sorted, 1 - tail) };
}

/**
 * Bias-corrected and accelerated (BCa) interval of sorted bootstrap replicates; `null` without replicates. `tail` is the
 * share left out on each side.
 *
 * `leaveOneOut` holds the figure with each unit left out in turn (the jackknife), from which the acceleration
 * Σd³ / (6 (Σd²)^1.5) comes; replicates equal to the estimate count half in the bias correction.
 * Source: Efron 1987, Journal of the American Statistical Association 82:171–185; Efron & Tibshirani 1993, ch. 14.
 */
export function bcaInterval(
  sorted: Float64Array,
  estimate: number,
  leaveOneOut: ArrayLike<number>,
  tail = 0.025,
): Interval | null {
  if (sorted.length === 0) return null;
  let below = 0;
  for (const value of sorted) below += value < estimate ? 1 : value === estimate ? 0.5 : 0;
  // All replicates on one side would put the correction at infinity; half a replicate keeps it finite.
  const share = Math.min(sorted.length - 0.5, Math.max(0.5, below)) / sorted.length;
  const bias = normalQuantile(share);
  const acceleration = accelerationOf(leaveOneOut);
  const z = normalQuantile(tail);
  const adjust = (at: number): number => {
    const shifted = bias + at;
    const denominator = 1 - acceleration * shifted;
    return denominator <= 0 ? (shifted > 0 ? 1 : 0) : normalCdf(bias + shifted / denominator);
  };
  return { low: quantileOfSorted(sorted, adjust(z)), high: quantileOfSorted(sorted, adjust(-z)) };
}

/** Standard deviation of replicates (n − 1); `null` for fewer than two. */
export function standardErrorOfReplicates(replicates: Float64Array): number | null {
  if (replicates.length < 2) return null;
  let mean = 0;
  for (const value of replicates) mean += value / replicates.length;
  let squares = 0;
  for (const value of replicates) squares += (value - mean) ** 2;
  return Math.sqrt(squares / (replicates.length - 1));
}

function accelerationOf(leaveOneOut: ArrayLike<number>): number {
  let mean = 0;
  for (let i = 0; i < leaveOneOut.length; i++) mean += leaveOneOut[i] / leaveOneOut.length;
  let squares = 0;
  let cubes = 0;
  for (let i = 0; i < leaveOneOut.length; i++) {
    const d = mean - leaveOneOut[i];
    squares += d * d;
    cubes += d * d * d;
  }
  return squares > 0 ? cubes / (6 * squares ** 1.5) : 0;
}

function quantileOfSorted(sorted: Float64Array, probability: number): number {
  const at = Math.min(1, Math.max(0, probability)) * (sorted.length - 1);
  const below = Math.floor(at);
  const above = Math.min(sorted.length - 1, below + 1);
  return sorted[below] + (at - below) * (sorted[above] - sorted[below]);
}
