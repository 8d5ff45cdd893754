import { CircleAlert, CircleCheck, TriangleAlert } from 'lucide-react';
import type { Reproduction } from '../../../../shared/contracts/reproduction.ts';
import { Section } from '../../components/layout/reading-page.tsx';
import { Button } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { ProgressBar } from '../../components/ui/progress-bar.tsx';
import { sayProblem } from '../../components/ui/toaster.tsx';
import { formatDateTime } from '../../lib/format-date.ts';
import { formatCount, formatDuration, formatPercent } from '../../lib/format.ts';
import { useReproduceRun, useReproductions } from './reproduction-queries.ts';

/** Whether a run comes out the same again: what was tried, by whom, when, and what came of it. */
export function ReproductionPart({ projectId, runId }: { projectId: string; runId: string }) {
  const list = useReproductions(projectId, runId);
  const reproduce = useReproduceRun(projectId);
  const rows = list.data?.reproductions ?? [];
  const isUnderWay = rows.some(isAtWork);
  return (
    <Section
      title="Reproduction"
      note="Makes the class map once more from the stored recipe and snapshot, apart from this run, and compares the bytes."
      action={
        list.data?.abilities.reproduce && (
          <Button
            kind="strong"
            size="sm"
            isPending={reproduce.isPending}
            disabled={isUnderWay}
            onClick={() => reproduce.mutate(runId, { onError: sayProblem })}
          >
            Reproduce
          </Button>
        )
      }
    >
      {list.isPending && <PendingState label="Loading reproductions" rows={2} />}
      {list.isError && !list.data && <ErrorState error={list.error} onRetry={() => void list.refetch()} />}
      {list.data && rows.length === 0 && <p className="text-sm text-ink-soft">Nobody has reproduced this run yet.</p>}
      {rows.length > 0 && (
        <ul className="divide-y divide-line rounded-xl border border-line bg-card">
          {rows.map((row) => (
            <li key={row.id} className="px-4 py-3">
              <ReproductionRow row={row} />
            </li>
          ))}
        </ul>
      )}
    </Section>
  );
}

function isAtWork({ job }: Reproduction): boolean {
  return job?.state === 'queued' || job?.state === 'running';
}

function ReproductionRow({ row }: { row: Reproduction }) {
  const { job, verdict, checks, missing, seconds, threads, askedBy, createdAt } = row;
  const by = `${askedBy?.name ?? (job ? 'Someone who left' : 'By command on the server')}, ${formatDateTime(createdAt)}`;
  if (job && isAtWork(row)) {
    const isWaiting = job.state === 'queued';
    return (
      <ProgressBar
        label={isWaiting ? 'Waiting for its turn' : job.step}
        done={job.share * 100}
        total={100}
        countsText={isWaiting ? by : formatPercent(Math.floor(job.share * 100) / 100)}
        secondsLeft={isWaiting ? null : job.secondsLeft}
      />
    );
  }
  return (
    <>
      <p className="font-medium">
        <VerdictLine row={row} />
      </p>
      <p className="text-sm text-ink-soft">
        {by}
        {seconds !== null && ` · ${formatDuration(seconds)} with ${formatCount(threads, 'thread')}`}
      </p>
      {missing.length > 0 && (
        <ul className="mt-1.5 list-disc space-y-0.5 pl-5 text-sm">
          {missing.map((text) => (
            <li key={text}>{text}</li>
          ))}
        </ul>
      )}
      {checks.map(({ what, expectedSha256, foundSha256 }) => (
        <div key={what} className="mt-1.5 text-xs">
          <p className="text-ink-soft">{what}, SHA-256</p>
          <p className="break-all select-all">{expectedSha256}</p>
          {verdict === 'different' && expectedSha256 !== foundSha256 && (
            <p className="break-all text-rust select-all">came out as {foundSha256}</p>
          )}
        </div>
      ))}
    </>
  );
}

/** What came of an attempt, in a line that does not rest on its colour. */
function VerdictLine({ row: { verdict, job } }: { row: Reproduction }) {
  if (verdict === 'same') {
    return (
      <span className="text-spruce">
        <CircleCheck aria-hidden className="mr-1.5 inline size-4 align-[-3px]" />
        The same class map, byte for byte
      </span>
    );
  }
  if (verdict === 'different') {
    return (
      <span className="text-rust">
        <CircleAlert aria-hidden className="mr-1.5 inline size-4 align-[-3px]" />A different class map came out
      </span>
    );
  }
  return (
    <span className={verdict === 'impossible' ? 'text-rust' : undefined}>
      <TriangleAlert aria-hidden className="mr-1.5 inline size-4 align-[-3px]" />
      {verdict === 'impossible'
        ? 'It cannot be made again: an input is gone or changed'
        : job?.state === 'failed'
          ? `The attempt failed: ${job.error ?? 'its log has more'}`
          : 'The attempt was cancelled'}
    </span>
  );
}
