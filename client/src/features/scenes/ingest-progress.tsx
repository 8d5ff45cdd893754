import type { Scene } from '../../../../shared/contracts/scene.ts';
import { Button } from '../../components/ui/button.tsx';
import { ProgressBar } from '../../components/ui/progress-bar.tsx';
import { sayProblem } from '../../components/ui/toaster.tsx';
import { formatNumber, formatPercent } from '../../lib/format.ts';
import { useCancelIngest } from './cancel-ingest.ts';

interface IngestProgressProps {
  scene: Scene;
  canCancel: boolean;
  className?: string;
}

/** How far the ingest of a scene is, and the way to stop it. */
export function IngestProgress({ scene, canCancel, className }: IngestProgressProps) {
  const cancel = useCancelIngest(scene.projectId);
  const { job } = scene;
  const isRunning = job?.state === 'running';
  return (
    <div className={className}>
      <ProgressBar
        label={isRunning ? job.step : 'Waiting for its turn'}
        done={job?.share ?? 0}
        total={1}
        countsText={
          isRunning && job.total > 0
            ? `${formatNumber(job.done)} of ${formatNumber(job.total)} · ${formatPercent(job.share)}`
            : formatPercent(job?.share ?? 0)
        }
        secondsLeft={job?.secondsLeft}
        action={
          canCancel && (
            <Button
              size="sm"
              isPending={cancel.isPending}
              pendingLabel="Cancelling…"
              onClick={() => cancel.mutate(scene.id, { onError: sayProblem })}
            >
              Cancel ingest
            </Button>
          )
        }
      />
      <p className="mt-1 text-xs text-ink-soft">The server does this on its own: you can leave the page.</p>
    </div>
  );
}
