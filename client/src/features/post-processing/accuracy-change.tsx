import type { RunPostProcessing } from '../../../../shared/contracts/post-processing.ts';
import { formatPercent } from '../../lib/format.ts';

type Overall = RunPostProcessing['before'];

/** Held-out accuracy of the classifier's map beside that of the map as it stands. */
export function AccuracyChange({ before, after }: { before: Overall; after: Overall }) {
  if (!before || !after) return null;
  return (
    <dl className="grid grid-cols-[1fr_auto] gap-x-2.5 gap-y-1 text-sm">
      <dt className="text-ink-soft">Held-out accuracy, classifier’s map</dt>
      <dd className="text-right">{sayOverall(before)}</dd>
      <dt className="text-ink-soft">After the applied steps</dt>
      <dd className="text-right font-medium">{sayOverall(after)}</dd>
    </dl>
  );
}

function sayOverall({ overallAccuracy, overallLow, overallHigh }: NonNullable<Overall>): string {
  if (overallAccuracy === null) return 'undefined';
  const interval =
    overallLow === null || overallHigh === null
      ? ''
      : ` (${formatPercent(overallLow, 1)} to ${formatPercent(overallHigh, 1)})`;
  return `${formatPercent(overallAccuracy, 1)}${interval}`;
}
