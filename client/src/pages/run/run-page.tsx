import { Link, useParams } from 'react-router-dom';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { ForbiddenState, NotFoundState } from '../../components/ui/access-states.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { useRun } from '../../features/runs/get-run.ts';
import { paths } from '../../lib/paths.ts';
import { ProblemError } from '../../lib/problem-error.ts';
import { useClasses } from '../../lib/project/classes-query.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useScenes } from '../../lib/project/scenes-query.ts';
import { FinishedRun } from './finished-run.tsx';
import { UnmappedRun } from './unmapped-run.tsx';

/** One run: its progress, its failure, or its map. */
export function RunPage() {
  const project = useProject();
  const { runId = '' } = useParams();
  const isOpen = project.abilities.readRuns;
  const run = useRun(project.id, isOpen ? runId : null);
  const scenes = useScenes(project.id);
  const classes = useClasses(project.id);
  if (!isOpen) {
    return (
      <Plain>
        <ForbiddenState />
      </Plain>
    );
  }
  if (run.error instanceof ProblemError && (run.error.status === 404 || run.error.status === 400)) {
    return (
      <Plain>
        <NotFoundState
          title="No such run"
          action={
            <Link to={paths.runs(project.id)} className={buttonClass('strong')}>
              To the runs
            </Link>
          }
        >
          It may have been deleted, or the address has a slip in it.
        </NotFoundState>
      </Plain>
    );
  }
  const failed = [run, scenes].find((one) => one.isError && !one.data);
  if (failed) {
    return (
      <Plain>
        <ErrorState error={failed.error} onRetry={() => void failed.refetch()} />
      </Plain>
    );
  }
  if (!run.data || !scenes.data) {
    return (
      <Plain>
        <PendingState label="Loading the run" rows={6} />
      </Plain>
    );
  }
  const { data } = run;
  const scene = scenes.data.find((one) => one.id === data.recipe.sceneId) ?? null;
  const scheme = classes.data ?? [];
  // The event that ends a run comes before its areas are asked for: until then it is not shown as a map.
  return data.job.state === 'finished' && data.areas ? (
    <FinishedRun key={data.id} run={data} scene={scene} scheme={scheme} />
  ) : (
    <UnmappedRun run={data} scene={scene} />
  );
}

function Plain({ children }: { children: React.ReactNode }) {
  return <ReadingPage header={<PageHeader title="Run" />}>{children}</ReadingPage>;
}
