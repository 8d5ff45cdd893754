import { normalQuantile, studentTQuantile } from './quantiles.ts';

export interface Interval {
  low: number;
  high: number;
}

export interface ClusterInterval extends Interval {
  estimate: number;
  standardError: number;
  /** Clusters that carry any weight. */
  nClusters: number;
  degreesOfFreedom: number;
  /** True when all clusters have the same ratio: the interval has collapsed to a point and says nothing. */
  degenerate: boolean;
}

/**
 * Wilson score interval of a proportion of independent trials; `null` when there were no trials.
 *
 * Source: Wilson 1927, Journal of the American Statistical Association 22:209–212.
 * @throws RangeError when successes is outside 0..trials or confidence outside (0, 1).
 */
export function wilsonInterval(successes: number, trials: number, confidence = 0.95): Interval | null {
  if (trials === 0) return null;
  if (!(successes >= 0 && successes <= trials) || !Number.isFinite(trials)) {
    throw new RangeError(`Got ${successes} successes in ${trials} trials.`);
  }
  const z = normalQuantile(1 - (1 - confidence) / 2);
  const p = successes / trials;
  const shrink = 1 + (z * z) / trials;
  const centre = (p + (z * z) / (2 * trials)) / shrink;
  const half = (z / shrink) * Math.sqrt((p * (1 - p)) / trials + (z * z) / (4 * trials * trials));
  return {
    low: successes === 0 ? 0 : Math.max(0, centre - half),
    high: successes === trials ? 1 : Math.min(1, centre + half),
  };
}

/**
 * Interval of the proportion Σhits / Σsizes when whole clusters (sample polygons) were drawn, not single pixels.
 *
 * With R = Σy/Σx over k clusters, the linearised between-cluster variance is k/(k−1) · Σ(y − R·x)² / (Σx)², without
 * finite population correction; the half-width takes Student's t with k−1 degrees of freedom, and the ends are clipped
 * to 0..1. Clusters of size 0 are left out. `null` when fewer than two clusters are left.
 *
 * Source: Cochran 1977, Sampling Techniques, 3rd edition: ratio estimate of a proportion in cluster sampling
 * (sec. 3.12 and ch. 6; section numbers from memory).
 * @throws RangeError when the lengths differ, a size is negative, or hits are outside 0..size.
 */
export function clusterRatioInterval(
  hits: ArrayLike<number>,
  sizes: ArrayLike<number>,
  confidence = 0.95,
): ClusterInterval | null {
  if (hits.length !== sizes.length) {
    throw new RangeError(`Got hits of ${hits.length} clusters and sizes of ${sizes.length}.`);
  }
  let nClusters = 0;
  let totalHits = 0;
  let totalSize = 0;
  for (let i = 0; i < sizes.length; i++) {
    if (!(hits[i] >= 0 && hits[i] <= sizes[i]) || !Number.isFinite(sizes[i])) {
      throw new RangeError(`Cluster ${i} has ${hits[i]} hits in a size of ${sizes[i]}.`);
    }
    if (sizes[i] === 0) continue;
    nClusters++;
    totalHits += hits[i];
    totalSize += sizes[i];
  }
  if (nClusters < 2) return null;

  const estimate = totalHits / totalSize;
  let squares = 0;
  for (let i = 0; i < sizes.length; i++) squares += (hits[i] - estimate * sizes[i]) ** 2;
  const degreesOfFreedom = nClusters - 1;
  const standardError = Math.sqrt(((nClusters / degreesOfFreedom) * squares) / totalSize ** 2);
  const half = studentTQuantile(1 - (1 - confidence) / 2, degreesOfFreedom) * standardError;
  return {
    estimate,
    standardError,
    low: Math.max(0, estimate - half),
    high: Math.min(1, estimate + half),
    nClusters,
    degreesOfFreedom,
    degenerate: standardError < 1e-12,
  };
}
