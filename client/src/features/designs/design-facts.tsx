import type { Design } from '../../../../shared/contracts/reference.ts';
import { formatCount, formatMeters } from '../../lib/format.ts';

const STRATA_NAMES = { 'map-classes': 'classes of the map', 'from-to': 'change between two maps', zones: 'zones' };

/** How a design was drawn, for whoever has to check it. */
export function DesignFacts({ design }: { design: Design }) {
  const facts = [
    ['Points', formatCount(design.n, 'point')],
    ['Map', `run ${design.runNumber}`],
    ['Strata', STRATA_NAMES[typeof design.strataKind === 'string' ? design.strataKind : design.strataKind.kind]],
    ['People a point', String(design.answersPerPoint)],
    ['Least distance', design.minSpacingMeters > 0 ? formatMeters(design.minSpacingMeters) : 'none'],
    ['Seed', design.seed === null ? 'withheld while open' : String(design.seed)],
    ['Planned by', design.createdBy?.name ?? 'someone no longer here'],
  ];
  return (
    <>
      <dl className="grid grid-cols-[auto_1fr] gap-x-6 gap-y-1 text-sm">
        {facts.map(([name, value]) => (
          <div key={name} className="contents">
            <dt className="text-ink-soft">{name}</dt>
            <dd>{value}</dd>
          </div>
        ))}
        <dt className="text-ink-soft">Digest</dt>
        <dd className="font-mono text-xs break-all">{design.digest ?? 'set when the blind check opens'}</dd>
      </dl>
      {design.spacingEffect && <p className="mt-3 text-sm text-ink-soft">{design.spacingEffect}</p>}
    </>
  );
}
