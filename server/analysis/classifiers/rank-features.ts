import type { TrainingSet } from './classifier.ts';

/**
 * A training set with every value replaced by its rank among the distinct values of its feature: exact, whatever the
 * range.
 */
export interface RankedFeatures {
  /** For each feature the rank (0 = lowest) of each row; all arrays are of one type, 16 bits where they suffice. */
  ranks: readonly Uint16Array[] | readonly Int32Array[];
  /** For each feature its distinct values, ascending. */
  levels: readonly Float32Array[];
}

const MAX_16_BIT_LEVELS = 65536;
const ranked = new WeakMap<TrainingSet, RankedFeatures>();

/**
 * Ranks the features of a training set; the result is kept as long as the set object lives, since every tree needs it.
 */
export function rankFeatures(set: TrainingSet): RankedFeatures {
  const known = ranked.get(set);
  if (known) return known;
  const { features, nRows, nFeatures } = set;
  const columns: Float32Array[] = [];
  const levels: Float32Array[] = [];
  for (let f = 0; f < nFeatures; f++) {
    const column = new Float32Array(nRows);
    for (let row = 0; row < nRows; row++) column[row] = features[row * nFeatures + f];
    columns.push(column);
    levels.push(listWholeLevels(column) ?? listLevels(column));
  }
  const ranks = levels.every(({ length }) => length <= MAX_16_BIT_LEVELS)
    ? columns.map((column, f) => fillRanks(new Uint16Array(nRows), column, levels[f]))
    : columns.map((column, f) => fillRanks(new Int32Array(nRows), column, levels[f]));
  const result = { ranks, levels };
  ranked.set(set, result);
  return result;
}

function listLevels(column: Float32Array): Float32Array {
  const sorted = column.slice().sort();
  return sorted.filter((value, i) => i === 0 || value !== sorted[i - 1]);
}

/** Distinct values of whole numbers in 0..65535, as most bands have them; `null` for any other. */
function listWholeLevels(column: Float32Array): Float32Array | null {
  const isPresent = new Uint8Array(MAX_16_BIT_LEVELS);
  let nLevels = 0;
  for (const value of column) {
    const level = value & 0xffff;
    if (level !== value) return null;
    if (isPresent[level] === 0) nLevels++;
    isPresent[level] = 1;
  }
  const levels = new Float32Array(nLevels);
  let next = 0;
  for (let level = 0; next < nLevels; level++) if (isPresent[level] === 1) levels[next++] = level;
  return levels;
}

function fillRanks<T extends Uint16Array | Int32Array>(ranks: T, column: Float32Array, sorted: Float32Array): T {
  const last = sorted[sorted.length - 1];
  if (sorted[0] >= 0 && last < MAX_16_BIT_LEVELS && sorted.every((level) => level === Math.floor(level))) {
    const rankOf = new Uint16Array(last + 1);
    for (let rank = 0; rank < sorted.length; rank++) rankOf[sorted[rank]] = rank;
    for (let row = 0; row < column.length; row++) ranks[row] = rankOf[column[row]];
    return ranks;
  }
  let previous = NaN;
  for (let row = 0; row < column.length; row++) {
    const value = column[row];
    // Rows of one polygon follow each other and are alike.
    if (value === previous) {
      ranks[row] = ranks[row - 1];
      continue;
    }
    previous = value;
    let lo = 0;
    let hi = sorted.length - 1;
    while (lo < hi) {
      const middle = (lo + hi) >> 1;
      if (sorted[middle] < value) lo = middle + 1;
      else hi = middle;
    }
    ranks[row] = lo;
  }
  return ranks;
}
