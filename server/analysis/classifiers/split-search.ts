/** The best split found so far at a node; ranks at or below `rank` go left. */
export interface Split {
  feature: number;
  rank: number;
  /** Lowest rank on the right that occurs in the node; the threshold lies midway between the two values. */
  nextRank: number;
  /** Σ(left class counts)²/nLeft + Σ(right class counts)²/nRight: the greater, the lower the Gini impurity left. */
  score: number;
}

/**
 * Finds the best Gini split of a node on one feature at a time. Scratch memory is kept for one tree.
 * Source: Breiman, Friedman, Olshen & Stone 1984, Classification and Regression Trees (Gini index).
 */
export class SplitSearch {
  readonly #labels: Uint8Array;
  readonly #nClasses: number;
  readonly #minLeaf: number;
  readonly #histogram: Int32Array;
  readonly #keys: Int32Array;
  readonly #left: Int32Array;

  constructor(labels: Uint8Array, nClasses: number, minLeaf: number, maxNodeRows: number) {
    this.#labels = labels;
    this.#nClasses = nClasses;
    this.#minLeaf = minLeaf;
    this.#histogram = new Int32Array(4 * maxNodeRows + 64);
    this.#keys = new Int32Array(maxNodeRows);
    this.#left = new Int32Array(nClasses);
  }

  /**
   * Looks for a better split than `best` of rows[lo..hi) on a feature with the given ranks.
   * @returns false when the feature is constant in the node.
   */
  improve(
    best: Split,
    feature: number,
    ranks: Int32Array,
    rows: Int32Array,
    lo: number,
    hi: number,
    counts: Int32Array,
  ): boolean {
    let min = ranks[rows[lo]];
    let max = min;
    for (let i = lo + 1; i < hi; i++) {
      const rank = ranks[rows[i]];
      if (rank < min) min = rank;
      else if (rank > max) max = rank;
    }
    if (min === max) return false;
    // A histogram costs its own length, a sort n log n: the histogram pays while it is not much longer than the node.
    if ((max - min + 1) * this.#nClasses <= 4 * (hi - lo) + 64) {
      this.#scanHistogram(best, feature, ranks, rows, lo, hi, counts, min, max);
    } else {
      this.#scanSorted(best, feature, ranks, rows, lo, hi, counts, min);
    }
    return true;
  }

  #scanHistogram(
    best: Split,
    feature: number,
    ranks: Int32Array,
    rows: Int32Array,
    lo: number,
    hi: number,
    counts: Int32Array,
    min: number,
    max: number,
  ): void {
    const nClasses = this.#nClasses;
    const histogram = this.#histogram;
    const labels = this.#labels;
    const left = this.#left;
    histogram.fill(0, 0, (max - min + 1) * nClasses);
    for (let i = lo; i < hi; i++) {
      const row = rows[i];
      histogram[(ranks[row] - min) * nClasses + labels[row]]++;
    }
    left.fill(0);
    const n = hi - lo;
    let nLeft = 0;
    let leftSquares = 0;
    let rightSquares = sumOfSquares(counts);
    let previous = -1;
    for (let rank = min; rank <= max; rank++) {
      const nLeftBefore = nLeft;
      const leftSquaresBefore = leftSquares;
      const rightSquaresBefore = rightSquares;
      const at = (rank - min) * nClasses;
      for (let c = 0; c < nClasses; c++) {
        const add = histogram[at + c];
        if (add === 0) continue;
        leftSquares += add * (2 * left[c] + add);
        rightSquares -= add * (2 * (counts[c] - left[c]) - add);
        left[c] += add;
        nLeft += add;
      }
      if (nLeft === nLeftBefore) continue;
      if (previous >= 0) {
        this.#consider(best, feature, previous, rank, nLeftBefore, n, leftSquaresBefore, rightSquaresBefore);
      }
      previous = rank;
    }
  }

  #scanSorted(
    best: Split,
    feature: number,
    ranks: Int32Array,
    rows: Int32Array,
    lo: number,
    hi: number,
    counts: Int32Array,
    min: number,
  ): void {
    const labels = this.#labels;
    const left = this.#left;
    const n = hi - lo;
    const keys = this.#keys;
    for (let i = 0; i < n; i++) {
      const row = rows[lo + i];
      keys[i] = ((ranks[row] - min) << 8) | labels[row];
    }
    sortKeys(keys, n);
    left.fill(0);
    let leftSquares = 0;
    let rightSquares = sumOfSquares(counts);
    let previous = keys[0] >> 8;
    for (let i = 0; i < n; i++) {
      const rank = keys[i] >> 8;
      if (rank !== previous) {
        this.#consider(best, feature, previous + min, rank + min, i, n, leftSquares, rightSquares);
        previous = rank;
      }
      const c = keys[i] & 255;
      leftSquares += 2 * left[c] + 1;
      rightSquares -= 2 * (counts[c] - left[c]) - 1;
      left[c]++;
    }
  }

  #consider(
    best: Split,
    feature: number,
    rank: number,
    nextRank: number,
    nLeft: number,
    n: number,
    leftSquares: number,
    rightSquares: number,
  ): void {
    if (nLeft < this.#minLeaf || n - nLeft < this.#minLeaf) return;
    const score = leftSquares / nLeft + rightSquares / (n - nLeft);
    if (score > best.score) {
      best.score = score;
      best.feature = feature;
      best.rank = rank;
      best.nextRank = nextRank;
    }
  }
}

/** Σ counts² of the classes of a node. */
export function sumOfSquares(counts: Int32Array): number {
  let sum = 0;
  for (let c = 0; c < counts.length; c++) sum += counts[c] * counts[c];
  return sum;
}

function sortKeys(keys: Int32Array, n: number): void {
  if (n > 48) {
    keys.subarray(0, n).sort();
    return;
  }
  for (let i = 1; i < n; i++) {
    const key = keys[i];
    let j = i - 1;
    while (j >= 0 && keys[j] > key) {
      keys[j + 1] = keys[j];
      j--;
    }
    keys[j + 1] = key;
  }
}
