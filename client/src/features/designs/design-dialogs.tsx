import { useState } from 'react';
import type { Design } from '../../../../shared/contracts/reference.ts';
import { Checkbox } from '../../components/ui/checkbox.tsx';
import { ConfirmDialog } from '../../components/ui/confirm-dialog.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { formatCount } from '../../lib/format.ts';
import { asProblem } from '../../lib/problem-error.ts';
import { useChangeDesign, useDeleteDesign } from './change-design.ts';
import { designTitle } from './design-state.tsx';

interface DesignDialogProps {
  design: Design;
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
}

/** Asks before a design is frozen. */
export function OpenDesignDialog({ design, isOpen, onOpenChange }: DesignDialogProps) {
  const change = useChangeDesign(design.projectId, design.id);
  return (
    <ConfirmDialog
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      title={`Open ${designTitle(design)} for the blind check?`}
      keeps={`Its ${formatCount(design.n, 'point')} can no longer be changed or drawn again; a digest says so. While it is open, reviewers see no class map of this project.`}
      confirmLabel="Open and freeze"
      cancelLabel="Not yet"
      isDanger={false}
      isPending={change.isPending}
      error={change.error ? asProblem(change.error) : null}
      onConfirm={() => change.mutate({ act: 'open' }, { onSuccess: () => onOpenChange(false) })}
    />
  );
}

/** Asks before no more answers are taken. */
export function EndInterpretationDialog({ design, isOpen, onOpenChange }: DesignDialogProps) {
  const change = useChangeDesign(design.projectId, design.id);
  const missing = design.progress.points - design.progress.complete;
  return (
    <ConfirmDialog
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      title="End the blind check?"
      loses={missing > 0 ? [`The chance to answer ${formatCount(missing, 'point')} that lack an answer`] : []}
      keeps="Answers stay as they are and can be compared from then on. Where they differ, the reviewer decides."
      confirmLabel="End the blind check"
      cancelLabel="Go on answering"
      isDanger={missing > 0}
      isPending={change.isPending}
      error={change.error ? asProblem(change.error) : null}
      onConfirm={() => change.mutate({ act: 'adjudicate' }, { onSuccess: () => onOpenChange(false) })}
    />
  );
}

/** Asks before a design is closed, and whether points without a class may be left out. */
export function CloseDesignDialog({ design, isOpen, onOpenChange }: DesignDialogProps) {
  const change = useChangeDesign(design.projectId, design.id);
  const [leaveUnsettled, setLeaveUnsettled] = useState(false);
  const unsettled = design.progress.points - design.progress.settled;
  return (
    <ConfirmDialog
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      title={`Close ${designTitle(design)}?`}
      keeps="Decisions can no longer be changed. The estimates are computed, and class maps show again."
      confirmLabel="Close the design"
      cancelLabel="Not yet"
      isDanger={false}
      isPending={change.isPending}
      error={change.error ? asProblem(change.error) : null}
      onConfirm={() => change.mutate({ act: 'close', leaveUnsettled }, { onSuccess: () => onOpenChange(false) })}
    >
      {unsettled > 0 && (
        <Checkbox
          label={`Leave out ${formatCount(unsettled, 'point')} without a class`}
          hint="The estimates say how many were left out. Too many make them doubtful."
          isChecked={leaveUnsettled}
          onChange={setLeaveUnsettled}
        />
      )}
    </ConfirmDialog>
  );
}

/** Asks before a draft goes with its points. */
export function DeleteDesignDialog(props: DesignDialogProps & { onDeleted: () => void }) {
  const { design, isOpen, onOpenChange, onDeleted } = props;
  const remove = useDeleteDesign(design.projectId, () => {
    sayDone(`${designTitle(design)} deleted`);
    onDeleted();
  });
  return (
    <ConfirmDialog
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      title={`Delete ${designTitle(design)}?`}
      loses={[`Its ${formatCount(design.n, 'point')}`]}
      confirmLabel="Delete design"
      isPending={remove.isPending}
      error={remove.error ? asProblem(remove.error) : null}
      onConfirm={() => remove.mutate(design.id)}
    />
  );
}
