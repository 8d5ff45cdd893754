import { isNodata, type BandValues } from './band-values.ts';
import { percentileOf, type Histogram } from './histogram.ts';

/** Values shown as black and as white. */
export interface StretchRange {
  low: number;
  high: number;
}

/** Range between two percentiles of a histogram (shares, such as 0.02 and 0.98); `null` when nothing was counted. */
export function percentileStretch(histogram: Histogram, lowShare = 0.02, highShare = 0.98): StretchRange | null {
  const low = percentileOf(histogram, lowShare);
  const high = percentileOf(histogram, highShare);
  return low === null || high === null ? null : { low, high };
}

/**
 * Maps values to 0..255, linearly from low to high and clipped beyond; a range without width gives middle grey.
 *
 * Fills display[0..n) and, where given, alpha[0..n) with 0 for no data and 255 elsewhere; no data shows as 0.
 * @throws RangeError when an output is shorter than the values.
 */
export function applyStretch(
  values: BandValues,
  nodata: number | null,
  { low, high }: StretchRange,
  display: Uint8Array | Uint8ClampedArray,
  alpha?: Uint8Array | Uint8ClampedArray,
): void {
  if (display.length < values.length || (alpha && alpha.length < values.length)) {
    throw new RangeError(`${values.length} values do not fit the outputs given.`);
  }
  const scale = high > low ? 255 / (high - low) : 0;
  const flat = high > low ? 0 : 128;
  for (let i = 0; i < values.length; i++) {
    const value = values[i];
    const missing = isNodata(value, nodata);
    const grey = (value - low) * scale + flat;
    display[i] = missing ? 0 : grey <= 0 ? 0 : grey >= 255 ? 255 : Math.round(grey);
    if (alpha) alpha[i] = missing ? 0 : 255;
  }
}
