import type { NodeRows, NodeSums, Split } from './split-search.ts';

/** Rows up to which inserting one by one beats counting into buckets. */
const INSERTION_ROWS = 20;
/** Cells of a histogram that cost as much as a row put in order. */
const CELLS_PER_ROW = 8;
/** Squares of counts up to this stay below 2³¹. */
const MAX_DRAWN = 46_340;
/** A rank shares 31 bits with a row's draws (8) and class (8). */
const MAX_LEVELS = 1 << 15;
const MAX_TIMES = 255;

/** Whether a tree can be grown by whole-number counts alone. */
export function isCountable(weights: Float64Array, levels: readonly Float32Array[], { tags }: NodeRows): boolean {
  let nDrawn = 0;
  let most = 0;
  for (const tag of tags) {
    const times = tag >> 8;
    nDrawn += times;
    if (times > most) most = times;
  }
  const isPlain = weights.every((weight) => weight === 1);
  return isPlain && nDrawn <= MAX_DRAWN && most <= MAX_TIMES && levels.every(({ length }) => length <= MAX_LEVELS);
}

/**
 * The same search as `SplitSearch`, for rows that all weigh the same: it finds the same splits. A row's rank, draws and class are
 * packed into one whole number, so that putting rows in order moves one array, and sums are 32-bit whole numbers.
 */
export class CountedSplitSearch {
  readonly #minLeaf: number;
  readonly #nClasses: number;
  readonly #packed: Int32Array;
  readonly #sorted: Int32Array;
  readonly #places: Int32Array;
  readonly #left: Int32Array;
  /** Draws of each class in the node. */
  readonly #inNode: Int32Array;
  readonly #histogram: Int32Array;

  constructor(nClasses: number, minLeaf: number, maxNodeRows: number) {
    this.#nClasses = nClasses;
    this.#minLeaf = minLeaf;
    this.#packed = new Int32Array(maxNodeRows);
    this.#sorted = new Int32Array(maxNodeRows);
    this.#places = new Int32Array(2 * maxNodeRows + 2);
    this.#left = new Int32Array(nClasses);
    this.#inNode = new Int32Array(nClasses);
    this.#histogram = new Int32Array(CELLS_PER_ROW * maxNodeRows);
  }

  /** Tells which node is searched next. */
  openNode({ classWeights }: NodeSums): void {
    const inNode = this.#inNode;
    for (let c = 0; c < inNode.length; c++) inNode[c] = classWeights[c];
  }

  /**
   * Looks for a better split than `best` of the node opened, rows lo..hi, on a feature with the given ranks, all below nLevels.
   * @returns false when the feature is constant in the node.
   */
  improve(
    best: Split,
    feature: number,
    featureRanks: Uint16Array | Int32Array,
    nLevels: number,
    { rows, tags }: NodeRows,
    lo: number,
    hi: number,
    node: NodeSums,
  ): boolean {
    const n = hi - lo;
    if (nLevels * this.#nClasses <= CELLS_PER_ROW * n) {
      this.#count(featureRanks, nLevels, rows, tags, lo, hi);
      return this.#scanHistogram(best, feature, nLevels, node);
    }
    const packed = this.#packed;
    let min = 0x7fffffff;
    let max = 0;
    for (let i = 0; i < n; i++) {
      const row = (featureRanks[rows[lo + i]] << 16) | tags[lo + i];
      packed[i] = row;
      if (row < min) min = row;
      if (row > max) max = row;
    }
    const minRank = min >> 16;
    const span = (max >> 16) - minRank;
    if (span === 0) return false;
    if (n <= INSERTION_ROWS) {
      sortByInsertion(packed, n);
      this.#scan(packed, best, feature, n, node);
      return true;
    }
    let shift = 0;
    while (span >> shift >= 2 * n) shift++;
    this.#sortIntoBuckets(n, minRank, shift + 16, span >> shift);
    if (shift > 0) sortByInsertion(this.#sorted, n);
    this.#scan(this.#sorted, best, feature, n, node);
    return true;
  }

  #sortIntoBuckets(n: number, minRank: number, shift: number, lastBucket: number): void {
    const packed = this.#packed;
    const sorted = this.#sorted;
    const places = this.#places;
    const base = minRank << 16;
    places.fill(0, 0, lastBucket + 1);
    for (let i = 0; i < n; i++) places[(packed[i] - base) >> shift]++;
    let next = 0;
    for (let bucket = 0; bucket <= lastBucket; bucket++) {
      const count = places[bucket];
      places[bucket] = next;
      next += count;
    }
    for (let i = 0; i < n; i++) {
      const row = packed[i];
      sorted[places[(row - base) >> shift]++] = row;
    }
  }

  #scan(sorted: Int32Array, best: Split, feature: number, n: number, { nRows, squares }: NodeSums): void {
    const left = this.#left;
    const inNode = this.#inNode;
    const minLeaf = this.#minLeaf;
    const lastLeft = nRows - minLeaf;
    let bestScore = best.score;
    let bestAt = -1;
    let nLeft = 0;
    let leftSquares = 0;
    // Σ(class count in the node · on the left), from which the right side's squares follow.
    let product = 0;
    let previous = sorted[0] >> 16;
    for (let c = 0; c < left.length; c++) left[c] = 0;
    for (let i = 0; i < n; i++) {
      const row = sorted[i];
      const rank = row >> 16;
      if (rank !== previous) {
        if (nLeft >= minLeaf && nLeft <= lastLeft) {
          const score = leftSquares / nLeft + (squares - 2 * product + leftSquares) / (nRows - nLeft);
          if (score > bestScore) {
            bestScore = score;
            bestAt = i;
          }
        }
        previous = rank;
      }
      const c = row & 255;
      const times = (row >> 8) & 255;
      const before = left[c];
      leftSquares = (leftSquares + Math.imul(times, 2 * before + times)) | 0;
      product = (product + Math.imul(times, inNode[c])) | 0;
      left[c] = before + times;
      nLeft = (nLeft + times) | 0;
    }
    if (bestAt < 0) return;
    best.score = bestScore;
    best.feature = feature;
    best.rank = sorted[bestAt - 1] >> 16;
    best.nextRank = sorted[bestAt] >> 16;
  }

  #count(
    featureRanks: Uint16Array | Int32Array,
    nLevels: number,
    rows: Int32Array,
    tags: Int32Array,
    lo: number,
    hi: number,
  ): void {
    const histogram = this.#histogram;
    const nClasses = this.#nClasses;
    histogram.fill(0, 0, nLevels * nClasses);
    for (let i = lo; i < hi; i++) {
      const tag = tags[i];
      histogram[Math.imul(featureRanks[rows[i]], nClasses) + (tag & 255)] += tag >> 8;
    }
  }

  /** @returns false when all rows have one rank. */
  #scanHistogram(best: Split, feature: number, nLevels: number, { nRows, squares }: NodeSums): boolean {
    const histogram = this.#histogram;
    const left = this.#left;
    const inNode = this.#inNode;
    const nClasses = this.#nClasses;
    const minLeaf = this.#minLeaf;
    const lastLeft = nRows - minLeaf;
    let bestScore = best.score;
    let bestRank = -1;
    let bestNext = -1;
    let nLeft = 0;
    let leftSquares = 0;
    let product = 0;
    let previous = -1;
    let isConstant = true;
    for (let c = 0; c < left.length; c++) left[c] = 0;
    for (let rank = 0, at = 0; rank < nLevels && nLeft < nRows; rank++) {
      const nBefore = nLeft;
      const squaresBefore = leftSquares;
      const productBefore = product;
      for (let c = 0; c < nClasses; c++, at++) {
        const times = histogram[at];
        if (times === 0) continue;
        const before = left[c];
        leftSquares = (leftSquares + Math.imul(times, 2 * before + times)) | 0;
        product = (product + Math.imul(times, inNode[c])) | 0;
        left[c] = before + times;
        nLeft = (nLeft + times) | 0;
      }
      if (nLeft === nBefore) continue;
      if (nBefore > 0) isConstant = false;
      if (nBefore >= minLeaf && nBefore <= lastLeft) {
        const score = squaresBefore / nBefore + (squares - 2 * productBefore + squaresBefore) / (nRows - nBefore);
        if (score > bestScore) {
          bestScore = score;
          bestRank = previous;
          bestNext = rank;
        }
      }
      previous = rank;
    }
    if (bestRank >= 0) {
      best.score = bestScore;
      best.feature = feature;
      best.rank = bestRank;
      best.nextRank = bestNext;
    }
    return !isConstant;
  }
}

/** Puts the first n numbers in order; quick where they nearly are. */
function sortByInsertion(numbers: Int32Array, n: number): void {
  for (let i = 1; i < n; i++) {
    const number = numbers[i];
    let j = i - 1;
    while (j >= 0 && numbers[j] > number) {
      numbers[j + 1] = numbers[j];
      j--;
    }
    numbers[j + 1] = number;
  }
}
