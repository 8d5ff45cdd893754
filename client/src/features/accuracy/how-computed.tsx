import type { Accuracy } from '../../../../shared/contracts/accuracy.ts';
import { formatCount, formatNumber } from '../../lib/format.ts';
import { UNIT_NOUN } from './describe-accuracy.ts';

/** What the overall accuracy rests on and how its interval was made. */
export function HowComputed({ accuracy }: { accuracy: Accuracy }) {
  const { overall, unit, total, polygonCount, unmapped } = accuracy;
  const { one, many } = UNIT_NOUN[unit];
  const nUnmapped = unmapped.reduce((sum, count) => sum + count, 0);
  return (
    <div className="space-y-2">
      <dl className="grid grid-cols-[1fr_auto] gap-x-3 gap-y-0.5">
        <dt className="text-ink-soft">Held-out polygons</dt>
        <dd className="text-right font-medium">{formatNumber(polygonCount)}</dd>
        <dt className="text-ink-soft">{unit === 'pixel' ? 'Their mapped pixels' : 'Of them, mapped'}</dt>
        <dd className="text-right font-medium">{formatNumber(total)}</dd>
        {nUnmapped > 0 && (
          <>
            <dt className="text-ink-soft">Left without a class by the map, in no figure</dt>
            <dd className="text-right font-medium">{formatCount(nUnmapped, one, many)}</dd>
          </>
        )}
      </dl>
      <p>{overall.method}</p>
      <p className="text-ink-soft">
        Held-out polygons were drawn by whole polygon, within each class, before training; no pixel of theirs was
        learned from.
      </p>
    </div>
  );
}
