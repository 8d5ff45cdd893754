import { queryOptions, useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { type Design, kappaComparisonSchema } from '../../../../shared/contracts/reference.ts';
import { HowComputed } from '../../components/figures/how-computed.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { Select } from '../../components/ui/select.tsx';
import { fetchJson } from '../../lib/fetch-json.ts';
import { formatNumber } from '../../lib/format.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const kappasQuery = (projectId: string, designId: string, otherId: string | null) =>
  queryOptions({
    queryKey: projectKey(projectId, 'designs', designId, 'kappas', otherId),
    queryFn: ({ signal }) =>
      fetchJson(`/designs/${designId}/kappas`, kappaComparisonSchema, { query: { designId: otherId }, signal }),
    enabled: otherId !== null,
  });

export interface KappaComparisonPartProps {
  design: Design;
  /** Other closed designs. */
  others: readonly Design[];
}

/** Kappa of this map against that of one judged by points of its own. */
export function KappaComparisonPart({ design, others }: KappaComparisonPartProps) {
  const [otherId, setOtherId] = useState<string | null>(null);
  const compared = useQuery(kappasQuery(design.projectId, design.id, otherId));
  return (
    <div className="max-w-3xl space-y-4">
      <Field label="Compare kappa with" className="max-w-72">
        <Select
          value={otherId}
          onChange={setOtherId}
          placeholder="Choose a design…"
          options={others.map((one) => ({ value: one.id, label: `Design ${one.number}, run ${one.runNumber}` }))}
        />
      </Field>
      {otherId && compared.isPending && <PendingState label="Comparing" rows={2} />}
      {compared.isError && <ErrorState error={compared.error} onRetry={() => void compared.refetch()} isInline />}
      {compared.data && (
        <div role="status" className="space-y-2 text-sm">
          <p>
            Run {compared.data.first.runNumber}: kappa {formatNumber(compared.data.first.kappa, 3)}, run{' '}
            {compared.data.second.runNumber}: {formatNumber(compared.data.second.kappa, 3)};{' '}
            <HowComputed
              name="Difference of two kappas"
              how={compared.data.how}
              trigger={`Z = ${formatNumber(compared.data.z, 2)}`}
            />
            , p {compared.data.pValue < 0.001 ? 'under 0.001' : `= ${formatNumber(compared.data.pValue, 3)}`}.
          </p>
          <p className="text-ink-soft">{compared.data.caution}</p>
        </div>
      )}
    </div>
  );
}
