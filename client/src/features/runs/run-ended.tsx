import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import type { Run } from '../../../../shared/contracts/run.ts';
import { buttonClass } from '../../components/ui/button.tsx';
import { formatDateTime } from '../../lib/format-date.ts';
import { paths } from '../../lib/paths.ts';

interface RunEndedProps {
  run: Run;
  mayStart: boolean;
  /** Buttons that try it again as it is. */
  retry?: ReactNode;
}

/** A run that made no map: why, and what to do. */
export function RunEnded({ run, mayStart, retry }: RunEndedProps) {
  const { job } = run;
  const isFailed = job.state === 'failed';
  return (
    <section
      role={isFailed ? 'alert' : undefined}
      className={`rounded-xl border bg-card px-6 py-5 ${isFailed ? 'border-rust' : 'border-line'}`}
    >
      <h2 className="text-xl font-semibold tracking-tight">
        {isFailed ? 'This run failed' : 'This run was cancelled'}
      </h2>
      {isFailed && <p className="mt-1">{job.error ?? 'The server gave no reason; its log has more.'}</p>}
      <p className="mt-1 text-ink-soft">
        {isFailed
          ? 'What it had made is kept: trying again goes on from there. Where the recipe is to blame, start anew with it; the form checks it first.'
          : 'Nothing of it is kept but its recipe and snapshot; trying again begins anew with them.'}
        {job.endedAt && ` It ended on ${formatDateTime(job.endedAt)}.`}
      </p>
      {mayStart && (
        <div className="mt-4 flex flex-wrap gap-2">
          {retry}
          <Link to={paths.newRun(run.projectId, run.id)} className={buttonClass(retry ? 'secondary' : 'primary')}>
            Use this recipe again
          </Link>
        </div>
      )}
    </section>
  );
}
