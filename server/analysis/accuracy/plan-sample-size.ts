/** One map class in the plan: its share of the area and the user's accuracy one expects. */
export interface PlannedStratum {
  areaShare: number;
  expectedUsers: number;
}

/**
 * Units a stratified sample needs for a wanted standard error of overall accuracy, n = (Σ W_i S_i / S(O))² rounded up,
 * with S_i = sqrt(U_i (1 − U_i)). This n is reached with Neyman allocation; others need more for the same error.
 *
 * With the population's number of units N it is Cochran's n = (Σ W_i S_i)² / (S(O)² + Σ W_i S_i² / N), which matters for
 * small areas only.
 * Source: Olofsson et al. 2014, Remote Sensing of Environment 148:42–57, eq. 13 (after Cochran 1977, eq. 5.25).
 * @throws RangeError when the shares do not sum to 1, an accuracy is outside 0..1 or the standard error not positive.
 */
export function planSampleSize(
  strata: readonly PlannedStratum[],
  standardError: number,
  nPopulation = Infinity,
): number {
  requirePlan(strata);
  if (!(standardError > 0)) throw new RangeError(`A positive standard error is needed, got ${standardError}.`);
  if (!(nPopulation >= 1)) throw new RangeError(`A population of at least one unit is needed, got ${nPopulation}.`);
  let spread = 0;
  let variance = 0;
  for (const { areaShare, expectedUsers } of strata) {
    spread += areaShare * Math.sqrt(expectedUsers * (1 - expectedUsers));
    variance += areaShare * expectedUsers * (1 - expectedUsers);
  }
  return Math.ceil(spread ** 2 / (standardError ** 2 + variance / nPopulation));
}

/** @throws RangeError when the shares do not sum to 1 or an accuracy is outside 0..1. */
export function requirePlan(strata: readonly PlannedStratum[]): void {
  const sum = strata.reduce((total, { areaShare }) => total + areaShare, 0);
  if (Math.abs(sum - 1) > 1e-6) throw new RangeError(`Area shares must sum to 1, got ${sum}.`);
  for (const { areaShare, expectedUsers } of strata) {
    if (!(areaShare >= 0)) throw new RangeError(`An area share is ${areaShare}.`);
    if (!(expectedUsers >= 0 && expectedUsers <= 1)) throw new RangeError(`Expected accuracy ${expectedUsers}.`);
  }
}
