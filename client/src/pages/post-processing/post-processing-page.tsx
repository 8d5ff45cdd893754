import { Link, useParams } from 'react-router-dom';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { ForbiddenState, NotFoundState } from '../../components/ui/access-states.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { usePostProcessing } from '../../features/post-processing/post-processing-queries.ts';
import { useRun } from '../../features/runs/get-run.ts';
import { paths } from '../../lib/paths.ts';
import { ProblemError } from '../../lib/problem-error.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useScenes } from '../../lib/project/scenes-query.ts';
import { PostProcessingDesk } from './post-processing-desk.tsx';

/** What is done to a run's map after the classifier. */
export function PostProcessingPage() {
  const { id, abilities } = useProject();
  const { runId = '' } = useParams();
  const run = useRun(id, abilities.readRuns ? runId : null);
  const list = usePostProcessing(id, abilities.readRuns ? runId : null);
  const scenes = useScenes(id);
  if (run.data && list.data && scenes.data) {
    const scene = scenes.data.find((one) => one.id === run.data.recipe.sceneId) ?? null;
    return <PostProcessingDesk key={runId} run={run.data} list={list.data} scene={scene} />;
  }
  const failed = [run, list, scenes].find((one) => one.isError && !one.data);
  const isMissing = failed?.error instanceof ProblemError && [400, 404].includes(failed.error.status);
  return (
    <ReadingPage
      header={
        <PageHeader title="Post-processing">
          <Link to={paths.run(id, runId)} className="link text-sm">
            To the run
          </Link>
        </PageHeader>
      }
    >
      {!abilities.readRuns ? (
        <ForbiddenState />
      ) : isMissing ? (
        <NotFoundState title="No map to work on">The run is not there, or has no class map yet.</NotFoundState>
      ) : failed ? (
        <ErrorState error={failed.error} onRetry={() => void failed.refetch()} />
      ) : (
        <PendingState label="Loading the steps" rows={6} />
      )}
    </ReadingPage>
  );
}
