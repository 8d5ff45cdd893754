import { useState } from 'react';
import type { Member } from '../../../../shared/contracts/project.ts';
import { Button } from '../../components/ui/button.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { roleNames } from '../../lib/role-names.ts';
import { RolePicker } from './role-picker.tsx';
import { useUpdateMember } from './update-member.ts';

interface MemberRolesDialogProps {
  projectId: string;
  member: Member;
  /** The viewer changes their own roles. */
  isSelf: boolean;
  onClose: () => void;
}

/** Changes what a person may do in the project. */
export function MemberRolesDialog({ projectId, member, isSelf, onClose }: MemberRolesDialogProps) {
  const [roles, setRoles] = useState(member.roles);
  const update = useUpdateMember(projectId);
  const save = () =>
    update.mutate(
      { memberId: member.id, roles },
      {
        onSuccess: () => {
          sayDone(`${member.person.name} is now ${roleNames(roles)}`);
          onClose();
        },
      },
    );
  return (
    <Dialog
      isOpen
      onOpenChange={(isOpen) => !isOpen && onClose()}
      size="sm"
      title={`Roles of ${member.person.name}`}
      description={member.email}
      footer={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button
            kind="strong"
            disabled={roles.length === 0}
            isPending={update.isPending}
            pendingLabel="Saving…"
            onClick={save}
          >
            Save roles
          </Button>
        </>
      }
    >
      <RolePicker
        value={roles}
        onChange={setRoles}
        error={roles.length === 0 ? 'Choose at least one role.' : undefined}
      />
      {isSelf && member.roles.includes('lead') && !roles.includes('lead') && (
        <Callout tone="beware" title="You give up the lead." className="mt-4">
          You will no longer manage people, classes or this project; only another lead can undo it.
        </Callout>
      )}
      {update.error && <ErrorState error={update.error} isInline className="mt-4" />}
    </Dialog>
  );
}
