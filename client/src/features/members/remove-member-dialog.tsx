import type { Member } from '../../../../shared/contracts/project.ts';
import { ConfirmDialog } from '../../components/ui/confirm-dialog.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { formatCount } from '../../lib/format.ts';
import { asProblem } from '../../lib/problem-error.ts';
import { useRemoveMember } from './remove-member.ts';

interface RemoveMemberDialogProps {
  projectId: string;
  member: Member;
  /** The viewer leaves the project. */
  isSelf: boolean;
  onClose: () => void;
  onRemoved: () => void;
}

/** Takes a person out; what they drew stays theirs. */
export function RemoveMemberDialog({ projectId, member, isSelf, onClose, onRemoved }: RemoveMemberDialogProps) {
  const remove = useRemoveMember(projectId);
  const { name } = member.person;
  const stays =
    member.sampleCount === 0
      ? 'They have drawn no samples here.'
      : `Their ${formatCount(member.sampleCount, 'sample')} ${member.sampleCount === 1 ? 'stays' : 'stay'} in the project, credited to ${isSelf ? 'you' : name}.`;
  return (
    <ConfirmDialog
      isOpen
      onOpenChange={(isOpen) => !isOpen && onClose()}
      title={isSelf ? 'Leave this project?' : `Remove ${name}?`}
      loses={[isSelf ? 'You no longer see or open this project' : `${name} no longer sees or opens this project`]}
      keeps={isSelf ? stays.replace('Their', 'Your').replace('They have', 'You have') : stays}
      cancelLabel={isSelf ? 'Stay' : 'Keep in project'}
      confirmLabel={isSelf ? 'Leave project' : 'Remove from project'}
      isPending={remove.isPending}
      error={remove.error ? asProblem(remove.error) : null}
      onConfirm={() =>
        remove.mutate(member.id, {
          onSuccess: () => {
            sayDone(isSelf ? 'You left the project' : `${name} was removed from the project`);
            onRemoved();
          },
        })
      }
    />
  );
}
