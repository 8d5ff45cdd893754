/** The best split found so far at a node; ranks at or below `rank` go left. */
export interface Split {
  feature: number;
  rank: number;
  /** Lowest rank on the right that occurs in the node; the threshold lies midway between the two values. */
  nextRank: number;
  /**
   * Σ(left class weights)²/left weight + Σ(right class weights)²/right weight: the greater, the lower the Gini impurity
   * left.
   */
  score: number;
}

/** The rows of a tree, each with how often it was drawn; a node is a stretch of them. */
export interface NodeRows {
  /** Row numbers of the training set. */
  rows: Int32Array;
  /** Times drawn · 256 + class, of each entry of `rows`. */
  tags: Int32Array;
}

/** Sums over the rows of a node. */
export interface NodeSums {
  /** Rows, as often as they were drawn. */
  nRows: number;
  weight: number;
  /** Weight of each class. */
  classWeights: Float64Array;
  /** Σ(class weights)². */
  squares: number;
}

/** Rows up to which inserting one by one beats counting into buckets. */
const INSERTION_ROWS = 16;

/** Cells of a histogram that cost as much as a row put in order. */
const CELLS_PER_ROW = 4;

/**
 * Finds the best Gini split of a node on one feature at a time. Scratch memory is kept for one tree.
 *
 * In a node with many rows for the feature's levels, rows are counted by rank and class. Elsewhere they are put in order by
 * counting them into buckets of ranks, about as many as rows, and mending what is out of order within a bucket. Both take
 * time proportional to the rows, and hardly a branch that depends on the data. Weights are sums of whole numbers unless
 * classes are weighted, so that scores are exact.
 * Source: Breiman, Friedman, Olshen & Stone 1984, Classification and Regression Trees (Gini index).
 */
export class SplitSearch {
  readonly #minLeaf: number;
  /** Weight of a row of each class. */
  readonly #weights: Float64Array;
  readonly #ranks: Int32Array;
  /** Rows in each bucket, then where the bucket's next row goes. */
  readonly #places: Int32Array;
  readonly #sortedRanks: Int32Array;
  readonly #sortedTags: Int32Array;
  readonly #left: Float64Array;
  /** Rows by rank and class. */
  readonly #histogram: Int32Array;

  constructor(weights: Float64Array, minLeaf: number, maxNodeRows: number) {
    this.#weights = weights;
    this.#minLeaf = minLeaf;
    this.#ranks = new Int32Array(maxNodeRows);
    this.#places = new Int32Array(2 * maxNodeRows + 2);
    this.#sortedRanks = new Int32Array(maxNodeRows);
    this.#sortedTags = new Int32Array(maxNodeRows);
    this.#left = new Float64Array(weights.length);
    this.#histogram = new Int32Array(CELLS_PER_ROW * maxNodeRows);
  }

  /**
   * Looks for a better split than `best` of the node lo..hi on a feature with the given ranks, all below nLevels.
   * @returns false when the feature is constant in the node.
   */
  improve(
    best: Split,
    feature: number,
    featureRanks: Uint16Array | Int32Array,
    nLevels: number,
    drawn: NodeRows,
    lo: number,
    hi: number,
    node: NodeSums,
  ): boolean {
    const { rows, tags } = drawn;
    const ranks = this.#ranks;
    const n = hi - lo;
    if (nLevels * this.#weights.length <= CELLS_PER_ROW * n) {
      this.#count(featureRanks, nLevels, drawn, lo, hi);
      return this.#scanHistogram(best, feature, nLevels, node);
    }
    let min = featureRanks[rows[lo]];
    let max = min;
    for (let i = 0; i < n; i++) {
      const rank = featureRanks[rows[lo + i]];
      ranks[i] = rank;
      if (rank < min) min = rank;
      if (rank > max) max = rank;
    }
    if (min === max) return false;
    if (n <= INSERTION_ROWS) {
      this.#sortByInsertion(tags, lo, n);
    } else {
      let shift = 0;
      while ((max - min) >> shift >= 2 * n) shift++;
      this.#sortIntoBuckets(tags, lo, n, min, shift, (max - min) >> shift);
      if (shift > 0) this.#mend(n);
    }
    this.#scanSorted(best, feature, n, node);
    return true;
  }

  #count(
    featureRanks: Uint16Array | Int32Array,
    nLevels: number,
    { rows, tags }: NodeRows,
    lo: number,
    hi: number,
  ): void {
    const histogram = this.#histogram;
    const nClasses = this.#weights.length;
    histogram.fill(0, 0, nLevels * nClasses);
    for (let i = lo; i < hi; i++) {
      const tag = tags[i];
      histogram[featureRanks[rows[i]] * nClasses + (tag & 255)] += tag >> 8;
    }
  }

  /** @returns false when all rows have one rank. */
  #scanHistogram(best: Split, feature: number, nLevels: number, node: NodeSums): boolean {
    const histogram = this.#histogram;
    const left = this.#left;
    const weights = this.#weights;
    const minLeaf = this.#minLeaf;
    const nClasses = weights.length;
    const { nRows, weight, classWeights, squares } = node;
    const lastLeft = nRows - minLeaf;
    let nLeft = 0;
    let leftWeight = 0;
    let leftSquares = 0;
    let product = 0;
    let previous = -1;
    let isConstant = true;
    for (let c = 0; c < left.length; c++) left[c] = 0;
    for (let rank = 0, at = 0; rank < nLevels && nLeft < nRows; rank++) {
      const nBefore = nLeft;
      const weightBefore = leftWeight;
      const squaresBefore = leftSquares;
      const productBefore = product;
      for (let c = 0; c < nClasses; c++, at++) {
        const times = histogram[at];
        if (times === 0) continue;
        const add = times * weights[c];
        const before = left[c];
        leftSquares += add * (2 * before + add);
        product += add * classWeights[c];
        left[c] = before + add;
        leftWeight += add;
        nLeft += times;
      }
      if (nLeft === nBefore) continue;
      if (nBefore > 0) isConstant = false;
      if (nBefore >= minLeaf && nBefore <= lastLeft) {
        const rightSquares = squares - 2 * productBefore + squaresBefore;
        const score = squaresBefore / weightBefore + rightSquares / (weight - weightBefore);
        if (score > best.score) {
          best.score = score;
          best.feature = feature;
          best.rank = previous;
          best.nextRank = rank;
        }
      }
      previous = rank;
    }
    return !isConstant;
  }

  #sortByInsertion(tags: Int32Array, lo: number, n: number): void {
    const ranks = this.#ranks;
    const sortedRanks = this.#sortedRanks;
    const sortedTags = this.#sortedTags;
    for (let i = 0; i < n; i++) {
      const rank = ranks[i];
      let j = i - 1;
      while (j >= 0 && sortedRanks[j] > rank) {
        sortedRanks[j + 1] = sortedRanks[j];
        sortedTags[j + 1] = sortedTags[j];
        j--;
      }
      sortedRanks[j + 1] = rank;
      sortedTags[j + 1] = tags[lo + i];
    }
  }

  #sortIntoBuckets(tags: Int32Array, lo: number, n: number, min: number, shift: number, lastBucket: number): void {
    const ranks = this.#ranks;
    const places = this.#places;
    const sortedRanks = this.#sortedRanks;
    const sortedTags = this.#sortedTags;
    places.fill(0, 0, lastBucket + 1);
    for (let i = 0; i < n; i++) places[(ranks[i] - min) >> shift]++;
    let next = 0;
    for (let bucket = 0; bucket <= lastBucket; bucket++) {
      const count = places[bucket];
      places[bucket] = next;
      next += count;
    }
    for (let i = 0; i < n; i++) {
      const rank = ranks[i];
      const place = places[(rank - min) >> shift]++;
      sortedRanks[place] = rank;
      sortedTags[place] = tags[lo + i];
    }
  }

  /** Insertion sort of what is nearly sorted. */
  #mend(n: number): void {
    const sortedRanks = this.#sortedRanks;
    const sortedTags = this.#sortedTags;
    for (let i = 1; i < n; i++) {
      const rank = sortedRanks[i];
      if (sortedRanks[i - 1] <= rank) continue;
      const tag = sortedTags[i];
      let j = i - 1;
      while (j >= 0 && sortedRanks[j] > rank) {
        sortedRanks[j + 1] = sortedRanks[j];
        sortedTags[j + 1] = sortedTags[j];
        j--;
      }
      sortedRanks[j + 1] = rank;
      sortedTags[j + 1] = tag;
    }
  }

  #scanSorted(best: Split, feature: number, n: number, node: NodeSums): void {
    const sortedRanks = this.#sortedRanks;
    const sortedTags = this.#sortedTags;
    const left = this.#left;
    const weights = this.#weights;
    const minLeaf = this.#minLeaf;
    const { nRows, weight, classWeights, squares } = node;
    const lastLeft = nRows - minLeaf;
    let bestScore = best.score;
    let bestAt = -1;
    let nLeft = 0;
    let leftWeight = 0;
    let leftSquares = 0;
    // Σ(class weight in the node · on the left), from which the right side's squares follow.
    let product = 0;
    let previous = sortedRanks[0];
    for (let c = 0; c < left.length; c++) left[c] = 0;
    for (let i = 0; i < n; i++) {
      const rank = sortedRanks[i];
      if (rank !== previous) {
        if (nLeft >= minLeaf && nLeft <= lastLeft) {
          const rightSquares = squares - 2 * product + leftSquares;
          const score = leftSquares / leftWeight + rightSquares / (weight - leftWeight);
          if (score > bestScore) {
            bestScore = score;
            bestAt = i;
          }
        }
        previous = rank;
      }
      const tag = sortedTags[i];
      const c = tag & 255;
      const add = (tag >> 8) * weights[c];
      const before = left[c];
      leftSquares += add * (2 * before + add);
      product += add * classWeights[c];
      left[c] = before + add;
      leftWeight += add;
      nLeft += tag >> 8;
    }
    if (bestAt < 0) return;
    best.score = bestScore;
    best.feature = feature;
    best.rank = sortedRanks[bestAt - 1];
    best.nextRank = sortedRanks[bestAt];
  }
}
