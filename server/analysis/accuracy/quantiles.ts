/**
 * Regularised incomplete beta function I_x(a, b), by its continued fraction (modified Lentz).
 * Source: Abramowitz & Stegun 1964, 26.5.8; evaluation after Lentz 1976, Applied Optics 15:668–671.
 */
export function incompleteBeta(a: number, b: number, x: number): number {
  if (x <= 0) return 0;
  if (x >= 1) return 1;
  // The fraction converges fast only left of the mean; the other side follows from symmetry.
  if (x > (a + 1) / (a + b + 2)) return 1 - incompleteBeta(b, a, 1 - x);
  const front = Math.exp(a * Math.log(x) + b * Math.log1p(-x) + logGamma(a + b) - logGamma(a) - logGamma(b)) / a;
  const tiny = 1e-300;
  let c = 1;
  let d = 1 / guard(1 - ((a + b) * x) / (a + 1));
  let fraction = d;
  for (let m = 1; m <= 10_000; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / guard(1 + even * d);
    c = guard(1 + even / c);
    fraction *= d * c;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / guard(1 + odd * d);
    c = guard(1 + odd / c);
    const step = d * c;
    fraction *= step;
    if (Math.abs(step - 1) < 1e-16) break;
  }
  return front * fraction;

  function guard(value: number): number {
    return Math.abs(value) < tiny ? tiny : value;
  }
}

/**
 * Complementary error function, relative accuracy about 1e-14.
 * Source: Abramowitz & Stegun 1964, 7.1.6 (series) and 7.1.14 (continued fraction).
 */
export function erfc(x: number): number {
  if (x < 0) return 2 - erfc(-x);
  if (x < 2.5) {
    let term = x;
    let sum = x;
    for (let n = 1; Math.abs(term) > 1e-18 * Math.abs(sum); n++) {
      term *= (2 * x * x) / (2 * n + 1);
      sum += term;
    }
    return 1 - (2 / Math.sqrt(Math.PI)) * Math.exp(-x * x) * sum;
  }
  let fraction = 0;
  for (let k = 120; k >= 1; k--) fraction = k / 2 / (x + fraction);
  return Math.exp(-x * x) / Math.sqrt(Math.PI) / (x + fraction);
}

/** Probability that a standard normal value is at most z. */
export function normalCdf(z: number): number {
  return erfc(-z / Math.SQRT2) / 2;
}

/** Probability that a value of Student's t with df degrees of freedom is at most t. */
export function studentTCdf(t: number, df: number): number {
  const tail = incompleteBeta(df / 2, 0.5, df / (df + t * t)) / 2;
  return t > 0 ? 1 - tail : tail;
}

/**
 * Quantile of the standard normal distribution.
 * @throws RangeError when probability is not strictly between 0 and 1.
 */
export function normalQuantile(probability: number): number {
  requireProbability(probability);
  return invertSymmetricCdf(probability, normalCdf);
}

/**
 * Quantile of Student's t distribution with df > 0 degrees of freedom.
 * @throws RangeError when probability is not strictly between 0 and 1 or df is not positive.
 */
export function studentTQuantile(probability: number, df: number): number {
  requireProbability(probability);
  if (!(df > 0)) throw new RangeError(`Degrees of freedom must be positive, got ${df}.`);
  return invertSymmetricCdf(probability, (t) => studentTCdf(t, df));
}

function invertSymmetricCdf(probability: number, cdf: (x: number) => number): number {
  if (probability === 0.5) return 0;
  if (probability > 0.5) return -invertSymmetricCdf(1 - probability, cdf);
  let low = -1;
  while (cdf(low) > probability) low *= 2;
  let high = 0;
  // Bisection: each step halves the interval, and it ends when no double lies between the ends.
  for (;;) {
    const middle = (low + high) / 2;
    if (middle <= low || middle >= high) return middle;
    if (cdf(middle) < probability) low = middle;
    else high = middle;
  }
}

function requireProbability(probability: number): void {
  if (!(probability > 0 && probability < 1)) {
    throw new RangeError(`A probability strictly between 0 and 1 is needed, got ${probability}.`);
  }
}

/** Natural logarithm of the gamma function for x > 0 (Stirling's series after shifting x above 12). */
function logGamma(x: number): number {
  let shift = 0;
  let z = x;
  while (z < 12) {
    shift += Math.log(z);
    z += 1;
  }
  const r = 1 / (z * z);
  const series = (1 / 12 - r * (1 / 360 - r * (1 / 1260 - r * (1 / 1680 - r * (1 / 1188 - (r * 691) / 360360))))) / z;
  return (z - 0.5) * Math.log(z) - z + Math.log(2 * Math.PI) / 2 + series - shift;
}
