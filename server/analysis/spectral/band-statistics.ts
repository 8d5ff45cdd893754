import { isNodata, type BandValues } from './band-values.ts';

export interface BandStatistics {
  nValid: number;
  nNodata: number;
  /** `null` for min, max and mean when no pixel is valid, and for the deviation below two. */
  min: number | null;
  max: number | null;
  mean: number | null;
  /** Sample standard deviation (divisor n − 1). */
  standardDeviation: number | null;
}

/** Gathers statistics of a band block by block; the result does not depend on the cut but for rounding. */
export interface BandAccumulator {
  /** Adds a block of pixels; values equal to nodata, NaN and infinities are counted as no data. */
  add(values: BandValues): void;
  finish(): BandStatistics;
}

/**
 * Makes an accumulator for a band with the given nodata value (`null` for none).
 * Source: Chan, Golub & LeVeque 1983, The American Statistician 37:242–247 (means and squares joined pairwise).
 */
export function createBandAccumulator(nodata: number | null): BandAccumulator {
  let nValid = 0;
  let nNodata = 0;
  let min = Number.POSITIVE_INFINITY;
  let max = Number.NEGATIVE_INFINITY;
  let mean = 0;
  let squares = 0;

  function add(values: BandValues): void {
    let n = 0;
    let sum = 0;
    for (let i = 0; i < values.length; i++) {
      const value = values[i];
      if (isNodata(value, nodata)) continue;
      n++;
      sum += value;
      if (value < min) min = value;
      if (value > max) max = value;
    }
    nNodata += values.length - n;
    if (n === 0) return;
    // A second pass about a near mean: sums of squares, and the sum itself, lose their digits when values are large.
    const near = sum / n;
    let rest = 0;
    let blockSquares = 0;
    for (let i = 0; i < values.length; i++) {
      if (isNodata(values[i], nodata)) continue;
      const deviation = values[i] - near;
      rest += deviation;
      blockSquares += deviation * deviation;
    }
    const blockMean = near + rest / n;
    blockSquares -= (rest * rest) / n;
    const total = nValid + n;
    const shift = blockMean - mean;
    squares += blockSquares + (shift * shift * nValid * n) / total;
    mean += (shift * n) / total;
    nValid = total;
  }

  function finish(): BandStatistics {
    const hasAny = nValid > 0;
    return {
      nValid,
      nNodata,
      min: hasAny ? min : null,
      max: hasAny ? max : null,
      mean: hasAny ? mean : null,
      standardDeviation: nValid > 1 ? Math.sqrt(squares / (nValid - 1)) : null,
    };
  }

  return { add, finish };
}
