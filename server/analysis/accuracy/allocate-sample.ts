import { intervalOfShare } from './design-interval.ts';
import type { Interval } from './interval.ts';
import { requirePlan, type PlannedStratum } from './plan-sample-size.ts';
import { normalQuantile } from './quantiles.ts';

/**
 * How n units are shared out among strata: the same number to each; in proportion to area; in proportion to W_i S_i
 * (Neyman: least standard error of overall accuracy for n); or `atLeast` to each and the rest in proportion.
 */
export type AllocationRule =
  { kind: 'equal' } | { kind: 'proportional' } | { kind: 'neyman' } | { kind: 'minimum'; atLeast: number };

/**
 * Shares out n units among strata by a rule, by largest remainders (ties to the earlier stratum).
 *
 * `capacities` are the units each stratum holds: what a full stratum cannot take goes to the others by the same rule.
 * With the minimum, a stratum smaller than it gives all it has.
 * Source: Olofsson et al. 2014, Remote Sensing of Environment 148:42–57, sec. 5.1; Neyman allocation: Cochran 1977,
 * Sampling Techniques, sec. 5.5.
 * @returns one number for each stratum, summing to n.
 * @throws RangeError when the plan is not one, n is not a whole number, exceeds the capacities, or does not reach for the
 * minimum.
 */
export function allocateSample(
  strata: readonly PlannedStratum[],
  n: number,
  rule: AllocationRule,
  capacities: readonly number[] = strata.map(() => Infinity),
): number[] {
  requirePlan(strata);
  if (!Number.isInteger(n) || n < 1) throw new RangeError(`A number of units is needed, got ${n}.`);
  const held = capacities.reduce((sum, capacity) => sum + capacity, 0);
  if (capacities.length !== strata.length) throw new RangeError(`Got ${capacities.length} capacities.`);
  if (n > held) throw new RangeError(`${n} units are more than the ${held} there are.`);
  const floors = capacities.map((capacity) => Math.min(rule.kind === 'minimum' ? rule.atLeast : 0, capacity));
  const least = floors.reduce((sum, floor) => sum + floor, 0);
  if (least > n) throw new RangeError(`${n} units do not reach for the ${least} of the minimum.`);
  return roundToSum(shareOut(strata.map(weightUnder(rule)), n, floors, capacities), n, capacities);
}

export interface ExpectedPrecision {
  /** Standard error of overall accuracy; `null` when a stratum that matters has fewer than two units. */
  standardError: number | null;
  /** Half-width of its normal interval. */
  halfWidth: number | null;
  /** Expected interval of each class's user's accuracy (Wilson, with n_i − 1 units); `null` for fewer than two. */
  users: (Interval | null)[];
}

/**
 * What an allocation is expected to give when strata are the map classes and their accuracies turn out as planned:
 * S(O) = sqrt(Σ W_i² U_i (1 − U_i) / (n_i − 1)), as `estimateStratified` will report it.
 *
 * Producer's accuracies and areas depend on where the errors fall, which a plan of user's accuracies does not say.
 * Source: Olofsson et al. 2014, eq. 5.
 * @throws RangeError when the plan is not one or the allocation has other strata.
 */
export function expectPrecision(
  strata: readonly PlannedStratum[],
  allocation: readonly number[],
  confidence = 0.95,
): ExpectedPrecision {
  requirePlan(strata);
  if (allocation.length !== strata.length) throw new RangeError(`Got an allocation to ${allocation.length} strata.`);
  const variance = strata.reduce<number | null>((sum, { areaShare, expectedUsers }, i) => {
    if (sum === null || areaShare === 0) return sum;
    return allocation[i] < 2
      ? null
      : sum + (areaShare ** 2 * expectedUsers * (1 - expectedUsers)) / (allocation[i] - 1);
  }, 0);
  const standardError = variance === null ? null : Math.sqrt(variance);
  return {
    standardError,
    halfWidth: standardError === null ? null : normalQuantile(1 - (1 - confidence) / 2) * standardError,
    users: strata.map(({ expectedUsers }, i) => {
      const n = allocation[i];
      if (n < 2) return null;
      const spread = Math.sqrt((expectedUsers * (1 - expectedUsers)) / (n - 1));
      const estimate = { value: expectedUsers, standardError: spread, nUnits: n, effectiveUnits: n };
      const interval = intervalOfShare(estimate, 'wilson', confidence);
      return interval && { low: interval.low, high: interval.high };
    }),
  };
}

export interface PrecisionPoint {
  n: number;
  standardError: number | null;
  halfWidth: number | null;
}

/**
 * Precision of overall accuracy against the number of units under a rule, for a curve. Sizes that do not reach for the
 * minimum are left out.
 * @throws RangeError as `allocateSample` does.
 */
export function curvePrecision(
  strata: readonly PlannedStratum[],
  sizes: readonly number[],
  rule: AllocationRule,
  confidence = 0.95,
): PrecisionPoint[] {
  const least = rule.kind === 'minimum' ? rule.atLeast * strata.length : 1;
  return sizes
    .filter((n) => n >= least)
    .map((n) => {
      const { standardError, halfWidth } = expectPrecision(strata, allocateSample(strata, n, rule), confidence);
      return { n, standardError, halfWidth };
    });
}

function weightUnder(rule: AllocationRule): (stratum: PlannedStratum) => number {
  if (rule.kind === 'equal') return () => 1;
  if (rule.kind !== 'neyman') return ({ areaShare }) => areaShare;
  return ({ areaShare, expectedUsers }) => areaShare * Math.sqrt(expectedUsers * (1 - expectedUsers));
}

/**
 * Real-valued shares of n in proportion to weights, kept within floors and capacities: whoever breaks a bound is fixed at
 * it, those with too little first, and the rest is shared again.
 */
function shareOut(
  weights: readonly number[],
  n: number,
  floors: readonly number[],
  capacities: readonly number[],
): number[] {
  const fixed: (number | null)[] = weights.map(() => null);
  for (;;) {
    const nLeft = n - fixed.reduce<number>((sum, value) => sum + (value ?? 0), 0);
    const free = weights.reduce((sum, weight, i) => sum + (fixed[i] === null ? weight : 0), 0);
    const nFree = fixed.filter((value) => value === null).length;
    // Only strata without weight are left (a certain class under Neyman): they share evenly.
    const exact = weights.map((weight, i) => fixed[i] ?? (free > 0 ? (weight / free) * nLeft : nLeft / nFree));
    const isLow = exact.map((value, i) => fixed[i] === null && value < floors[i]);
    const isHigh = exact.map((value, i) => fixed[i] === null && value > capacities[i]);
    if (!isLow.includes(true) && !isHigh.includes(true)) return exact;
    const lack = exact.reduce((sum, value, i) => sum + (isLow[i] ? floors[i] - value : 0), 0);
    const excess = exact.reduce((sum, value, i) => sum + (isHigh[i] ? value - capacities[i] : 0), 0);
    exact.forEach((_, i) => {
      if (lack >= excess ? isLow[i] : isHigh[i]) fixed[i] = lack >= excess ? floors[i] : capacities[i];
    });
  }
}

function roundToSum(exact: readonly number[], n: number, capacities: readonly number[]): number[] {
  // A whole number must not fall by a rounding error of the sharing.
  const whole = exact.map((value) => Math.floor(value + 1e-9));
  const byRemainder = exact.map((value, i) => ({ i, remainder: value - whole[i] }));
  byRemainder.sort((a, b) => b.remainder - a.remainder || a.i - b.i);
  let nLeft = n - whole.reduce((sum, value) => sum + value, 0);
  for (let turn = 0; nLeft > 0; turn = (turn + 1) % byRemainder.length) {
    const { i } = byRemainder[turn];
    if (whole[i] >= capacities[i]) continue;
    whole[i]++;
    nLeft--;
  }
  return whole;
}
