import type { CellValue } from './combined-ratio.ts';
import { confusionMatrixMargins, type ConfusionMatrix } from './confusion-matrix.ts';

export interface Disagreement {
  /** Share of the population on the diagonal. */
  agreement: number;
  /** Difference of the class amounts of map and reference. */
  quantity: number;
  /** Disagreement left over once the amounts are taken as they are: right amounts in wrong places. */
  allocation: number;
  /** Quantity and allocation disagreement of each class; their sums are twice the overall figures. */
  perClass: { quantity: number; allocation: number }[];
}

/**
 * Turns sample counts into estimated population proportions, p_ij = (n_ij / n_i+)(N_i / ΣN), for samples stratified by
 * map class.
 *
 * `mappedTotals` are the mapped amounts N_i (pixels or area) of each class. Returns `null` when a class that is on the
 * map has no sample, since its row is then unknown.
 * Source: Pontius & Millones 2011, International Journal of Remote Sensing 32:4407–4429.
 * @throws RangeError when there is not one non-negative total for each class or all are zero.
 */
export function toPopulationMatrix(sample: ConfusionMatrix, mappedTotals: ArrayLike<number>): ConfusionMatrix | null {
  const { nClasses, counts } = sample;
  if (mappedTotals.length !== nClasses) {
    throw new RangeError(`Got ${mappedTotals.length} mapped totals for ${nClasses} classes.`);
  }
  let population = 0;
  for (let i = 0; i < nClasses; i++) {
    if (!(mappedTotals[i] >= 0)) throw new RangeError(`The mapped total of class ${i} is ${mappedTotals[i]}.`);
    population += mappedTotals[i];
  }
  if (population === 0) throw new RangeError('All mapped totals are zero.');
  const { mapped } = confusionMatrixMargins(sample);
  const proportions = new Float64Array(nClasses * nClasses);
  for (let i = 0; i < nClasses; i++) {
    if (mappedTotals[i] === 0) continue;
    if (mapped[i] === 0) return null;
    for (let j = 0; j < nClasses; j++) {
      proportions[i * nClasses + j] = (counts[i * nClasses + j] / mapped[i]) * (mappedTotals[i] / population);
    }
  }
  return { nClasses, counts: proportions };
}

/**
 * Quantity and allocation disagreement of a matrix, taken as proportions of its own total; `null` for an empty matrix.
 *
 * agreement + quantity + allocation = 1. Pass `toPopulationMatrix(…)` when the sample was stratified by map class.
 * Source: Pontius & Millones 2011, International Journal of Remote Sensing 32:4407–4429.
 */
export function computeDisagreement(matrix: ConfusionMatrix): Disagreement | null {
  const { nClasses, counts } = matrix;
  const { mapped, reference } = confusionMatrixMargins(matrix);
  const total = mapped.reduce((sum, value) => sum + value, 0);
  if (total === 0) return null;
  let agreement = 0;
  let quantity = 0;
  let allocation = 0;
  const perClass = Array.from({ length: nClasses }, (_, c) => {
    const diagonal = counts[c * nClasses + c];
    const q = Math.abs(mapped[c] - reference[c]) / total;
    const a = (2 * Math.min(mapped[c] - diagonal, reference[c] - diagonal)) / total;
    agreement += diagonal / total;
    quantity += q / 2;
    allocation += a / 2;
    return { quantity: q, allocation: a };
  });
  return { agreement, quantity, allocation, perClass };
}

/**
 * Derivatives of quantity and allocation disagreement by the cells of the estimated proportions, for their standard
 * errors by Taylor linearisation.
 *
 * ∂Q/∂p_ij = ½(s_i − s_j) with s_k the sign of p_k+ − p_+k; allocation is 1 − agreement − Q. `null` where a class that is
 * mistaken for others, or they for it, has the same amount on the map and in the reference: Q has a kink there, so no
 * derivative, and 0 would claim what is not known.
 * Source: Woodruff 1971, Journal of the American Statistical Association 66:411–414, for the linearisation; figures as
 * in `computeDisagreement`.
 */
export function differentiateDisagreement(
  proportions: ConfusionMatrix,
): { quantity: CellValue; allocation: CellValue } | null {
  const { mapped, reference } = confusionMatrixMargins(proportions);
  const sign: number[] = [];
  for (let k = 0; k < proportions.nClasses; k++) {
    const difference = mapped[k] - reference[k];
    const isLevel = Math.abs(difference) <= 1e-12;
    if (isLevel && mapped[k] - proportions.counts[k * proportions.nClasses + k] > 1e-12) return null;
    sign.push(isLevel ? 0 : Math.sign(difference));
  }
  const quantity: CellValue = (i, j) => (sign[i] - sign[j]) / 2;
  return { quantity, allocation: (i, j) => -Number(i === j) - quantity(i, j) };
}
