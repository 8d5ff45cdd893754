import { Trash2 } from 'lucide-react';
import { useState } from 'react';
import { Link, useNavigate, useParams } from 'react-router-dom';
import type { Tuning } from '../../../../shared/contracts/tuning.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage, Section } from '../../components/layout/reading-page.tsx';
import { ForbiddenState, NotFoundState } from '../../components/ui/access-states.tsx';
import { Button, buttonClass } from '../../components/ui/button.tsx';
import { ConfirmDialog } from '../../components/ui/confirm-dialog.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { ProgressBar } from '../../components/ui/progress-bar.tsx';
import { sayProblem } from '../../components/ui/toaster.tsx';
import { JobLogPanel } from '../../features/queue/job-log-panel.tsx';
import { useCancelJob } from '../../features/queue/queue-queries.ts';
import { describeRecipe } from '../../features/runs/recipe-text.ts';
import { isUnderWay, RunStateTag } from '../../features/runs/run-state-tag.tsx';
import { TrialChart } from '../../features/tuning/trial-chart.tsx';
import { TrialTable } from '../../features/tuning/trial-table.tsx';
import { useDeleteTuning, useTuning } from '../../features/tuning/tuning-queries.ts';
import { formatCount, formatNumber, formatPercent } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import { asProblem, ProblemError } from '../../lib/problem-error.ts';
import { useProject } from '../../lib/project/project-context.ts';

/** One search: its progress, and what came of its trials. */
export function TuningPage() {
  const { id, abilities } = useProject();
  const { tuningId = '' } = useParams();
  const tuning = useTuning(id, abilities.startRuns ? tuningId : null);
  if (tuning.data) return <TuningReport tuning={tuning.data} />;
  const isGone = tuning.error instanceof ProblemError && [400, 404].includes(tuning.error.status);
  return (
    <ReadingPage header={<PageHeader title="Tuning" />}>
      {!abilities.startRuns ? (
        <ForbiddenState>Leads and modellers tune classifiers. Your project lead gives out roles.</ForbiddenState>
      ) : isGone ? (
        <NotFoundState
          title="No such search"
          action={
            <Link to={paths.tunings(id)} className={buttonClass('strong')}>
              To the searches
            </Link>
          }
        >
          It may have been deleted, or the address has a slip in it.
        </NotFoundState>
      ) : tuning.isError ? (
        <ErrorState error={tuning.error} onRetry={() => void tuning.refetch()} />
      ) : (
        <PendingState label="Loading the search" rows={6} />
      )}
    </ReadingPage>
  );
}

function TuningReport({ tuning }: { tuning: Tuning }) {
  const { id } = useProject();
  const navigate = useNavigate();
  const cancel = useCancelJob(id);
  const remove = useDeleteTuning(id);
  const [isDeleting, setIsDeleting] = useState(false);
  const { job, trials, bestTrial, plan } = tuning;
  const isWorking = job !== null && isUnderWay(job);
  const best = trials.find(({ number }) => number === bestTrial);
  return (
    <ReadingPage
      header={
        <PageHeader
          title={tuning.name || 'Tuning'}
          crumb={describeRecipe(tuning.recipe)}
          progress={isWorking ? job.share : null}
          action={
            <>
              {tuning.abilities.delete && (
                <Button icon={<Trash2 />} onClick={() => setIsDeleting(true)}>
                  Delete…
                </Button>
              )}
              {best && (
                <Link to={paths.newRunByTrial(id, tuning.id, best.number)} className={buttonClass('primary')}>
                  Use the best settings
                </Link>
              )}
            </>
          }
        >
          {job && <RunStateTag job={job} />}
          <Link to={paths.tunings(id)} className="link text-sm">
            All searches
          </Link>
        </PageHeader>
      }
    >
      <div className="space-y-9">
        {isWorking && (
          <ProgressBar
            label={job.state === 'queued' ? 'Waiting for its turn' : job.step}
            done={job.share * 100}
            total={100}
            countsText={`${formatNumber(job.done)} of ${formatNumber(job.total)}`}
            secondsLeft={job.secondsLeft}
            action={
              tuning.abilities.cancel && (
                <Button
                  size="sm"
                  isPending={cancel.isPending}
                  onClick={() => cancel.mutate(job.id, { onError: sayProblem })}
                >
                  Cancel search
                </Button>
              )
            }
          />
        )}
        {job?.state === 'failed' && (
          <p role="alert" className="rounded-xl border border-rust bg-card px-5 py-4">
            The search failed: {job.error}
          </p>
        )}
        {best && (
          <p className="max-w-3xl text-lg">
            Trial {best.number} did best: <span className="font-semibold">{formatPercent(best.meanAccuracy, 1)}</span>{' '}
            on average over {formatCount(plan.folds, 'fold')} of{' '}
            {formatCount(tuning.nTrainingPolygons, 'training polygon')}, spread {formatPercent(best.spread, 1)}.{' '}
            <span className="text-ink-soft">
              The best of several is a little too good by chance; the run’s held-out samples give its accuracy.
            </span>
          </p>
        )}
        <TrialChart tuning={tuning} />
        <Section title="Trials">
          <TrialTable tuning={tuning} />
        </Section>
        {tuning.notes.length > 0 && (
          <Section title="Notes">
            <ul className="list-disc space-y-1 pl-4 text-sm">
              {tuning.notes.map((note) => (
                <li key={note}>{note}</li>
              ))}
            </ul>
          </Section>
        )}
        {job && <JobLogPanel projectId={id} jobId={job.id} isUnderWay={isWorking} />}
      </div>
      <ConfirmDialog
        isOpen={isDeleting}
        onOpenChange={setIsDeleting}
        title="Delete this search?"
        loses={['Its trials and their figures', 'Its log']}
        keeps="Runs started with its settings stay."
        confirmLabel="Delete search"
        isPending={remove.isPending}
        error={remove.error ? asProblem(remove.error) : null}
        onConfirm={() =>
          remove.mutate(tuning.id, { onSuccess: () => void navigate(paths.tunings(id), { replace: true }) })
        }
      />
    </ReadingPage>
  );
}
