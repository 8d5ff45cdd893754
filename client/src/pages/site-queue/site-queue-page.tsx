import { ArrowUp } from 'lucide-react';
import { useOutletContext } from 'react-router-dom';
import type { Account } from '../../../../shared/contracts/account.ts';
import type { QueueEntry } from '../../../../shared/contracts/queue.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { Button } from '../../components/ui/button.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { sayProblem } from '../../components/ui/toaster.tsx';
import { QueueList } from '../../features/queue/queue-list.tsx';
import { useOrderSiteQueue, useSiteQueue } from '../../features/queue/queue-queries.ts';

/** The queue of all projects, for site administrators, who may put jobs first. */
export function SiteQueuePage() {
  const { siteAdmin } = useOutletContext<Account>();
  if (!siteAdmin) {
    return (
      <ReadingPage header={<PageHeader title="Queue of all projects" />}>
        <ForbiddenState title="This is for site administrators">
          Each project has the queue as it concerns it beside its runs.
        </ForbiddenState>
      </ReadingPage>
    );
  }
  return <AllProjects />;
}

function AllProjects() {
  const queue = useSiteQueue();
  const order = useOrderSiteQueue();
  const entries = queue.data?.entries ?? [];
  const placed = entries.filter(({ isPlaced }) => isPlaced).flatMap(({ jobId }) => jobId ?? []);
  const put = (jobIds: readonly string[]) => order.mutate(jobIds, { onError: sayProblem });
  const actionsOf = ({ jobId, title, state, isPlaced }: QueueEntry) => {
    if (jobId === null || state === 'running') return null;
    const at = placed.indexOf(jobId);
    const others = placed.filter((id) => id !== jobId);
    return (
      <>
        {at !== 0 && (
          <Button
            size="sm"
            icon={<ArrowUp />}
            aria-label={at > 0 ? `Move ${title} up` : `Put ${title} before all others`}
            isPending={order.isPending}
            onClick={() => put(at > 0 ? others.toSpliced(at - 1, 0, jobId) : [jobId, ...others])}
          >
            {at > 0 ? 'Up' : 'First'}
          </Button>
        )}
        {isPlaced && (
          <Button
            size="sm"
            kind="ghost"
            aria-label={`Give ${title} its fair turn`}
            isPending={order.isPending}
            onClick={() => put(others)}
          >
            Fair turn
          </Button>
        )}
      </>
    );
  };
  return (
    <ReadingPage
      header={
        <PageHeader
          title="Queue of all projects"
          action={
            placed.length > 0 && (
              <Button isPending={order.isPending} onClick={() => put([])}>
                Everyone a fair turn
              </Button>
            )
          }
        />
      }
    >
      {queue.isPending && <PendingState label="Loading the queue" rows={4} />}
      {queue.isError && !queue.data && <ErrorState error={queue.error} onRetry={() => void queue.refetch()} />}
      {queue.data && entries.length === 0 && (
        <EmptyState title="Nothing works and nothing waits">
          Work of all projects shows here. What is put first goes before every fair turn.
        </EmptyState>
      )}
      {entries.length > 0 && <QueueList entries={entries} actionsOf={actionsOf} />}
    </ReadingPage>
  );
}
