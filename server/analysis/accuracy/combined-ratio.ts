import type { ConfusionMatrix } from './confusion-matrix.ts';

/** Units drawn at random without replacement in one stratum, counted by what they are. */
export interface CountedStratum {
  /** Weight of the stratum, N_h or its area, in any unit common to all strata. */
  weight: number;
  /** Number of units in the stratum, N_h; only the finite population correction asks for it. */
  size: number;
  /** Units drawn, n_h. May exceed the sum of `counts`: the others lie outside the zone looked at and count as zeros. */
  nUnits: number;
  /** Units inside the zone by mapped (rows) and reference class (columns). */
  counts: ConfusionMatrix;
}

/** An estimate with what its interval needs. */
export interface Estimate {
  value: number;
  /** `null` when a stratum that matters has fewer than two units. */
  standardError: number | null;
  /** Sample units behind the denominator. */
  nUnits: number;
  /** Kish's effective number of those units, (Σw)² / Σw²: fewer than nUnits where their weights differ. */
  effectiveUnits: number;
}

/** Share of the largest value below which residuals differ by rounding only. */
const ROUNDING = 1e-12;

/** Value of a unit that was mapped as one class and is another on the ground. */
export type CellValue = (mapped: number, reference: number) => number;

/**
 * Combined ratio estimate R = Σ W_h ȳ_h / Σ W_h x̄_h over strata, with the variance
 * Σ W_h² (1 − f_h) s²_h(y − R·x) / n_h, divided by (Σ W_h x̄_h)².
 *
 * `y` and `x` give a unit's values from its cell; units outside the zone have zeros. `null` when no unit has any x.
 * f_h is n_h / N_h with the finite population correction and 0 without. `onlyWhereX` leaves strata without any x out of
 * the variance (they add nothing to it) even where they hold a single unit. Residuals that differ by rounding only count
 * as equal, so that perfect agreement has a standard error of 0.
 * Source: Cochran 1977, Sampling Techniques, sec. 6.11; Stehman 2014, International Journal of Remote Sensing
 * 35:4923–4939. Effective number: Kish 1965, Survey Sampling.
 */
export function estimateCombinedRatio(
  strata: readonly CountedStratum[],
  y: CellValue,
  x: CellValue,
  { finitePopulationCorrection = false, onlyWhereX = false } = {},
): Estimate | null {
  let totalY = 0;
  let totalX = 0;
  let squaredWeights = 0;
  let nUnits = 0;
  for (const { weight, nUnits: n, counts } of strata) {
    forEachCell(counts, (count, mapped, reference) => {
      const valueX = x(mapped, reference);
      totalY += (weight / n) * count * y(mapped, reference);
      totalX += (weight / n) * count * valueX;
      squaredWeights += (weight / n) ** 2 * count * valueX ** 2;
      if (valueX !== 0) nUnits += count;
    });
  }
  if (totalX === 0) return null;
  const value = totalY / totalX;
  let variance: number | null = 0;
  for (const { weight, size, nUnits: n, counts } of strata) {
    let sum = 0;
    let scale = 0;
    let nOutside = n;
    let hasX = false;
    forEachCell(counts, (count, mapped, reference) => {
      const valueX = x(mapped, reference);
      const valueY = y(mapped, reference);
      hasX ||= valueX !== 0;
      sum += count * (valueY - value * valueX);
      scale = Math.max(scale, Math.abs(valueY), Math.abs(value * valueX));
      nOutside -= count;
    });
    if (!hasX && onlyWhereX) continue;
    if (n < 2) {
      variance = null;
      break;
    }
    // Second pass about the mean: Σr² − (Σr)²/n would lose half the digits where residuals are nearly equal.
    const mean = sum / n;
    const squareOf = (residual: number): number => {
      const deviation = residual - mean;
      return Math.abs(deviation) <= ROUNDING * scale ? 0 : deviation ** 2;
    };
    let squares = nOutside > 0 ? nOutside * squareOf(0) : 0;
    forEachCell(counts, (count, mapped, reference) => {
      squares += count * squareOf(y(mapped, reference) - value * x(mapped, reference));
    });
    const correction = finitePopulationCorrection ? 1 - n / size : 1;
    variance += (weight ** 2 * correction * squares) / ((n - 1) * n);
  }
  return {
    value,
    standardError: variance === null ? null : Math.sqrt(variance) / totalX,
    nUnits,
    effectiveUnits: totalX ** 2 / squaredWeights,
  };
}

function forEachCell(
  { nClasses, counts }: ConfusionMatrix,
  visit: (count: number, mapped: number, reference: number) => void,
): void {
  for (let i = 0; i < counts.length; i++) {
    if (counts[i] > 0) visit(counts[i], Math.floor(i / nClasses), i % nClasses);
  }
}
