/** One map class in the plan: its share of the area and the user's accuracy one expects. */
export interface PlannedStratum {
  areaShare: number;
  expectedUsers: number;
}

/**
 * Units a stratified sample needs for a wanted standard error of overall accuracy, n = (Σ W_i S_i / S(O))² rounded up,
 * with S_i = sqrt(U_i (1 − U_i)).
 *
 * Source: Olofsson et al. 2014, Remote Sensing of Environment 148:42–57, eq. 13 (after Cochran 1977, eq. 5.25).
 * @throws RangeError when the shares do not sum to 1, an accuracy is outside 0..1 or the standard error not positive.
 */
export function planSampleSize(strata: readonly PlannedStratum[], standardError: number): number {
  const sum = strata.reduce((total, { areaShare }) => total + areaShare, 0);
  if (Math.abs(sum - 1) > 1e-6) throw new RangeError(`Area shares must sum to 1, got ${sum}.`);
  if (!(standardError > 0)) throw new RangeError(`A positive standard error is needed, got ${standardError}.`);
  const spread = strata.reduce((total, { areaShare, expectedUsers }) => {
    if (!(expectedUsers >= 0 && expectedUsers <= 1)) throw new RangeError(`Expected accuracy ${expectedUsers}.`);
    return total + areaShare * Math.sqrt(expectedUsers * (1 - expectedUsers));
  }, 0);
  return Math.ceil((spread / standardError) ** 2);
}

/**
 * Shares out n units in proportion to area with at least `atLeast` for each class, by largest remainders, so that the
 * sum is n.
 *
 * Classes whose share would be smaller get `atLeast`, and the rest is shared among the others.
 * @throws RangeError when n does not reach for `atLeast` in every class.
 */
export function allocateProportionally(areaShares: readonly number[], n: number, atLeast = 0): number[] {
  if (n < atLeast * areaShares.length) {
    throw new RangeError(`${n} units do not reach for ${atLeast} in each of ${areaShares.length} classes.`);
  }
  const isFixed = areaShares.map(() => false);
  for (;;) {
    const nFree = n - atLeast * isFixed.filter(Boolean).length;
    const freeShare = areaShares.reduce((sum, share, i) => sum + (isFixed[i] ? 0 : share), 0);
    const exact = areaShares.map((share, i) => (isFixed[i] || freeShare === 0 ? atLeast : (share / freeShare) * nFree));
    const tooSmall = exact.findIndex((value, i) => !isFixed[i] && value < atLeast);
    if (tooSmall < 0) return roundToSum(exact, n);
    exact.forEach((value, i) => (isFixed[i] ||= value < atLeast));
  }
}

function roundToSum(exact: readonly number[], n: number): number[] {
  const whole = exact.map(Math.floor);
  const nLeft = n - whole.reduce((sum, value) => sum + value, 0);
  const byRemainder = exact.map((value, i) => ({ i, remainder: value - whole[i] }));
  byRemainder.sort((a, b) => b.remainder - a.remainder || a.i - b.i);
  for (const { i } of byRemainder.slice(0, nLeft)) whole[i]++;
  return whole;
}
