import { RotateCw } from 'lucide-react';
import type { Run } from '../../../../shared/contracts/run.ts';
import { Button } from '../../components/ui/button.tsx';
import { sayProblem } from '../../components/ui/toaster.tsx';
import { useRetryRun } from '../../features/reproduction/reproduction-queries.ts';

/** Tries a failed or cancelled run again: from what it has made, or without that. */
export function RetryButtons({ run }: { run: Run }) {
  const retry = useRetryRun(run.projectId);
  const ask = (anew: boolean) => retry.mutate({ runId: run.id, anew }, { onError: sayProblem });
  return (
    <>
      <Button kind="primary" icon={<RotateCw />} isPending={retry.isPending} onClick={() => ask(false)}>
        Try again
      </Button>
      {run.job.state === 'failed' && (
        <Button isPending={retry.isPending} onClick={() => ask(true)}>
          Try again from the beginning
        </Button>
      )}
    </>
  );
}
