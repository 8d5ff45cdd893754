import type { Estimate } from '../../../../shared/contracts/accuracy.ts';
import { formatNumber, formatPercent } from '../../lib/format.ts';

interface ShareEstimateProps {
  estimate: Estimate;
  /** Said under "undefined". */
  whyUndefined: string;
}

/** A share with its interval below; a share that cannot be computed says so and why. */
export function ShareEstimate({ estimate: { value, low, high }, whyUndefined }: ShareEstimateProps) {
  if (value === null) {
    return (
      <>
        undefined
        <span className="block text-xs leading-tight whitespace-normal text-ink-soft">{whyUndefined}</span>
      </>
    );
  }
  return (
    <>
      <span className="font-medium">{formatPercent(value)}</span>
      <span className="block text-xs text-ink-soft">
        {low === null || high === null ? 'no interval' : `${formatNumber(low * 100)}–${formatNumber(high * 100)}`}
      </span>
    </>
  );
}
