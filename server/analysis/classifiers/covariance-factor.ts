import { CholeskyDecomposition, EigenvalueDecomposition, Matrix, solve } from 'ml-matrix';

/** Least eigenvalue of the correlation matrix that still counts as a spread of its own; rounding alone leaves some 1e-14. */
const LEAST_EIGENVALUE = 1e-10;

/** A covariance ready for distances: |whitener · (x − mean)|² is (x − mean)ᵀ · covariance⁻¹ · (x − mean). */
export interface CovarianceFactor {
  /** Inverse of the lower Cholesky factor: its rows up to the diagonal, one after the other, n(n + 1)/2 values. */
  whitener: Float64Array;
  logDeterminant: number;
}

/**
 * Factors a covariance, row-major nFeatures × nFeatures; `null` when it is singular, judged on correlations so that the
 * units of the features do not matter.
 */
export function factorCovariance(covariance: Float64Array, nFeatures: number): CovarianceFactor | null {
  const deviations = Float64Array.from({ length: nFeatures }, (_, f) => Math.sqrt(covariance[f * nFeatures + f]));
  if (!deviations.every((deviation) => deviation > 0 && Number.isFinite(deviation))) return null;
  const correlation = new Matrix(nFeatures, nFeatures);
  for (let f = 0; f < nFeatures; f++) {
    for (let g = 0; g < nFeatures; g++) {
      correlation.set(f, g, covariance[f * nFeatures + g] / (deviations[f] * deviations[g]));
    }
  }
  const { realEigenvalues } = new EigenvalueDecomposition(correlation, { assumeSymmetric: true });
  if (!(Math.min(...realEigenvalues) > LEAST_EIGENVALUE)) return null;
  const lower = new CholeskyDecomposition(correlation).lowerTriangularMatrix;
  const inverse = solve(lower, Matrix.eye(nFeatures, nFeatures));
  const whitener = new Float64Array((nFeatures * (nFeatures + 1)) / 2);
  let logDeterminant = 0;
  let at = 0;
  for (let f = 0; f < nFeatures; f++) {
    for (let g = 0; g <= f; g++) whitener[at++] = inverse.get(f, g) / deviations[g];
    logDeterminant += 2 * Math.log(lower.get(f, f) * deviations[f]);
  }
  return { whitener, logDeterminant };
}
