/**
 * Replaces feature values by their rank among a forest's thresholds, so that trees compare small integers.
 *
 * The rank of x is the number of thresholds t with not (x < t); "x < t_j" is then exactly "rank ≤ j". NaN ranks above
 * all.
 */
export interface ThresholdRanks {
  /** Sorted distinct thresholds of each feature. */
  readonly thresholds: readonly Float32Array[];
  /** Fills ranks[row·nFeatures + feature] for n rows of row-major features starting at row `from`. */
  rankRows(features: Float32Array, from: number, n: number, ranks: Int32Array): void;
}

export function createThresholdRanks(thresholds: readonly Float32Array[]): ThresholdRanks {
  const nFeatures = thresholds.length;
  const tables = thresholds.map(createBuckets);

  function rankRows(features: Float32Array, from: number, n: number, ranks: Int32Array): void {
    for (let f = 0; f < nFeatures; f++) {
      const t = thresholds[f];
      const { low, scale, lastBucket, start } = tables[f];
      let read = from * nFeatures + f;
      for (let write = f; write < n * nFeatures; write += nFeatures, read += nFeatures) {
        const x = features[read];
        if (x !== x) {
          ranks[write] = t.length;
          continue;
        }
        const position = (x - low) * scale;
        const bucket = position < lastBucket ? (position > 0 ? position | 0 : 0) : lastBucket;
        let lo = start[bucket];
        let hi = start[bucket + 1];
        while (lo < hi) {
          const middle = (lo + hi) >> 1;
          if (t[middle] <= x) lo = middle + 1;
          else hi = middle;
        }
        ranks[write] = lo;
      }
    }
  }

  return { thresholds, rankRows };
}

/**
 * Buckets of equal width over the thresholds: start[b]..start[b + 1] are the thresholds in bucket b. Thresholds and
 * values go through the same increasing expression, so a value's rank lies between the two whatever the rounding.
 */
function createBuckets(t: Float32Array): { low: number; scale: number; lastBucket: number; start: Int32Array } {
  const low = t.length > 0 ? t[0] : 0;
  const range = t.length > 0 ? t[t.length - 1] - low : 0;
  const nBuckets = range > 0 ? Math.min(65536, 4 * t.length) : 1;
  const scale = range > 0 ? nBuckets / range : 0;
  const lastBucket = nBuckets - 1;
  const start = new Int32Array(nBuckets + 1);
  for (const threshold of t) {
    const position = (threshold - low) * scale;
    start[(position < lastBucket ? position | 0 : lastBucket) + 1]++;
  }
  for (let b = 0; b < nBuckets; b++) start[b + 1] += start[b];
  return { low, scale, lastBucket, start };
}
