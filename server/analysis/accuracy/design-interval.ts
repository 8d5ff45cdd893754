import type { Estimate } from './combined-ratio.ts';
import { wilsonInterval, type Interval } from './interval.ts';
import { normalQuantile } from './quantiles.ts';

/**
 * `normal`: estimate ± z·S, as Olofsson et al. 2014 print it; `wilson`: Wilson score interval on the effective number of
 * units.
 */
export type DesignIntervalKind = 'normal' | 'wilson';

export interface DesignInterval extends Interval {
  kind: DesignIntervalKind;
}

/**
 * 95 % (or other) interval of a share estimated from a probability sample; `null` when there is no estimate or no
 * standard error.
 *
 * `normal` is estimate ± z·S clipped to 0..1, which collapses to a point at 0 and 1. `wilson` takes the score interval
 * with p(1 − p)/S² trials, the size of a simple random sample of the same precision; where S is 0 the sample has shown
 * no spread, and Kish's effective number of units stands in. The two agree for many units and shares far from 0 and 1.
 * Source: Olofsson et al. 2014, Remote Sensing of Environment 148:42–57 (normal); Wilson 1927, Journal of the American
 * Statistical Association 22:209–212; effective sample size in intervals of survey proportions: Korn & Graubard 1998,
 * Survey Methodology 24:193–201 (they put it in the exact interval; from memory).
 * @throws RangeError when the share is outside 0..1.
 */
export function intervalOfShare(
  estimate: Estimate | null,
  kind: DesignIntervalKind = 'wilson',
  confidence = 0.95,
): DesignInterval | null {
  if (!estimate || estimate.standardError === null) return null;
  const { standardError, effectiveUnits } = estimate;
  // Sums of weights may miss 0 or 1 by a rounding error.
  const value = Math.min(1, Math.max(0, estimate.value));
  if (Math.abs(value - estimate.value) > 1e-9) throw new RangeError(`A share is needed, got ${estimate.value}.`);
  if (kind === 'normal') {
    const half = normalQuantile(1 - (1 - confidence) / 2) * standardError;
    return { kind, low: Math.max(0, value - half), high: Math.min(1, value + half) };
  }
  const spread = value * (1 - value);
  const trials = standardError > 1e-12 && spread > 1e-12 ? spread / standardError ** 2 : effectiveUnits;
  const interval = wilsonInterval(value * trials, trials, confidence);
  return interval && { kind, ...interval };
}

/**
 * Interval of kappa or of a difference, estimate ± z·S, not clipped; `null` when there is no standard error above 0.
 */
export function normalInterval(
  estimate: { value: number; standardError: number | null } | null,
  confidence = 0.95,
): Interval | null {
  if (!estimate || estimate.standardError === null || estimate.standardError === 0) return null;
  const half = normalQuantile(1 - (1 - confidence) / 2) * estimate.standardError;
  return { low: estimate.value - half, high: estimate.value + half };
}
