import { isNodata, type BandValues } from './band-values.ts';

/** Counts of values in bins of equal width; bin i covers [low + i·binWidth, low + (i + 1)·binWidth). */
export interface Histogram {
  readonly low: number;
  readonly binWidth: number;
  readonly counts: Float64Array;
}

/**
 * Makes an empty histogram over low..high; a value outside goes to the first or last bin.
 * @throws RangeError when high is not above low or nBins is not a positive integer.
 */
export function createHistogram(low: number, high: number, nBins: number): Histogram {
  if (!(high > low) || !Number.isFinite(high - low))
    throw new RangeError(`A histogram from ${low} to ${high} is empty.`);
  if (!Number.isInteger(nBins) || nBins < 1) throw new RangeError(`At least one bin is needed, got ${nBins}.`);
  return { low, binWidth: (high - low) / nBins, counts: new Float64Array(nBins) };
}

/** Makes an empty histogram with one bin for each whole number low..high, centred on it: percentiles are then exact. */
export function createIntegerHistogram(low: number, high: number): Histogram {
  return createHistogram(low - 0.5, high + 0.5, high - low + 1);
}

/** Counts the valid values of a block. */
export function addToHistogram(histogram: Histogram, values: BandValues, nodata: number | null): void {
  const { low, binWidth, counts } = histogram;
  const last = counts.length - 1;
  for (let i = 0; i < values.length; i++) {
    if (isNodata(values[i], nodata)) continue;
    const bin = Math.floor((values[i] - low) / binWidth);
    counts[bin < 0 ? 0 : bin > last ? last : bin]++;
  }
}

/**
 * Value below or at which a share of the counted values lies (nearest rank), as the middle of its bin: off by half a
 * bin width at most. Returns `null` when nothing was counted.
 * @throws RangeError when share is outside 0..1.
 */
export function percentileOf({ low, binWidth, counts }: Histogram, share: number): number | null {
  if (!(share >= 0 && share <= 1)) throw new RangeError(`A share from 0 to 1 is needed, got ${share}.`);
  const total = counts.reduce((sum, count) => sum + count, 0);
  if (total === 0) return null;
  const rank = Math.max(1, Math.ceil(share * total));
  let seen = 0;
  for (let bin = 0; bin < counts.length; bin++) {
    seen += counts[bin];
    if (seen >= rank) return low + (bin + 0.5) * binWidth;
  }
  return low + (counts.length - 0.5) * binWidth;
}
