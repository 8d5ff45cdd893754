import type { DesignFigure } from '../../../../shared/contracts/reference.ts';
import { formatNumber } from '../../lib/format.ts';

/** The interval to quote: the cautious one where points are too few for the large-sample one; null where undefined. */
export function quotedInterval(figure: DesignFigure): { low: number; high: number } | null {
  if (figure.isFragile && figure.cautious) return figure.cautious;
  return figure.low === null || figure.high === null ? null : { low: figure.low, high: figure.high };
}

/** A figure and its interval apart: as per cent, or as a plain number of two decimals. */
export function figureParts(figure: DesignFigure, isShare: boolean): { value: string; interval: string | null } {
  if (figure.value === null) return { value: 'undefined', interval: null };
  const format = (number: number) => (isShare ? formatNumber(number * 100, 1) : formatNumber(number, 2));
  const quoted = quotedInterval(figure);
  return {
    value: isShare ? `${format(figure.value)} %` : format(figure.value),
    interval: quoted ? `${format(quoted.low)} to ${format(quoted.high)}` : 'no interval',
  };
}

/** A plain figure with its interval. */
export function figurePhrase(figure: DesignFigure, decimals = 3): string {
  if (figure.value === null) return 'undefined';
  const interval = quotedInterval(figure);
  const value = formatNumber(figure.value, decimals);
  return interval
    ? `${value} (${formatNumber(interval.low, decimals)} to ${formatNumber(interval.high, decimals)})`
    : value;
}

/** Half the large-sample interval, for "± 21"; null where it is undefined. */
export function halfWidth({ low, high }: DesignFigure): number | null {
  return low === null || high === null ? null : (high - low) / 2;
}
