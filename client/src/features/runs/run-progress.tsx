import type { Run } from '../../../../shared/contracts/run.ts';
import { Bud } from '../../components/layout/bud.tsx';
import { STATE_TEXT } from '../../components/layout/stage.ts';
import { Button } from '../../components/ui/button.tsx';
import { ProgressBar } from '../../components/ui/progress-bar.tsx';
import { formatSince } from '../../lib/format-date.ts';
import { formatNumber, formatPercent } from '../../lib/format.ts';
import { runStages } from './run-steps.ts';

interface RunProgressProps {
  run: Run;
  onCancel: () => void;
}

/** A run that waits or works: how far it is, what it does now, and how long it still takes. */
export function RunProgress({ run, onCancel }: RunProgressProps) {
  const { job, abilities } = run;
  const isWaiting = job.state === 'queued';
  return (
    <section aria-label="Progress of the run" className="rounded-xl border border-line bg-card p-5">
      <ProgressBar
        label={isWaiting ? `${job.step} for its turn` : job.step}
        done={job.share * 100}
        total={100}
        countsText={isWaiting ? 'not begun' : formatPercent(Math.floor(job.share * 100) / 100)}
        secondsLeft={isWaiting ? null : job.secondsLeft}
        action={
          abilities.cancel && (
            <Button size="sm" onClick={onCancel}>
              Cancel run
            </Button>
          )
        }
      />
      <ol className="mt-5 space-y-2">
        {runStages(job).map((stage) => (
          <li key={stage.name} className="flex items-center gap-2.5 text-sm">
            <Bud state={stage.state} className="size-[18px] shrink-0" />
            <span className={stage.state === 'empty' ? 'text-ink-soft' : 'font-medium'}>{stage.name}</span>
            <span className="sr-only">, {STATE_TEXT[stage.state]}</span>
            {stage.state === 'part' && job.total > 0 && (
              <span className="text-ink-soft">
                {formatNumber(job.done)} of {formatNumber(job.total)}
              </span>
            )}
          </li>
        ))}
      </ol>
      <p className="mt-5 border-t border-line pt-3 text-sm text-ink-soft">
        Started by {run.startedBy?.name ?? 'someone who left'}, {formatSince(run.createdAt)}. You can leave this page:
        the run goes on, and goes on again after a restart of the server.
      </p>
    </section>
  );
}
