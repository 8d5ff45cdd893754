import { CircleAlert, Download, TriangleAlert } from 'lucide-react';
import { Section } from '../../components/layout/reading-page.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { apiUrl } from '../../lib/fetch-json.ts';
import { useJobLog } from './job-log-query.ts';

interface JobLogPanelProps {
  projectId: string;
  jobId: string;
  isUnderWay: boolean;
}

const clock = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit', second: '2-digit' });

/** What a job did, in words, line by line. */
export function JobLogPanel({ projectId, jobId, isUnderWay }: JobLogPanelProps) {
  const log = useJobLog(projectId, jobId, isUnderWay);
  return (
    <Section
      title="Log"
      note="Steps with their counts and durations, warnings, and why work failed."
      action={
        <a href={apiUrl(`/jobs/${jobId}/log.txt`)} download className={buttonClass('secondary', 'sm')}>
          <Download aria-hidden />
          Save log
        </a>
      }
    >
      {log.isPending && <PendingState label="Loading the log" rows={5} />}
      {log.isError && !log.data && <ErrorState error={log.error} onRetry={() => void log.refetch()} />}
      {log.data?.length === 0 && (
        <p className="text-sm text-ink-soft">
          {isUnderWay ? 'Nothing yet: the work waits for its turn.' : 'No log was kept of this work.'}
        </p>
      )}
      {log.data && log.data.length > 0 && (
        <ol aria-live="off" className="divide-y divide-line rounded-lg border border-line bg-card text-sm">
          {log.data.map(({ at, level, text }, index) => (
            <li key={index} className="flex gap-3 px-3.5 py-1.5">
              <time dateTime={at} className="shrink-0 text-ink-soft tabular-nums">
                {clock.format(new Date(at))}
              </time>
              <span className={`min-w-0 break-words ${level === 'error' ? 'font-medium text-rust' : ''}`}>
                <LevelMark level={level} />
                {text}
              </span>
            </li>
          ))}
        </ol>
      )}
    </Section>
  );
}

function LevelMark({ level }: { level: 'info' | 'warning' | 'error' }) {
  if (level === 'info') return null;
  const Icon = level === 'error' ? CircleAlert : TriangleAlert;
  return (
    <>
      <Icon aria-hidden className="mr-1.5 inline size-4 align-[-3px]" />
      <span className="sr-only">{level === 'error' ? 'Error: ' : 'Warning: '}</span>
    </>
  );
}
