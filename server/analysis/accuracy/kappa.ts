import { confusionMatrixMargins, type ConfusionMatrix } from './confusion-matrix.ts';

export interface KappaResult {
  /** Observed agreement p_o. */
  observed: number;
  /** Agreement expected from the margins p_e. */
  expected: number;
  kappa: number;
  /** Large-sample variance of kappa; 0 when map and reference agree everywhere. */
  variance: number;
  /** Variance under the hypothesis kappa = 0. */
  nullVariance: number;
  /** kappa / sqrt(variance); `null` when the variance is zero. */
  z: number | null;
  /** kappa / sqrt(nullVariance); `null` when that is zero. */
  nullZ: number | null;
}

/**
 * Cohen's kappa with its large-sample variance (θ4 with crossed subscripts) and its variance under kappa = 0.
 *
 * Returns `null` for an empty matrix and where everything lies in one class in map and reference alike (p_e = 1).
 * The variances hold for simple random sampling of independent units; they do not for pixels of the same polygon.
 *
 * Source: Cohen 1960; Fleiss, Cohen & Everitt 1969, Psychological Bulletin 72:323–327; Bishop, Fienberg & Holland 1975.
 */
export function computeKappa(matrix: ConfusionMatrix): KappaResult | null {
  const { nClasses, counts } = matrix;
  const { mapped, reference } = confusionMatrixMargins(matrix);
  const n = mapped.reduce((sum, value) => sum + value, 0);
  if (n === 0) return null;

  let theta1 = 0;
  let theta2 = 0;
  let theta3 = 0;
  let theta4 = 0;
  let nullSum = 0;
  for (let i = 0; i < nClasses; i++) {
    const row = mapped[i] / n;
    const column = reference[i] / n;
    const diagonal = counts[i * nClasses + i] / n;
    theta1 += diagonal;
    theta2 += row * column;
    theta3 += diagonal * (row + column);
    nullSum += row * column * (row + column);
    for (let j = 0; j < nClasses; j++) {
      // Crossed on purpose: the row total of j and the column total of i. Uncrossed gives a different, wrong value.
      theta4 += (counts[i * nClasses + j] / n) * (mapped[j] / n + reference[i] / n) ** 2;
    }
  }
  const beyondChance = 1 - theta2;
  if (beyondChance <= Number.EPSILON) return null;

  const kappa = (theta1 - theta2) / beyondChance;
  const disagreement = 1 - theta1;
  const variance = Math.max(
    0,
    ((theta1 * disagreement) / beyondChance ** 2 +
      (2 * disagreement * (2 * theta1 * theta2 - theta3)) / beyondChance ** 3 +
      (disagreement ** 2 * (theta4 - 4 * theta2 ** 2)) / beyondChance ** 4) /
      n,
  );
  const nullVariance = Math.max(0, (theta2 + theta2 ** 2 - nullSum) / (n * beyondChance ** 2));
  return {
    observed: theta1,
    expected: theta2,
    kappa,
    variance,
    nullVariance,
    z: variance > 0 ? kappa / Math.sqrt(variance) : null,
    nullZ: nullVariance > 0 ? kappa / Math.sqrt(nullVariance) : null,
  };
}
