import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import type { QueueEntry } from '../../../../shared/contracts/queue.ts';
import { ProgressBar } from '../../components/ui/progress-bar.tsx';
import { classNames } from '../../lib/class-names.ts';
import { formatSince } from '../../lib/format-date.ts';
import { formatDuration, formatPercent } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';

interface QueueListProps {
  entries: readonly QueueEntry[];
  /** Where a run's title leads; without it, titles are plain. */
  projectId?: string;
  /** Controls of a row. */
  actionsOf: (entry: QueueEntry) => ReactNode;
}

const LANES: readonly { lane: QueueEntry['lane']; title: string; note: string }[] = [
  {
    lane: 'long',
    title: 'Runs, tunings and reproductions',
    note: 'Projects take turns: next is the project with the least at work, then the one served longest ago.',
  },
  { lane: 'short', title: 'Short work', note: 'Previews and outlines; they wait for no run.' },
  { lane: 'intake', title: 'Scenes being taken in', note: 'One at a time, in turns between projects.' },
];

/** What works and what waits, lane by lane, in the order of its turns. */
export function QueueList({ entries, projectId, actionsOf }: QueueListProps) {
  return (
    <div className="space-y-8">
      {LANES.map(({ lane, title, note }) => {
        const rows = entries.filter((entry) => entry.lane === lane);
        if (rows.length === 0) return null;
        return (
          <section key={lane} aria-label={title}>
            <h2 className="text-lg font-semibold">{title}</h2>
            <p className="mb-3 text-sm text-ink-soft">{note}</p>
            <ol className="divide-y divide-line rounded-xl border border-line bg-card">
              {rows.map((entry, index) => (
                <QueueRow
                  key={entry.jobId ?? `other-${index}`}
                  entry={entry}
                  {...(projectId && { projectId })}
                  actions={actionsOf(entry)}
                />
              ))}
            </ol>
          </section>
        );
      })}
    </div>
  );
}

function QueueRow({ entry, projectId, actions }: { entry: QueueEntry; projectId?: string; actions: ReactNode }) {
  const isWorking = entry.state === 'running';
  const isOther = entry.jobId === null;
  return (
    <li className={classNames('flex flex-wrap items-center gap-x-5 gap-y-2 px-4 py-3', isOther && 'text-ink-soft')}>
      <span className="w-16 shrink-0 text-sm">
        {isWorking ? 'at work' : <>{entry.position === 1 ? 'next' : `place ${entry.position}`}</>}
      </span>
      <span className="min-w-48 grow">
        <span className="font-medium">
          {projectId && entry.runId ? (
            <Link to={paths.run(projectId, entry.runId)} className="text-ink hover:text-spruce hover:underline">
              {entry.title}
            </Link>
          ) : (
            entry.title
          )}
        </span>
        <span className="block text-sm text-ink-soft">
          {[
            entry.projectName,
            entry.priority !== 'normal' && !isOther && `${entry.priority} priority`,
            entry.isPlaced && 'placed by an administrator',
            `asked ${formatSince(entry.queuedAt)}`,
          ]
            .filter(Boolean)
            .join(' · ')}
        </span>
      </span>
      <span className="w-64 text-sm max-lg:w-full">
        {isWorking ? (
          <ProgressBar
            label={entry.step || 'Working'}
            done={entry.share * 100}
            total={100}
            countsText={formatPercent(Math.floor(entry.share * 100) / 100)}
            secondsLeft={entry.secondsLeft}
          />
        ) : (
          <span className="text-ink-soft">{sayStart(entry.startsInSeconds)}</span>
        )}
      </span>
      <span className="flex min-w-40 items-center justify-end gap-2">{actions}</span>
    </li>
  );
}

function sayStart(seconds: number | null): string {
  if (seconds === null) return 'Start not foreseeable yet';
  if (seconds < 10) return 'Starts in a few seconds';
  return `Starts in about ${formatDuration(seconds < 60 ? Math.ceil(seconds / 10) * 10 : Math.ceil(seconds / 60) * 60)}`;
}
