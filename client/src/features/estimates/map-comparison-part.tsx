import { useState } from 'react';
import type { MapComparison } from '../../../../shared/contracts/reference.ts';
import type { Run } from '../../../../shared/contracts/run.ts';
import { HowComputed } from '../../components/figures/how-computed.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { Select } from '../../components/ui/select.tsx';
import { formatNumber } from '../../lib/format.ts';
import { useMapComparison } from './compare-maps.ts';

export interface MapComparisonPartProps {
  projectId: string;
  designId: string;
  /** Finished runs other than the design's own. */
  runs: readonly Run[];
}

/** Which of two maps is better, judged on the same reference points. */
export function MapComparisonPart({ projectId, designId, runs }: MapComparisonPartProps) {
  const [runId, setRunId] = useState<string | null>(null);
  const comparison = useMapComparison(projectId, designId, runId);
  return (
    <div className="max-w-3xl space-y-4">
      <Field label="Compare with" className="max-w-72">
        <Select
          value={runId}
          onChange={setRunId}
          placeholder="Choose a run…"
          options={runs.map((run) => ({ value: run.id, label: `Run ${run.number}${run.name ? `, ${run.name}` : ''}` }))}
        />
      </Field>
      {runId && comparison.isPending && <PendingState label="Reading the other map" rows={3} />}
      {comparison.isError && <ErrorState error={comparison.error} onRetry={() => void comparison.refetch()} isInline />}
      {comparison.data && <Outcome comparison={comparison.data} />}
    </div>
  );
}

function Outcome({ comparison }: { comparison: MapComparison }) {
  const { first, second, difference, low, high, n, mcNemar, onlyFirstRight, onlySecondRight, how } = comparison;
  const percent = (share: number) => `${formatNumber(share * 100, 1)} %`;
  const points = (share: number) => `${share > 0 ? '+' : ''}${formatNumber(share * 100, 1)}`;
  const pOf = mcNemar && (mcNemar.quoted === 'exact' ? mcNemar.exactPValue : mcNemar.pValue);
  return (
    <div role="status" className="space-y-3">
      <p className="text-lg">
        Run {first.number}: <strong className="font-semibold">{percent(first.overall)}</strong>, run {second.number}:{' '}
        <strong className="font-semibold">{percent(second.overall)}</strong> of the area mapped rightly.
      </p>
      <dl className="grid grid-cols-[auto_1fr] gap-x-6 gap-y-1 text-sm">
        <dt className="text-ink-soft">Difference in percentage points</dt>
        <dd>
          {points(difference)}
          {low !== null && high !== null && ` (95 % interval ${points(low)} to ${points(high)})`}
        </dd>
        <dt className="text-ink-soft">Points only one of them has right</dt>
        <dd>
          {onlyFirstRight} only run {first.number}, {onlySecondRight} only run {second.number}, of {n}
        </dd>
        <dt className="text-ink-soft">McNemar’s test</dt>
        <dd>
          {mcNemar && pOf !== null
            ? `p = ${pOf < 0.001 ? 'under 0.001' : formatNumber(pOf, 3)} (${mcNemar.quoted === 'exact' ? 'exact' : `chi-square ${formatNumber(mcNemar.chiSquare, 2)}`})`
            : 'undefined: both are right at the same points'}
        </dd>
      </dl>
      <p className="flex flex-wrap gap-x-5 text-sm">
        {how.map((one, place) => (
          <HowComputed
            key={one.formula}
            name={place === 0 ? 'Difference' : 'McNemar’s test'}
            how={one}
            trigger={place === 0 ? 'How was the difference computed?' : 'How was the test computed?'}
          />
        ))}
      </p>
      {comparison.cautions.map((text) => (
        <p key={text} className="text-sm text-ink-soft">
          {text}
        </p>
      ))}
    </div>
  );
}
