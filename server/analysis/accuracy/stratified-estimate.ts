import { createConfusionMatrix, type ConfusionMatrix } from './confusion-matrix.ts';

/** A stratum of the mapped area and what was found at the reference units drawn in it at random. */
export interface StratumSample {
  /** Size of the stratum N_h, in units (pixels). */
  size: number;
  /** Units by mapped (rows) and reference class (columns). Strata need not be the map classes. */
  counts: ConfusionMatrix;
}

export interface Estimate {
  value: number;
  /** `null` when a stratum that matters has fewer than two units. */
  standardError: number | null;
}

export interface StratifiedEstimate {
  nUnits: number;
  /** Estimated share of the whole area in each cell; sums to 1. */
  proportions: ConfusionMatrix;
  overall: Estimate;
  perClass: {
    /** Estimated share of the area that is of this class on the ground. */
    areaShare: Estimate;
    /** `null` when the class is not mapped in the sample. */
    users: Estimate | null;
    /** `null` when the reference of the sample does not hold the class. */
    producers: Estimate | null;
  }[];
}

/**
 * Estimates accuracy and area from a stratified random sample of reference units, with standard errors.
 *
 * Shares are weighted means over strata; user's and producer's accuracy are combined ratio estimates. With strata
 * equal to the map classes and no finite population correction this is Olofsson et al. 2014, eq. 5–7 and 10–11.
 * Returns `null` when a stratum of some size has no unit, since nothing is then known of it.
 * Source: Stehman 2014, International Journal of Remote Sensing 35:4923–4939; Olofsson et al. 2014, Remote Sensing of
 * Environment 148:42–57; Cochran 1977, Sampling Techniques.
 * @throws RangeError when strata are missing, differ in classes, or hold more units than their size.
 */
export function estimateStratified(
  strata: readonly StratumSample[],
  finitePopulationCorrection = false,
): StratifiedEstimate | null {
  const nClasses = requireStrata(strata);
  const sampled = strata.filter(({ size }) => size > 0);
  const total = sampled.reduce((sum, { size }) => sum + size, 0);
  const units = sampled.map(({ counts }) => counts.counts.reduce((sum, count) => sum + count, 0));
  if (units.some((n) => n === 0)) return null;

  const proportions = createConfusionMatrix(nClasses);
  sampled.forEach(({ size, counts }, h) => {
    for (let i = 0; i < counts.counts.length; i++) {
      proportions.counts[i] += ((size / total) * counts.counts[i]) / units[h];
    }
  });

  const everything = (): boolean => true;
  return {
    nUnits: units.reduce((sum, n) => sum + n, 0),
    proportions,
    overall: ratio((mapped, reference) => mapped === reference, everything)!,
    perClass: Array.from({ length: nClasses }, (_, k) => ({
      areaShare: ratio((_mapped, reference) => reference === k, everything)!,
      users: ratio(
        (mapped, reference) => mapped === k && reference === k,
        (mapped) => mapped === k,
        true,
      ),
      producers: ratio(
        (mapped, reference) => mapped === k && reference === k,
        (_mapped, reference) => reference === k,
      ),
    })),
  };

  /** Combined ratio of two indicators, the first implying the second; `null` when the second never holds. */
  function ratio(isY: Indicator, isX: Indicator, isOfMapOnly = false): Estimate | null {
    const sums = sampled.map(({ counts }) => ({ y: sumWhere(counts, isY), x: sumWhere(counts, isX) }));
    const expand = (of: 'x' | 'y'): number =>
      sums.reduce((sum, one, h) => sum + (sampled[h].size * one[of]) / units[h], 0);
    const totalX = expand('x');
    if (totalX === 0) return null;
    const value = expand('y') / totalX;
    let variance: number | null = 0;
    sums.forEach(({ x, y }, h) => {
      const n = units[h];
      if (variance === null) return;
      // Strata are mostly map classes: one in which the class is not mapped at all has no part in its user's accuracy.
      if (x === 0 && isOfMapOnly) return;
      // Residual y − R·x is 1 − R where both hold, −R where only x holds, 0 elsewhere.
      const mean = (y - value * x) / n;
      const squares = y * (1 - value) ** 2 + (x - y) * value ** 2 - n * mean ** 2;
      const { size } = sampled[h];
      const correction = finitePopulationCorrection ? 1 - n / size : 1;
      variance = n < 2 ? null : variance + (size ** 2 * correction * Math.max(0, squares)) / ((n - 1) * n);
    });
    return { value, standardError: variance === null ? null : Math.sqrt(variance) / totalX };
  }
}

type Indicator = (mapped: number, reference: number) => boolean;

function sumWhere({ nClasses, counts }: ConfusionMatrix, holds: Indicator): number {
  let sum = 0;
  for (let i = 0; i < counts.length; i++) if (holds(Math.floor(i / nClasses), i % nClasses)) sum += counts[i];
  return sum;
}

function requireStrata(strata: readonly StratumSample[]): number {
  if (strata.length === 0 || strata.every(({ size }) => size === 0)) throw new RangeError('No stratum has any size.');
  const { nClasses } = strata[0].counts;
  strata.forEach(({ size, counts }, h) => {
    const n = counts.counts.reduce((sum, count) => sum + count, 0);
    if (counts.nClasses !== nClasses)
      throw new RangeError(`Stratum ${h} has ${counts.nClasses} classes, not ${nClasses}.`);
    if (!(size >= n) || !Number.isFinite(size)) throw new RangeError(`Stratum ${h} of size ${size} has ${n} units.`);
  });
  return nClasses;
}
