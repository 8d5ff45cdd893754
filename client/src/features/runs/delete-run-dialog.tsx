import type { Run } from '../../../../shared/contracts/run.ts';
import { ConfirmDialog } from '../../components/ui/confirm-dialog.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { asProblem } from '../../lib/problem-error.ts';
import { useDeleteRun } from './delete-run.ts';

interface DeleteRunDialogProps {
  run: Run;
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
  onDeleted: () => void;
}

/** Asks before a run goes with its map and figures. */
export function DeleteRunDialog({ run, isOpen, onOpenChange, onDeleted }: DeleteRunDialogProps) {
  const remove = useDeleteRun(run.projectId, () => {
    sayDone(`Run ${run.number} deleted`);
    onDeleted();
  });
  const loses = ['Its recipe and notes'];
  if (run.job.state === 'finished') {
    loses.unshift('The class map and its downloads', 'Its confusion matrix and accuracy figures');
  }
  return (
    <ConfirmDialog
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      title={`Delete run ${run.number}${run.name ? `, ${run.name}` : ''}?`}
      loses={loses}
      keeps="Scene, classes and samples stay. The number is not used again."
      confirmLabel="Delete run"
      isPending={remove.isPending}
      error={remove.error ? asProblem(remove.error) : null}
      onConfirm={() => remove.mutate(run.id)}
    />
  );
}
