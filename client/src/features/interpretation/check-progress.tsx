import type { BlindPoint } from '../../../../shared/contracts/reference.ts';
import { formatDuration, formatNumber } from '../../lib/format.ts';

/** How far the viewer is, their pace, and the time the rest will take at that pace. */
export function CheckProgress({ progress }: { progress: BlindPoint['progress'] }) {
  const { answered, skipped, left, total, secondsPerPoint } = progress;
  const share = total > 0 ? answered / total : 0;
  const pace =
    secondsPerPoint === null
      ? null
      : `${formatNumber(secondsPerPoint)} s a point${left > 0 ? `, about ${formatDuration(secondsPerPoint * left)} to go` : ''}`;
  return (
    <div className="flex min-w-0 grow items-center gap-3">
      <div
        role="progressbar"
        aria-label="Points answered"
        aria-valuemin={0}
        aria-valuemax={total}
        aria-valuenow={answered}
        className="h-2 min-w-24 grow overflow-hidden rounded-full bg-line max-w-80"
      >
        <div className="h-full rounded-full bg-groundsel-deep" style={{ width: `${share * 100}%` }} />
      </div>
      <p className="text-sm whitespace-nowrap">
        {formatNumber(answered)} of {formatNumber(total)}
        {skipped > 0 && <span className="text-ink-soft">, {skipped} skipped</span>}
        {pace && <span className="ml-3 text-ink-soft max-md:hidden">{pace}</span>}
      </p>
    </div>
  );
}
