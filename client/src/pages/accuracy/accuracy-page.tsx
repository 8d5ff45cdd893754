import { Download, Printer } from 'lucide-react';
import { Link, useSearchParams } from 'react-router-dom';
import { type AccuracyUnit, accuracyUnitSchema } from '../../../../shared/contracts/accuracy.ts';
import type { Run } from '../../../../shared/contracts/run.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { ForbiddenState, NotFoundState } from '../../components/ui/access-states.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { Segmented } from '../../components/ui/segmented.tsx';
import { Select } from '../../components/ui/select.tsx';
import { AccuracyReport } from '../../features/accuracy/accuracy-report.tsx';
import { useAccuracy } from '../../features/accuracy/get-accuracy.ts';
import { useRuns } from '../../features/runs/list-runs.ts';
import { describeRecipe, runTitle } from '../../features/runs/recipe-text.ts';
import { apiUrl } from '../../lib/fetch-json.ts';
import { formatPercent } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import { useClasses } from '../../lib/project/classes-query.ts';
import { useProject } from '../../lib/project/project-context.ts';

const TITLE = 'Accuracy';

/** How well a run's map agrees with the samples held out from it; `?run=` and `?unit=` choose. */
export function AccuracyPage() {
  const { id, abilities } = useProject();
  const [query] = useSearchParams();
  const runs = useRuns(id, abilities.readAccuracy && abilities.readRuns);
  if (!abilities.readAccuracy) {
    return (
      <Plain>
        <ForbiddenState title="Accuracy is not open to your role">
          Leads, modellers and reviewers read accuracy: whoever draws samples should not see where the map is wrong
          before drawing more. Your project lead gives out roles.
        </ForbiddenState>
      </Plain>
    );
  }
  if (runs.isPending) {
    return (
      <Plain>
        <PendingState label="Loading runs" rows={3} />
      </Plain>
    );
  }
  if (runs.isError && !runs.data) {
    return (
      <Plain>
        <ErrorState error={runs.error} onRetry={() => void runs.refetch()} />
      </Plain>
    );
  }
  const finished = runs.data.filter((run) => run.job.state === 'finished').toSorted((a, b) => b.number - a.number);
  const wantedId = query.get('run');
  const run = wantedId ? finished.find((one) => one.id === wantedId) : finished[0];
  if (run) return <RunAccuracy run={run} finished={finished} />;
  return (
    <Plain>
      {finished.length > 0 ? (
        <NotFoundState
          title="This run has no accuracy"
          action={
            <Link to={paths.accuracy(id)} className={buttonClass('strong')}>
              Open the newest finished run
            </Link>
          }
        >
          It is not finished, or was deleted.
        </NotFoundState>
      ) : (
        <EmptyState
          title="No finished run yet"
          action={
            <Link to={paths.runs(id)} className={buttonClass('primary')}>
              Go to runs
            </Link>
          }
        >
          Accuracy is read from samples a run never saw. Once a run is finished, its confusion matrix and the figures of
          each class stand here, each with its interval.
        </EmptyState>
      )}
    </Plain>
  );
}

function Plain({ children }: { children: React.ReactNode }) {
  return <ReadingPage header={<PageHeader title={TITLE} />}>{children}</ReadingPage>;
}

function RunAccuracy({ run, finished }: { run: Run; finished: readonly Run[] }) {
  const project = useProject();
  const [query, setQuery] = useSearchParams();
  const parsed = accuracyUnitSchema.safeParse(query.get('unit'));
  const unit: AccuracyUnit = parsed.success ? parsed.data : 'pixel';
  const accuracy = useAccuracy(project.id, run.id, unit);
  const classes = useClasses(project.id);
  const choose = (next: { run?: string; unit?: AccuracyUnit }) =>
    setQuery({ run: next.run ?? run.id, unit: next.unit ?? unit }, { replace: true });
  return (
    <ReadingPage
      header={
        <PageHeader
          title={TITLE}
          action={
            <>
              <IconButton label="Print" kind="secondary" icon={<Printer />} onClick={() => window.print()} />
              <a
                href={apiUrl(`/runs/${run.id}/accuracy.csv`, { unit })}
                download
                className={buttonClass('secondary')}
                aria-label="Download the figures as CSV"
              >
                <Download aria-hidden />
                CSV
              </a>
            </>
          }
        >
          <Select
            aria-label="Run"
            size="sm"
            className="w-auto! max-w-64"
            value={run.id}
            onChange={(runId) => choose({ run: runId })}
            options={finished.map((one) => ({ value: one.id, label: runLabel(one) }))}
          />
          <Segmented<AccuracyUnit>
            label="Counted by"
            value={unit}
            onChange={(next) => choose({ unit: next })}
            options={[
              { value: 'pixel', label: 'By pixel' },
              { value: 'polygon', label: 'By polygon' },
            ]}
          />
        </PageHeader>
      }
    >
      {accuracy.isPending && (
        <>
          <PendingState label="Loading the accuracy" rows={3} />
          <PendingState label="Loading the matrix" shape="table" rows={8} className="mt-10" />
        </>
      )}
      {accuracy.isError && !accuracy.data && (
        <ErrorState error={accuracy.error} onRetry={() => void accuracy.refetch()} />
      )}
      {accuracy.data && (
        <AccuracyReport
          key={`${accuracy.data.runId} ${accuracy.data.unit}`}
          projectId={project.id}
          accuracy={accuracy.data}
          runLine={[runTitle(run), run.name, run.sceneName, describeRecipe(run.recipe)].filter(Boolean).join(' · ')}
          runNumber={run.number}
          target={project.targetOverallAccuracy}
          scheme={classes.data ?? []}
        />
      )}
    </ReadingPage>
  );
}

function runLabel(run: Run): string {
  const name = run.name ? `${runTitle(run)}, ${run.name}` : runTitle(run);
  return run.overallAccuracy === null ? name : `${name} (${formatPercent(run.overallAccuracy)})`;
}
