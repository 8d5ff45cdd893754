import type { ClassSignature } from './class-signature.ts';

export interface Separability {
  /** Bhattacharyya distance, 0 and up. */
  bhattacharyya: number;
  /** Jeffries–Matusita distance as sqrt(2(1 − e^−B)), 0..1.414. */
  jeffriesMatusita: number;
  /** Its square, 2(1 − e^−B), 0..2: the other convention in print. */
  jeffriesMatusitaSquared: number;
  divergence: number;
  /** Transformed divergence 2(1 − e^(−D/8)), 0..2. */
  transformedDivergence: number;
}

/**
 * How far apart two classes lie, taking each as normally distributed.
 *
 * Returns `null` when it cannot be computed: a class of fewer pixels than features plus one, or a covariance that is
 * singular (a constant or repeated feature).
 * Source: Swain & Davis 1978, Remote Sensing: The Quantitative Approach (Bhattacharyya, JM, divergence).
 * @throws RangeError when the signatures differ in their number of features.
 */
export function computeSeparability(one: ClassSignature, two: ClassSignature): Separability | null {
  const n = one.mean.length;
  if (two.mean.length !== n) throw new RangeError(`Signatures of ${n} and ${two.mean.length} features.`);
  if (!one.covariance || !two.covariance) return null;
  const s1 = one.covariance;
  const s2 = two.covariance;
  const pooled = s1.map((value, i) => (value + s2[i]) / 2);
  const c1 = choleskyFactor(s1, n);
  const c2 = choleskyFactor(s2, n);
  const cp = choleskyFactor(pooled, n);
  if (!c1 || !c2 || !cp) return null;

  const difference = one.mean.map((value, f) => value - two.mean[f]);
  const logRatio = logDeterminant(cp, n) - (logDeterminant(c1, n) + logDeterminant(c2, n)) / 2;
  const bhattacharyya = Math.max(0, quadraticForm(cp, difference, n) / 8 + logRatio / 2);
  // tr[(S1 − S2)(S2⁻¹ − S1⁻¹)] = tr(S1 S2⁻¹) + tr(S2 S1⁻¹) − 2n.
  const spread = traceOfQuotient(s1, c2, n) + traceOfQuotient(s2, c1, n) - 2 * n;
  const divergence = Math.max(0, (spread + quadraticForm(c1, difference, n) + quadraticForm(c2, difference, n)) / 2);
  const squared = -2 * Math.expm1(-bhattacharyya);
  return {
    bhattacharyya,
    jeffriesMatusita: Math.sqrt(squared),
    jeffriesMatusitaSquared: squared,
    divergence,
    transformedDivergence: -2 * Math.expm1(-divergence / 8),
  };
}

/** Lower factor L with L·Lᵀ = matrix, row-major; `null` when the matrix is singular to working precision. */
function choleskyFactor(matrix: Float64Array, n: number): Float64Array | null {
  const factor = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = matrix[i * n + j];
      for (let k = 0; k < j; k++) sum -= factor[i * n + k] * factor[j * n + k];
      if (i !== j) {
        factor[i * n + j] = sum / factor[j * n + j];
      } else {
        // What is left of the variance once the features before explain theirs: rounding alone leaves some 1e-16 of it.
        if (!(sum > 1e-12 * matrix[i * n + i])) return null;
        factor[i * n + i] = Math.sqrt(sum);
      }
    }
  }
  return factor;
}

function logDeterminant(factor: Float64Array, n: number): number {
  let sum = 0;
  for (let i = 0; i < n; i++) sum += 2 * Math.log(factor[i * n + i]);
  return sum;
}

/** dᵀ S⁻¹ d from the factor of S: the squared length of L⁻¹ d. */
function quadraticForm(factor: Float64Array, d: Float64Array, n: number): number {
  return solveLower(factor, d, n).reduce((sum, value) => sum + value * value, 0);
}

/** tr(A S⁻¹) from the factor of S. */
function traceOfQuotient(a: Float64Array, factor: Float64Array, n: number): number {
  // tr(A S⁻¹) = tr(L⁻¹ A L⁻ᵀ): solve for the columns of A, then for the rows of the result.
  const half = new Float64Array(n * n);
  for (let c = 0; c < n; c++) {
    const column = Float64Array.from({ length: n }, (_, r) => a[r * n + c]);
    solveLower(factor, column, n).forEach((value, r) => (half[r * n + c] = value));
  }
  let trace = 0;
  for (let r = 0; r < n; r++) trace += solveLower(factor, half.subarray(r * n, (r + 1) * n), n)[r];
  return trace;
}

function solveLower(factor: Float64Array, right: Float64Array, n: number): Float64Array {
  const x = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    let sum = right[i];
    for (let k = 0; k < i; k++) sum -= factor[i * n + k] * x[k];
    x[i] = sum / factor[i * n + i];
  }
  return x;
}
