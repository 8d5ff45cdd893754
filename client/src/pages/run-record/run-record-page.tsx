import { Link, useParams } from 'react-router-dom';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage, Section } from '../../components/layout/reading-page.tsx';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { JobLogPanel } from '../../features/queue/job-log-panel.tsx';
import { ReproductionPart } from '../../features/reproduction/reproduction-part.tsx';
import { useRun } from '../../features/runs/get-run.ts';
import { RecipeSummary } from '../../features/runs/recipe-summary.tsx';
import { runTitle } from '../../features/runs/recipe-text.ts';
import { isUnderWay, RunStateTag } from '../../features/runs/run-state-tag.tsx';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useScenes } from '../../lib/project/scenes-query.ts';

/** How a run was made: whether it comes out the same again, its log, its recipe. */
export function RunRecordPage() {
  const { id, abilities } = useProject();
  const { runId = '' } = useParams();
  const run = useRun(id, abilities.readRuns ? runId : null);
  const scenes = useScenes(id);
  const title = run.data ? `How ${runTitle(run.data).toLowerCase()} was made` : 'How a run was made';
  return (
    <ReadingPage
      header={
        <PageHeader title={title} crumb={run.data?.name || undefined}>
          {run.data && <RunStateTag job={run.data.job} />}
          <Link to={paths.run(id, runId)} className="link text-sm">
            To the run
          </Link>
        </PageHeader>
      }
    >
      {!abilities.readRuns && <ForbiddenState />}
      {abilities.readRuns && run.isPending && <PendingState label="Loading the run" rows={6} />}
      {run.isError && !run.data && <ErrorState error={run.error} onRetry={() => void run.refetch()} />}
      {run.data && (
        <div className="grid items-start gap-10 lg:grid-cols-[minmax(0,1fr)_22rem]">
          <div className="space-y-9">
            {run.data.job.state === 'finished' && <ReproductionPart projectId={id} runId={runId} />}
            <JobLogPanel projectId={id} jobId={run.data.job.id} isUnderWay={isUnderWay(run.data.job)} />
          </div>
          <div className="text-sm">
            <Section title="Recipe">
              <RecipeSummary
                run={run.data}
                scene={scenes.data?.find((one) => one.id === run.data.recipe.sceneId) ?? null}
              />
            </Section>
          </div>
        </div>
      )}
    </ReadingPage>
  );
}
