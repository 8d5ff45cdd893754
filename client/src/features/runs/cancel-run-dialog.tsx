import type { Run } from '../../../../shared/contracts/run.ts';
import { ConfirmDialog } from '../../components/ui/confirm-dialog.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { asProblem } from '../../lib/problem-error.ts';
import { useCancelRun } from './cancel-run.ts';

interface CancelRunDialogProps {
  run: Run;
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
}

/** Asks before the work done so far is thrown away. */
export function CancelRunDialog({ run, isOpen, onOpenChange }: CancelRunDialogProps) {
  const cancel = useCancelRun(run.projectId);
  return (
    <ConfirmDialog
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      title={`Cancel run ${run.number}?`}
      loses={['What it has learned and mapped so far']}
      keeps="Its recipe stays, so it can be started again."
      confirmLabel="Cancel run"
      isPending={cancel.isPending}
      error={cancel.error ? asProblem(cancel.error) : null}
      onConfirm={() =>
        cancel.mutate(run.id, {
          onSuccess: () => {
            sayDone(`Run ${run.number} cancelled`);
            onOpenChange(false);
          },
        })
      }
    />
  );
}
