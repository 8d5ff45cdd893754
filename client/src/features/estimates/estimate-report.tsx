import { type ReactNode, useState } from 'react';
import type { CellPoint, Estimates } from '../../../../shared/contracts/reference.ts';
import type { MatrixCell } from '../../components/charts/confusion-matrix-table.tsx';
import { Section } from '../../components/layout/reading-page.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { AreaPart } from './area-part.tsx';
import { CellPoints } from './cell-points.tsx';
import { ClassEstimates } from './class-estimates.tsx';
import { EstimateMatrix } from './estimate-matrix.tsx';
import { EstimateStatement } from './estimate-statement.tsx';
import { PairList } from './pair-list.tsx';
import { StatisticianPart } from './statistician-part.tsx';

export interface EstimateReportProps {
  projectId: string;
  estimates: Estimates;
  /** The design in a few words, above the sentence. */
  designLine: string;
  positions: ReadonlyMap<string, number>;
  renderPlace: (point: CellPoint) => ReactNode;
}

/** What the reference points say, top-down for three people: client, modeller, statistician. */
export function EstimateReport({ projectId, estimates, designLine, positions, renderPlace }: EstimateReportProps) {
  const [cell, setCell] = useState<MatrixCell | null>(null);
  return (
    <div className="space-y-9">
      <div>
        <EstimateStatement estimates={estimates} above={designLine} />
        {estimates.problem && estimates.overall.value !== null && (
          <Callout tone="beware" className="mb-5">
            {estimates.problem}
          </Callout>
        )}
        <div className="grid gap-x-11 gap-y-8 xl:grid-cols-[minmax(0,1.3fr)_minmax(0,1fr)]">
          <AreaPart estimates={estimates} positions={positions} />
          <Beware estimates={estimates} />
        </div>
      </div>
      <Section title="Where the map is wrong" note="For whoever makes the next map.">
        <div className="grid gap-x-11 gap-y-8 xl:grid-cols-[minmax(0,1fr)_minmax(0,1.12fr)]">
          <div className="min-w-0 space-y-6">
            <ClassEstimates estimates={estimates} positions={positions} />
            <div>
              <h3 className="mb-2 font-semibold">The mistakes that cost most area</h3>
              <PairList estimates={estimates} onCell={setCell} />
            </div>
          </div>
          <div className="min-w-0 space-y-4">
            <EstimateMatrix estimates={estimates} positions={positions} cell={cell} onCell={setCell} />
            {cell && (
              <CellPoints
                projectId={projectId}
                estimates={estimates}
                cell={cell}
                onClose={() => setCell(null)}
                renderPlace={renderPlace}
              />
            )}
          </div>
        </div>
      </Section>
      <Section title="Design, weights and estimators" note="For whoever checks the figures.">
        <StatisticianPart estimates={estimates} />
        <p className="mt-4 text-xs break-all text-ink-soft">Digest of the design: {estimates.digest}</p>
      </Section>
    </div>
  );
}

function Beware({ estimates }: { estimates: Estimates }) {
  const warned = estimates.perClass.filter(({ warning }) => warning !== null).map(({ name }) => name);
  return (
    <section aria-labelledby="beware-of" className="text-sm">
      <h3 id="beware-of" className="text-lg font-semibold">
        What to beware of
      </h3>
      <ul className="mt-2 list-disc space-y-1.5 pl-5">
        {warned.length > 0 && (
          <li>
            <span className="font-medium">Few points:</span> {warned.join(', ')}. Fewer than 50 points are mapped as the
            class or are of it (rule of thumb, Congalton 1991), so go by the intervals, not by the figures.
          </li>
        )}
        {estimates.cautions.map((text) => (
          <li key={text} className="text-ink-soft">
            {text}
          </li>
        ))}
      </ul>
    </section>
  );
}
