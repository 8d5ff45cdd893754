import { Link } from 'react-router-dom';
import type { QueueEntry } from '../../../../shared/contracts/queue.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { Button, buttonClass } from '../../components/ui/button.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { sayProblem } from '../../components/ui/toaster.tsx';
import { PriorityChoice } from '../../features/queue/priority-choice.tsx';
import { QueueList } from '../../features/queue/queue-list.tsx';
import { useCancelJob, useQueue } from '../../features/queue/queue-queries.ts';
import { formatCount } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';

/** What works and what waits, this project's own and that of others without its name. */
export function QueuePage() {
  const { abilities } = useProject();
  if (!abilities.readRuns) {
    return (
      <ReadingPage header={<PageHeader title="Queue" />}>
        <ForbiddenState />
      </ReadingPage>
    );
  }
  return <ProjectQueue />;
}

function ProjectQueue() {
  const { id, abilities } = useProject();
  const queue = useQueue(id);
  const cancel = useCancelJob(id);
  const entries = queue.data?.entries ?? [];
  const nWaiting = entries.filter(({ state }) => state === 'queued').length;
  const actionsOf = ({ jobId, title, kind, state, priority }: QueueEntry) => {
    if (jobId === null || !queue.data || kind === 'ingest') return null;
    const { prioritise, cancel: mayCancel } = queue.data.abilities;
    return (
      <>
        {prioritise && state === 'queued' && (
          <PriorityChoice projectId={id} jobId={jobId} title={title} priority={priority} />
        )}
        {mayCancel && (
          <Button
            size="sm"
            aria-label={`Cancel ${title}`}
            isPending={cancel.isPending && cancel.variables === jobId}
            onClick={() => cancel.mutate(jobId, { onError: sayProblem })}
          >
            Cancel
          </Button>
        )}
      </>
    );
  };
  return (
    <ReadingPage
      header={
        <PageHeader title="Queue" crumb={queue.data && `${formatCount(nWaiting, 'job')} waiting`}>
          <Link to={paths.runs(id)} className="link text-sm">
            All runs
          </Link>
        </PageHeader>
      }
    >
      {queue.isPending && <PendingState label="Loading the queue" rows={4} />}
      {queue.isError && !queue.data && <ErrorState error={queue.error} onRetry={() => void queue.refetch()} />}
      {queue.data && entries.length === 0 && (
        <EmptyState
          title="Nothing works and nothing waits"
          action={
            abilities.startRuns && (
              <Link to={paths.newRun(id)} className={buttonClass('strong')}>
                New run
              </Link>
            )
          }
        >
          Runs, reproductions and tunings show here from when they are asked for until they end.
        </EmptyState>
      )}
      {entries.length > 0 && <QueueList entries={entries} projectId={id} actionsOf={actionsOf} />}
      {queue.data && entries.length > 0 && (
        <p className="mt-6 max-w-3xl text-sm text-ink-soft">
          {formatCount(queue.data.projectLimit, 'long job')} of a project works at a time. Priority says which of this
          project’s own jobs goes first; it moves nothing before the work of other projects.
        </p>
      )}
    </ReadingPage>
  );
}
