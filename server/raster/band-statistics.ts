import { getIntegerRange, type BandArray, type BandDtype } from './band-dtype.ts';
import type { BandFile } from './band-file.ts';

/** Counts of valid pixels in equal bins from `low` to `high`. */
export interface BandHistogram {
  low: number;
  high: number;
  counts: number[];
}

/** Statistics of the valid pixels of a band at full resolution, in DN. */
export interface BandStatistics {
  nValid: number;
  min: number;
  max: number;
  mean: number;
  /** Population standard deviation. */
  sd: number;
  /** The smallest value with at least 2 % of the valid pixels at or below it. */
  p2: number;
  /** The same for 98 %. */
  p98: number;
  /** 256 bins; one bin a value for integers that span fewer. */
  histogram: BandHistogram;
}

const nHistogramBins = 256;
const nFineBins = 65536;

/**
 * Statistics of a band, block by block in bounded memory; null when no pixel has data.
 * Mean and variance merge block sums by Chan, Golub and LeVeque (1983, The American Statistician 37:242–247, pairwise
 * update). Percentiles are exact for 8- and 16-bit integers; for other types they are found by three rounds of
 * 65,536 bins, each within the bin before, so to 2⁻⁴⁸ of the range.
 */
export async function computeBandStatistics(
  band: BandFile,
  options: { signal?: AbortSignal | undefined; onProgress?: ((fraction: number) => void) | undefined } = {},
): Promise<BandStatistics | null> {
  const isSmall = /^u?int(8|16)$/.test(band.dtype);
  const nPasses = isSmall ? 1 : 4;
  let pass = 0;
  const scan = async (visit: (values: Float64Array, n: number) => void): Promise<void> => {
    const done = pass++;
    await scanValidValues(band, visit, options.signal, (fraction) => options.onProgress?.((done + fraction) / nPasses));
  };

  const moments = createMoments();
  const range = getIntegerRange(band.dtype);
  const exactCounts = isSmall && range !== null ? new Float64Array(range[1] - range[0] + 1) : null;
  await scan((values, n) => {
    addToMoments(moments, values, n);
    if (exactCounts !== null && range !== null) for (let i = 0; i < n; i++) exactCounts[values[i] - range[0]]++;
  });
  const { nValid, min, max, mean } = moments;
  if (nValid === 0) {
    options.onProgress?.(1);
    return null;
  }
  const sd = Math.sqrt(moments.squares / nValid);
  const ranks = [0.02, 0.98].map((share) => Math.max(1, Math.ceil(share * nValid)));

  if (exactCounts !== null && range !== null) {
    const [p2, p98] = ranks.map((rank) => range[0] + findRank(exactCounts, rank).bin);
    const histogram = createHistogram(band.dtype, min, max);
    for (let value = min; value <= max; value++) {
      addToHistogram(histogram, value, exactCounts[value - range[0]]);
    }
    return { nValid, min, max, mean, sd, p2, p98, histogram };
  }

  const histogram = createHistogram(band.dtype, min, max);
  const searches = ranks.map((rank): RankSearch => ({ low: min, high: max, rank, value: min === max ? min : null }));
  for (let round = 0; round < nPasses - 1; round++) {
    const counts = searches.map(() => new Float64Array(nFineBins));
    const bottoms = searches.map(() => new Float64Array(nFineBins).fill(Infinity));
    const tops = searches.map(() => new Float64Array(nFineBins).fill(-Infinity));
    await scan((values, n) => {
      if (round === 0) for (let i = 0; i < n; i++) addToHistogram(histogram, values[i], 1);
      searches.forEach((search, s) => countWithin(search, values, n, counts[s], bottoms[s], tops[s]));
    });
    searches.forEach((search, s) => narrow(search, counts[s], bottoms[s], tops[s]));
    if (searches.every((search) => search.value !== null)) break;
  }
  options.onProgress?.(1);
  const [p2, p98] = searches.map((search) => search.value ?? search.high);
  return { nValid, min, max, mean, sd, p2, p98, histogram };
}

async function scanValidValues(
  band: BandFile,
  visit: (values: Float64Array, n: number) => void,
  signal: AbortSignal | undefined,
  onProgress: (fraction: number) => void,
): Promise<void> {
  const { width, height, blockWidth, blockHeight } = band.levels[0];
  const nCols = Math.ceil(width / blockWidth);
  const nRows = Math.ceil(height / blockHeight);
  const values = new Float64Array(blockWidth * blockHeight);
  for (let blockRow = 0; blockRow < nRows; blockRow++) {
    for (let blockCol = 0; blockCol < nCols; blockCol++) {
      signal?.throwIfAborted();
      const block = await band.readBlock(0, blockCol, blockRow, false);
      const usedWidth = Math.min(blockWidth, width - blockCol * blockWidth);
      const usedHeight = Math.min(blockHeight, height - blockRow * blockHeight);
      visit(values, takeValid(block, blockWidth, usedWidth, usedHeight, band.nodata, values));
    }
    onProgress((blockRow + 1) / nRows);
  }
}

/** Copies what has data out of a block; infinite values count as without data, like NaN. */
function takeValid(
  block: BandArray,
  blockWidth: number,
  usedWidth: number,
  usedHeight: number,
  nodata: number | null,
  into: Float64Array,
): number {
  let n = 0;
  for (let row = 0; row < usedHeight; row++) {
    const end = row * blockWidth + usedWidth;
    for (let i = row * blockWidth; i < end; i++) {
      const value = block[i];
      if (value !== nodata && Number.isFinite(value)) into[n++] = value;
    }
  }
  return n;
}

interface Moments {
  nValid: number;
  min: number;
  max: number;
  mean: number;
  /** Sum of squared differences from the mean. */
  squares: number;
}

function createMoments(): Moments {
  return { nValid: 0, min: Infinity, max: -Infinity, mean: 0, squares: 0 };
}

function addToMoments(moments: Moments, values: Float64Array, n: number): void {
  if (n === 0) return;
  let sum = 0;
  for (let i = 0; i < n; i++) {
    const value = values[i];
    sum += value;
    if (value < moments.min) moments.min = value;
    if (value > moments.max) moments.max = value;
  }
  const mean = sum / n;
  let squares = 0;
  for (let i = 0; i < n; i++) squares += (values[i] - mean) ** 2;
  const total = moments.nValid + n;
  const delta = mean - moments.mean;
  moments.squares += squares + (delta * delta * moments.nValid * n) / total;
  moments.mean += (delta * n) / total;
  moments.nValid = total;
}

function createHistogram(dtype: BandDtype, min: number, max: number): BandHistogram {
  if (getIntegerRange(dtype) !== null) {
    const nValues = max - min + 1;
    return {
      low: min - 0.5,
      high: max + 0.5,
      counts: new Array<number>(Math.min(nHistogramBins, nValues)).fill(0),
    };
  }
  return { low: min, high: max, counts: new Array<number>(nHistogramBins).fill(0) };
}

function addToHistogram({ low, high, counts }: BandHistogram, value: number, count: number): void {
  const bin = high > low ? Math.floor(((value - low) / (high - low)) * counts.length) : 0;
  counts[Math.min(counts.length - 1, bin)] += count;
}

/** A percentile being closed in on: the value of this rank among those in `low`…`high`. */
interface RankSearch {
  low: number;
  high: number;
  rank: number;
  value: number | null;
}

function countWithin(
  { low, high, value: found }: RankSearch,
  values: Float64Array,
  n: number,
  counts: Float64Array,
  bottoms: Float64Array,
  tops: Float64Array,
): void {
  if (found !== null) return;
  const perUnit = nFineBins / (high - low);
  for (let i = 0; i < n; i++) {
    const value = values[i];
    if (value < low || value > high) continue;
    const bin = Math.min(nFineBins - 1, Math.floor((value - low) * perUnit));
    counts[bin]++;
    if (value < bottoms[bin]) bottoms[bin] = value;
    if (value > tops[bin]) tops[bin] = value;
  }
}

/** Goes on between the smallest and largest value of the bin that holds the rank; done when that is one value or the last. */
function narrow(search: RankSearch, counts: Float64Array, bottoms: Float64Array, tops: Float64Array): void {
  if (search.value !== null) return;
  const { bin, rankInBin } = findRank(counts, search.rank);
  search.low = bottoms[bin];
  search.high = tops[bin];
  search.rank = rankInBin;
  if (search.low === search.high || rankInBin === counts[bin]) search.value = search.high;
  else if (rankInBin === 1) search.value = search.low;
}

function findRank(counts: Float64Array, rank: number): { bin: number; rankInBin: number } {
  let before = 0;
  for (let bin = 0; bin < counts.length; bin++) {
    if (before + counts[bin] >= rank) return { bin, rankInBin: rank - before };
    before += counts[bin];
  }
  throw new RangeError(`rank ${rank} of ${before} values`);
}
