import { estimateCombinedRatio, type CellValue, type CountedStratum } from './combined-ratio.ts';
import { addToConfusionMatrix, createConfusionMatrix } from './confusion-matrix.ts';
import { normalInterval } from './design-interval.ts';
import type { Interval } from './interval.ts';
import type { KappaResult } from './kappa.ts';
import { compareByMcNemar, type McNemarResult } from './mcnemar.ts';
import { erfc } from './quantiles.ts';
import type { StratumSize } from './reference-units.ts';

/** A reference point judged against two maps; all are indices from 0. */
export interface PairedUnit {
  stratum: number;
  first: number;
  second: number;
  reference: number;
}

export interface MapComparison {
  /** Design-based overall accuracies. */
  first: number;
  second: number;
  /** first − second. */
  difference: number;
  /** `null` when a stratum holds a single unit. */
  standardError: number | null;
  /** Covariance of the two estimates: positive, since both maps are judged on the same points. */
  covariance: number | null;
  interval: Interval | null;
  /** Two-sided p of difference / standardError; `null` without a standard error above 0. */
  pValue: number | null;
  /**
   * McNemar on the plain counts; it weighs all points alike, so it speaks for the sample where strata were not sampled
   * at one rate. `null` when the maps are right at the same points.
   */
  mcNemar: McNemarResult | null;
  /** b and c of McNemar: points only the first, only the second map has right. */
  onlyFirstRight: number;
  onlySecondRight: number;
}

/**
 * Compares two maps on the same stratified sample of reference points.
 *
 * The difference of the overall accuracies is itself a stratified mean, of d = right on the first − right on the second;
 * its variance V(d̄) = V(O₁) + V(O₂) − 2·Cov(O₁, O₂) holds the covariance without being told. Strata may come from either
 * map or neither. `null` when a stratum of some size has no unit.
 * Source: Cochran 1977, Sampling Techniques (stratified mean); McNemar 1947; Foody 2004, PE&RS 70:627–633 (related
 * samples).
 * @throws RangeError when a stratum index is out of range.
 */
export function compareMaps(
  units: readonly PairedUnit[],
  strata: readonly StratumSize[],
  { finitePopulationCorrection = false, confidence = 0.95 } = {},
): MapComparison | null {
  // A 2 × 2 table a stratum: row 1 the first map is right, column 1 the second is.
  const tables = strata.map(() => createConfusionMatrix(2));
  for (const { stratum, first, second, reference } of units) {
    if (!tables[stratum]) throw new RangeError(`A unit is of stratum ${stratum}, expected 0..${strata.length - 1}.`);
    addToConfusionMatrix(tables[stratum], Number(first === reference), Number(second === reference));
  }
  const counted = strata
    .map(({ size, areaHa }, h): CountedStratum => {
      const nUnits = tables[h].counts.reduce((sum, count) => sum + count, 0);
      return { size, weight: areaHa ?? size, nUnits, counts: tables[h] };
    })
    .filter(({ size }) => size > 0);
  if (counted.length === 0 || counted.some(({ nUnits }) => nUnits === 0)) return null;

  const mean = (y: CellValue) => estimateCombinedRatio(counted, y, () => 1, { finitePopulationCorrection })!;
  const first = mean((a) => a);
  const second = mean((_a, b) => b);
  const difference = mean((a, b) => a - b);
  const [onlyFirstRight, onlySecondRight] = [2, 1].map((cell) =>
    tables.reduce((sum, { counts }) => sum + counts[cell], 0),
  );
  const { standardError } = difference;
  const covariance =
    first.standardError === null || second.standardError === null || standardError === null
      ? null
      : (first.standardError ** 2 + second.standardError ** 2 - standardError ** 2) / 2;
  return {
    first: first.value,
    second: second.value,
    difference: difference.value,
    standardError,
    covariance,
    interval: normalInterval(difference, confidence),
    pValue: standardError ? twoSidedP(difference.value / standardError) : null,
    mcNemar: compareByMcNemar(onlyFirstRight, onlySecondRight),
    onlyFirstRight,
    onlySecondRight,
  };
}

/**
 * Compares two kappas of **independent** samples, z = (K₁ − K₂) / sqrt(V₁ + V₂), p two-sided; `null` when both
 * variances are 0.
 *
 * Not for two maps judged on the same points (use `compareMaps`): their kappas are related.
 * Source: Congalton & Green 1999, Assessing the Accuracy of Remotely Sensed Data (from memory); Foody 2004, PE&RS
 * 70:627–633.
 */
export function compareIndependentKappas(
  first: Pick<KappaResult, 'kappa' | 'variance'>,
  second: Pick<KappaResult, 'kappa' | 'variance'>,
): { z: number; pValue: number } | null {
  const variance = first.variance + second.variance;
  if (variance === 0) return null;
  const z = (first.kappa - second.kappa) / Math.sqrt(variance);
  return { z, pValue: twoSidedP(z) };
}

/** Two-sided p of kappa's Z test against 0, with the variance under kappa = 0; `null` where that is 0. */
export function testKappa(kappa: KappaResult): { z: number; pValue: number } | null {
  return kappa.nullZ === null ? null : { z: kappa.nullZ, pValue: twoSidedP(kappa.nullZ) };
}

function twoSidedP(z: number): number {
  return erfc(Math.abs(z) / Math.SQRT2);
}
