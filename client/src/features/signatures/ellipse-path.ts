/** Radius of an ellipse that holds 90 % of a bivariate normal: the root of the chi-square quantile with 2 degrees, −2 ln 0.1. */
const RADIUS = Math.sqrt(-2 * Math.log(0.1));
const STEPS = 48;

/**
 * The outline of the ellipse that holds 90 % of a bivariate normal, as points in data units; empty where the covariance is no
 * positive one.
 */
export function ellipsePoints(
  mean: readonly [number, number],
  covariance: { xx: number; xy: number; yy: number },
): [number, number][] {
  const { xx, xy, yy } = covariance;
  const determinant = xx * yy - xy * xy;
  if (!(xx > 0) || !(determinant > 0)) return [];
  // Lower Cholesky factor: a circle through it becomes the ellipse.
  const a = Math.sqrt(xx);
  const b = xy / a;
  const c = Math.sqrt(determinant) / a;
  return Array.from({ length: STEPS }, (_, i) => {
    const angle = (2 * Math.PI * i) / STEPS;
    const [u, v] = [RADIUS * Math.cos(angle), RADIUS * Math.sin(angle)];
    return [mean[0] + a * u, mean[1] + b * u + c * v];
  });
}
