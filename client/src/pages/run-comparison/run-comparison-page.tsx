import { Link, useSearchParams } from 'react-router-dom';
import type { Run } from '../../../../shared/contracts/run.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage, Section } from '../../components/layout/reading-page.tsx';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { Select } from '../../components/ui/select.tsx';
import { type RunPair, useRecipeDiff, useRunComparison } from '../../features/runs/compare-runs.ts';
import { useRuns } from '../../features/runs/list-runs.ts';
import { runTitle } from '../../features/runs/recipe-text.ts';
import { SameSamplesTest } from '../../features/runs/same-samples-test.tsx';
import { TransitionTable } from '../../features/runs/transition-table.tsx';
import { formatPercent } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { RunFigures } from './run-figures.tsx';

/** Two runs side by side: figures, recipes, the test on the same samples, and what became what. */
export function RunComparisonPage() {
  const project = useProject();
  const runs = useRuns(project.id);
  const [params, setParams] = useSearchParams();
  const header = (
    <PageHeader title="Compare runs">
      <Link to={paths.runs(project.id)} className="link text-sm">
        All runs
      </Link>
    </PageHeader>
  );
  if (!project.abilities.readAccuracy || !project.abilities.readRuns) {
    return (
      <ReadingPage header={header}>
        <ForbiddenState />
      </ReadingPage>
    );
  }
  const finished = (runs.data ?? []).filter((run) => run.job.state === 'finished');
  const [newest, before] = finished;
  const pick = (key: string, otherwise: Run | undefined) =>
    finished.find(({ id }) => id === params.get(key)) ?? otherwise;
  const second = pick('second', newest);
  const first = pick('first', second?.id === before?.id ? newest : before);
  const choose = (key: string) => (id: string) =>
    setParams(
      { ...(first && { first: first.id }), ...(second && { second: second.id }), [key]: id },
      { replace: true },
    );
  return (
    <ReadingPage header={header}>
      {runs.isPending && <PendingState label="Loading runs" rows={4} />}
      {runs.isError && !runs.data && <ErrorState error={runs.error} onRetry={() => void runs.refetch()} />}
      {runs.data && (!first || !second) && (
        <div className="space-y-3">
          <p>Two finished runs are needed to compare them; there {finished.length === 1 ? 'is one' : 'is none'} yet.</p>
          {project.abilities.startRuns && (
            <Link to={paths.newRun(project.id, newest?.id)} className={buttonClass('primary')}>
              New run
            </Link>
          )}
        </div>
      )}
      {first && second && (
        <>
          <div className="mb-8 grid max-w-3xl grid-cols-2 gap-4">
            <RunField label="First run" runs={finished} value={first.id} onChange={choose('first')} />
            <RunField label="Second run" runs={finished} value={second.id} onChange={choose('second')} />
          </div>
          <Comparison first={first} second={second} />
        </>
      )}
    </ReadingPage>
  );
}

interface RunFieldProps {
  label: string;
  runs: readonly Run[];
  value: string;
  onChange: (id: string) => void;
}

function RunField({ label, runs, value, onChange }: RunFieldProps) {
  const options = runs.map((run) => ({
    value: run.id,
    label: [runTitle(run), run.name, run.sceneName].filter(Boolean).join(' · '),
  }));
  return (
    <Field label={label}>
      <Select value={value} onChange={onChange} options={options} />
    </Field>
  );
}

function Comparison({ first, second }: { first: Run; second: Run }) {
  const project = useProject();
  const pair: RunPair = { first: first.id, second: second.id };
  const comparison = useRunComparison(project.id, pair);
  const diff = useRecipeDiff(project.id, pair);
  if (comparison.isError) return <ErrorState error={comparison.error} onRetry={() => void comparison.refetch()} />;
  if (!comparison.data) return <PendingState label="Laying the maps over each other" rows={8} />;
  const { data } = comparison;
  return (
    <div className="space-y-10">
      <p className="max-w-3xl text-lg">
        {data.agreeingShare === null
          ? 'No place is mapped by both runs.'
          : `The maps agree on ${formatPercent(data.agreeingShare, 1)} of the area both have mapped.`}{' '}
        <Link to={`${paths.run(project.id, first.id)}?swipe=${second.id}`} className="link">
          Swipe between them on the map
        </Link>
      </p>
      <Section title="Figures side by side">
        <RunFigures first={first} second={second} />
      </Section>
      <Section title="On the same held-out samples">
        <SameSamplesTest comparison={data} />
      </Section>
      <Section title="Recipes">
        {diff.isError && <ErrorState error={diff.error} isInline onRetry={() => void diff.refetch()} />}
        {diff.data?.differences.length === 0 && <p>The recipes are the same.</p>}
        {diff.data && diff.data.differences.length > 0 && (
          <table className="w-full max-w-3xl text-sm" aria-label="Settings that differ">
            <thead>
              <tr className="text-left text-xs text-ink-soft *:border-b *:border-edge *:py-1 *:font-medium">
                <th scope="col">Setting</th>
                <th scope="col">{runTitle(first)}</th>
                <th scope="col">{runTitle(second)}</th>
              </tr>
            </thead>
            <tbody>
              {diff.data.differences.map((one) => (
                <tr key={one.path} className="*:border-b *:border-line *:py-1">
                  <th scope="row" className="text-left font-normal">
                    {one.label}
                  </th>
                  <td>{one.left ?? '–'}</td>
                  <td>{one.right ?? '–'}</td>
                </tr>
              ))}
            </tbody>
          </table>
        )}
        {diff.data?.notes.map((note) => (
          <p key={note} className="mt-2 text-sm text-ink-soft">
            {note}
          </p>
        ))}
      </Section>
      <Section title={data.isOneScene ? 'Where the maps differ' : 'Change between the dates'}>
        <TransitionTable comparison={data} />
      </Section>
      <ul className="max-w-3xl list-disc space-y-1 pl-5 text-sm">
        {data.cautions.map((caution) => (
          <li key={caution}>{caution}</li>
        ))}
      </ul>
    </div>
  );
}
