import { estimateCombinedRatio, type CellValue, type CountedStratum, type Estimate } from './combined-ratio.ts';
import { computeDisagreement, differentiateDisagreement } from './disagreement.ts';
import { confusionMatrixMargins, createConfusionMatrix, type ConfusionMatrix } from './confusion-matrix.ts';

/** A stratum of the mapped area and what was found at the reference units drawn in it at random. */
export interface StratumSample {
  /** Size of the stratum N_h, in units (pixels). */
  size: number;
  /** Units by mapped (rows) and reference class (columns). Strata need not be the map classes. */
  counts: ConfusionMatrix;
  /** Units drawn in the stratum that lie outside the zone looked at; none when the whole area is. */
  nOutside?: number;
  /** True area of the stratum. With it strata weigh by area instead of by units; give it for all strata or none. */
  areaHa?: number;
}

export interface StratifiedEstimate {
  /** Units inside the zone looked at. */
  nUnits: number;
  /** Estimated share of the area (of the zone) in each cell; sums to 1. */
  proportions: ConfusionMatrix;
  overall: Estimate;
  /** Kappa of the estimated proportions; `null` where expected agreement is 1. */
  kappa: Estimate | null;
  /** Quantity and allocation disagreement of the estimated proportions. */
  quantity: Estimate;
  allocation: Estimate;
  perClass: {
    /** Estimated share of the area that is of this class on the ground. */
    areaShare: Estimate;
    /** `null` when the class is not mapped in the sample. */
    users: Estimate | null;
    /** `null` when the reference of the sample does not hold the class. */
    producers: Estimate | null;
    /** F1 = 2·p_kk / (p_k+ + p_+k); `null` when neither map nor reference of the sample hold the class. */
    f1: Estimate | null;
  }[];
}

/**
 * Estimates accuracy and area from a stratified random sample of reference units, with standard errors.
 *
 * Shares are weighted means over strata; user's and producer's accuracy and F1 are combined ratio estimates. With strata
 * equal to the map classes and no finite population correction this is Olofsson et al. 2014, eq. 5–7 and 10–11. For a
 * zone, pass only the units inside it in `counts` and the others of the stratum in `nOutside` (estimation for a domain).
 * The standard errors of kappa and of both disagreements come from their derivatives by the cells (Taylor linearisation); that of kappa in a single
 * stratum is the large-sample one of `computeKappa` with n − 1 for n.
 * Returns `null` when a stratum of some size has no unit, since nothing is then known of it, and when no unit lies in
 * the zone.
 * Source: Stehman 2014, International Journal of Remote Sensing 35:4923–4939; Olofsson et al. 2014, Remote Sensing of
 * Environment 148:42–57; Cochran 1977, Sampling Techniques.
 * @throws RangeError when strata are missing, differ in classes, or hold more units than their size.
 */
export function estimateStratified(
  strata: readonly StratumSample[],
  finitePopulationCorrection = false,
): StratifiedEstimate | null {
  const nClasses = requireStrata(strata);
  const counted = strata
    .filter(({ size }) => size > 0)
    .map(({ size, counts, nOutside = 0, areaHa }): CountedStratum => {
      const nUnits = counts.counts.reduce((sum, count) => sum + count, nOutside);
      return { size, counts, nUnits, weight: areaHa ?? size };
    });
  if (counted.some(({ nUnits }) => nUnits === 0)) return null;

  const ratio = (y: CellValue, x: CellValue, onlyWhereX = false): Estimate | null =>
    estimateCombinedRatio(counted, y, x, { finitePopulationCorrection, onlyWhereX });
  const one: CellValue = () => 1;
  const isRight: CellValue = (mapped, reference) => Number(mapped === reference);
  const overall = ratio(isRight, one);
  if (!overall) return null;

  const proportions = createConfusionMatrix(nClasses);
  let inZone = 0;
  for (const { weight, nUnits, counts } of counted) {
    counts.counts.forEach((count, i) => {
      proportions.counts[i] += (weight * count) / nUnits;
      inZone += (weight * count) / nUnits;
    });
  }
  for (let i = 0; i < proportions.counts.length; i++) proportions.counts[i] /= inZone;

  const kappa = linearise(proportions);
  const disagreement = computeDisagreement(proportions)!;
  const derivatives = differentiateDisagreement(proportions);
  const spreadOr = (spread: Estimate | null, value: number): Estimate =>
    spread ? { ...spread, value } : { ...overall, value, standardError: null };
  const spreadOfKappa = kappa && ratio(kappa.derivative, one);
  return {
    nUnits: overall.nUnits,
    proportions,
    overall,
    kappa: spreadOfKappa && { ...spreadOfKappa, value: kappa.value },
    quantity: spreadOr(derivatives && ratio(derivatives.quantity, one), disagreement.quantity),
    allocation: spreadOr(derivatives && ratio(derivatives.allocation, one), disagreement.allocation),
    perClass: Array.from({ length: nClasses }, (_, k) => {
      const isMapped: CellValue = (mapped) => Number(mapped === k);
      const isReference: CellValue = (_mapped, reference) => Number(reference === k);
      const isBoth: CellValue = (mapped, reference) => Number(mapped === k && reference === k);
      return {
        areaShare: ratio(isReference, one)!,
        // Strata are mostly map classes: one in which the class is not mapped has no part in its user's accuracy.
        users: ratio(isBoth, isMapped, true),
        producers: ratio(isBoth, isReference),
        f1: ratio(
          (mapped, reference) => 2 * isBoth(mapped, reference),
          (mapped, reference) => isMapped(mapped, reference) + isReference(mapped, reference),
        ),
      };
    }),
  };
}

/** Kappa of proportions and its derivative by each of them; `null` where expected agreement is 1. */
function linearise(proportions: ConfusionMatrix): { value: number; derivative: CellValue } | null {
  const { nClasses, counts } = proportions;
  const { mapped, reference } = confusionMatrixMargins(proportions);
  let observed = 0;
  let expected = 0;
  for (let k = 0; k < nClasses; k++) {
    observed += counts[k * nClasses + k];
    expected += mapped[k] * reference[k];
  }
  const beyondChance = 1 - expected;
  if (beyondChance <= 1e-12) return null;
  return {
    value: (observed - expected) / beyondChance,
    // ∂p_e/∂p_ij = p_+i + p_j+: crossed, as in the large-sample variance.
    derivative: (i, j) =>
      Number(i === j) / beyondChance - ((reference[i] + mapped[j]) * (1 - observed)) / beyondChance ** 2,
  };
}

function requireStrata(strata: readonly StratumSample[]): number {
  if (strata.length === 0 || strata.every(({ size }) => size === 0)) throw new RangeError('No stratum has any size.');
  const { nClasses } = strata[0].counts;
  const hasAreas = strata[0].areaHa !== undefined;
  strata.forEach(({ size, counts, nOutside = 0, areaHa }, h) => {
    const n = counts.counts.reduce((sum, count) => sum + count, nOutside);
    if (counts.nClasses !== nClasses)
      throw new RangeError(`Stratum ${h} has ${counts.nClasses} classes, not ${nClasses}.`);
    if (!(size >= n) || !Number.isFinite(size)) throw new RangeError(`Stratum ${h} of size ${size} has ${n} units.`);
    if (!(nOutside >= 0)) throw new RangeError(`Stratum ${h} has ${nOutside} units outside the zone.`);
    if ((areaHa !== undefined) !== hasAreas) throw new RangeError('Give the area of all strata or of none.');
    if (areaHa !== undefined && !(Number.isFinite(areaHa) && (areaHa > 0 || size === 0))) {
      throw new RangeError(`Stratum ${h} has an area of ${areaHa} ha.`);
    }
  });
  return nClasses;
}
