import { Link } from 'react-router-dom';
import { Plus } from 'lucide-react';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { useRuns } from '../../features/runs/list-runs.ts';
import { RunsTable } from '../../features/runs/runs-table.tsx';
import { isUnderWay } from '../../features/runs/run-state-tag.tsx';
import { formatCount } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { NoRunYet } from './no-run-yet.tsx';

/** The project's runs. */
export function RunsPage() {
  const { abilities } = useProject();
  if (!abilities.readRuns) {
    return (
      <ReadingPage header={<PageHeader title="Runs" />}>
        <ForbiddenState />
      </ReadingPage>
    );
  }
  return <RunList />;
}

function RunList() {
  const project = useProject();
  const runs = useRuns(project.id);
  const list = runs.data ?? [];
  const working = list.find((run) => run.job.state === 'running');
  const nUnderWay = list.filter((run) => isUnderWay(run.job)).length;
  return (
    <ReadingPage
      header={
        <PageHeader
          title="Runs"
          crumb={nUnderWay > 0 ? `${formatCount(nUnderWay, 'run')} under way` : undefined}
          progress={working?.job.share ?? null}
          action={
            project.abilities.startRuns &&
            list.length > 0 && (
              <Link to={paths.newRun(project.id)} className={buttonClass('primary')}>
                <Plus aria-hidden />
                New run
              </Link>
            )
          }
        >
          <nav aria-label="More about runs" className="flex gap-x-4 text-sm">
            <Link to={paths.queue(project.id)} className="link">
              Queue
            </Link>
            <Link to={paths.recipes(project.id)} className="link">
              Recipes
            </Link>
            {project.abilities.startRuns && (
              <Link to={paths.tunings(project.id)} className="link">
                Tuning
              </Link>
            )}
          </nav>
        </PageHeader>
      }
    >
      {runs.isPending && <PendingState label="Loading runs" shape="table" rows={5} />}
      {runs.isError && !runs.data && <ErrorState error={runs.error} onRetry={() => void runs.refetch()} />}
      {runs.data && list.length === 0 && <NoRunYet />}
      {list.length > 0 && (
        <>
          <p className="mb-4 max-w-3xl text-sm text-ink-soft">
            A run learns from the samples, maps the whole scene, and is measured against the samples held out from it.
            {project.abilities.readAccuracy &&
              ' Accuracies are by pixel with their 95 % interval; they describe the held-out samples, not the map.'}
          </p>
          {project.abilities.readAccuracy && list.filter((run) => run.job.state === 'finished').length > 1 && (
            <p className="mb-4 text-sm">
              <Link to={paths.compareRuns(project.id)} className="link">
                Compare two runs
              </Link>
            </p>
          )}
          <RunsTable runs={list} showsAccuracy={project.abilities.readAccuracy} />
        </>
      )}
    </ReadingPage>
  );
}
