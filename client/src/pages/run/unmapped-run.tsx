import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { Run } from '../../../../shared/contracts/run.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage, Section } from '../../components/layout/reading-page.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { JobLogPanel } from '../../features/queue/job-log-panel.tsx';
import { CancelRunDialog } from '../../features/runs/cancel-run-dialog.tsx';
import { RecipeSummary } from '../../features/runs/recipe-summary.tsx';
import { runTitle } from '../../features/runs/recipe-text.ts';
import { RunEnded } from '../../features/runs/run-ended.tsx';
import { RunProgress } from '../../features/runs/run-progress.tsx';
import { RunStateTag, isUnderWay } from '../../features/runs/run-state-tag.tsx';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { RetryButtons } from './retry-buttons.tsx';
import { RunMenu } from './run-menu.tsx';

/** A run without a map: under way, failed or cancelled. */
export function UnmappedRun({ run, scene }: { run: Run; scene: Scene | null }) {
  const { id, abilities } = useProject();
  const [isCancelling, setIsCancelling] = useState(false);
  const isWorking = isUnderWay(run.job);
  return (
    <ReadingPage
      header={
        <PageHeader
          title={runTitle(run)}
          crumb={run.name || undefined}
          progress={isWorking ? run.job.share : null}
          action={<RunMenu run={run} />}
        >
          <RunStateTag job={run.job} />
          <Link to={paths.runs(id)} className="link text-sm">
            All runs
          </Link>
        </PageHeader>
      }
    >
      <div className="grid items-start gap-10 lg:grid-cols-[minmax(0,1fr)_24rem]">
        {isWorking ? (
          <RunProgress run={run} onCancel={() => setIsCancelling(true)} />
        ) : run.job.state === 'finished' ? (
          <PendingState label="Loading the map" shape="block" />
        ) : (
          <RunEnded
            run={run}
            mayStart={abilities.startRuns}
            retry={run.abilities.retry && <RetryButtons run={run} />}
          />
        )}
        <div className="space-y-8 text-sm lg:row-span-2">
          <Section title="Recipe">
            <RecipeSummary run={run} scene={scene} />
          </Section>
          {run.notes.length > 0 && (
            <Section title="Notes">
              <ul className="list-disc space-y-1 pl-4">
                {run.notes.map((note) => (
                  <li key={note}>{note}</li>
                ))}
              </ul>
            </Section>
          )}
        </div>
        <JobLogPanel projectId={id} jobId={run.job.id} isUnderWay={isWorking} />
      </div>
      <CancelRunDialog run={run} isOpen={isCancelling && isWorking} onOpenChange={setIsCancelling} />
    </ReadingPage>
  );
}
