import type { DesignFigure } from '../../../../shared/contracts/reference.ts';
import { formatNumber } from '../../lib/format.ts';

/** The interval to quote: the cautious one where points are too few for the large-sample one; null where undefined. */
export function quotedInterval(figure: DesignFigure): { low: number; high: number } | null {
  if (figure.isFragile && figure.cautious) return figure.cautious;
  return figure.low === null || figure.high === null ? null : { low: figure.low, high: figure.high };
}

/** A share as per cent with its interval: "84.0 % (79.8 to 88.2)"; "undefined" where it is. */
export function sharePhrase(figure: DesignFigure, decimals = 1): string {
  if (figure.value === null) return 'undefined';
  const value = `${formatNumber(figure.value * 100, decimals)} %`;
  const interval = quotedInterval(figure);
  if (!interval) return `${value} (no interval)`;
  return `${value} (${formatNumber(interval.low * 100, decimals)} to ${formatNumber(interval.high * 100, decimals)})`;
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
