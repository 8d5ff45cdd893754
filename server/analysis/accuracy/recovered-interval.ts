import { wilsonInterval, type Interval } from './interval.ts';
import type { StratumSample } from './stratified-estimate.ts';

export interface RecoveredIntervals {
  /** Of the class's producer's accuracy; `null` where the sample does not hold the class. */
  producers: Interval | null;
  /** Of the class's share of the area; `null` for a zone, whose share is a ratio. */
  areaShare: Interval | null;
}

/**
 * Intervals of producer's accuracy and area share that do not take "no omission seen in n units" for "no omission".
 *
 * The variance of Olofsson et al. 2014 is 0 in a stratum where none of n units is of the class, although a large stratum
 * may hide much of a rare class behind n units. Here each stratum brings the Wilson interval [l, u] of its proportion p,
 * and the limits of Σ W p are put together by variance recovery (MOVER): Σ W p − sqrt(Σ W² (p − l)²) and
 * Σ W p + sqrt(Σ W² (u − p)²). Producer's accuracy is 1/(1 + M/T) of the share hit T and the share missed M, with the
 * limits of the ratio M/T of Donner & Zou; hits and misses are taken as independent, which they are where strata are the
 * map classes. The intervals are not symmetric, and for a rare class they are wide. How often the three kinds hold the
 * true value is printed by tests/bench/coverage.ts.
 * Source: Zou & Donner 2008, Statistics in Medicine 27:1693–1702; Donner & Zou 2012, Statistical Methods in Medical
 * Research 21:347–359 (both from memory); Wilson 1927.
 * @returns one entry for each class, or `null` when a stratum of some size has no unit.
 */
export function recoverIntervals(strata: readonly StratumSample[], confidence = 0.95): RecoveredIntervals[] | null {
  const sampled = strata.filter(({ size }) => size > 0);
  const nUnits = sampled.map(({ counts, nOutside = 0 }) => counts.counts.reduce((sum, n) => sum + n, nOutside));
  if (sampled.length === 0 || nUnits.includes(0)) return null;
  const { nClasses } = sampled[0].counts;
  const total = sampled.reduce((sum, { size, areaHa }) => sum + (areaHa ?? size), 0);
  const isWhole = sampled.every(({ nOutside = 0 }) => nOutside === 0);

  /** Σ W p with its limits, p being the share of a stratum's units whose cell holds. */
  function limitsOf(holds: (mapped: number, reference: number) => boolean): Interval & { value: number } {
    let value = 0;
    let down = 0;
    let up = 0;
    sampled.forEach(({ size, areaHa, counts }, h) => {
      let hits = 0;
      counts.counts.forEach((count, i) => {
        if (holds(Math.floor(i / nClasses), i % nClasses)) hits += count;
      });
      const weight = (areaHa ?? size) / total;
      const p = hits / nUnits[h];
      const { low, high } = wilsonInterval(hits, nUnits[h], confidence)!;
      value += weight * p;
      down += (weight * (p - low)) ** 2;
      up += (weight * (high - p)) ** 2;
    });
    return { value, low: Math.max(0, value - Math.sqrt(down)), high: value + Math.sqrt(up) };
  }

  return Array.from({ length: nClasses }, (_, k) => {
    const share = limitsOf((_mapped, reference) => reference === k);
    if (share.value === 0) return { producers: null, areaShare: isWhole ? clip(share) : null };
    const hit = limitsOf((mapped, reference) => reference === k && mapped === k);
    const missed = limitsOf((mapped, reference) => reference === k && mapped !== k);
    const odds = limitsOfRatio(missed, hit);
    return {
      producers: { low: 1 / (1 + odds.high), high: 1 / (1 + odds.low) },
      areaShare: isWhole ? clip(share) : null,
    };
  });
}

/** Limits of top / bottom from theirs; the upper one is infinite where the bottom may be 0. */
function limitsOfRatio(top: Interval & { value: number }, bottom: Interval & { value: number }): Interval {
  const product = top.value * bottom.value;
  const ofLow = bottom.high * (2 * bottom.value - bottom.high);
  const ofHigh = bottom.low * (2 * bottom.value - bottom.low);
  const root = (a: number): number => Math.sqrt(Math.max(0, a));
  // Multiplied out by the conjugate, so that a denominator near 0 does no harm.
  const below = top.low * (2 * top.value - top.low);
  const above = top.high * (2 * top.value - top.high);
  const low = below / (product + root(product ** 2 - below * ofLow));
  const high = ofHigh > 0 ? (product + root(product ** 2 - above * ofHigh)) / ofHigh : Infinity;
  return { low: Number.isFinite(low) ? Math.max(0, low) : 0, high };
}

function clip({ low, high }: Interval): Interval {
  return { low: Math.max(0, low), high: Math.min(1, high) };
}
