import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { Block } from '../../../../shared/contracts/block.ts';
import { memberListSchema } from '../../../../shared/contracts/project.ts';
import { Button } from '../../components/ui/button.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { Checkbox } from '../../components/ui/checkbox.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { NumberInput } from '../../components/ui/number-input.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { fetchJson } from '../../lib/fetch-json.ts';
import { formatCount } from '../../lib/format.ts';
import { projectKey } from '../../lib/project/project-query.ts';
import { useAssignBlocks } from './change-blocks.ts';

export interface AssignDialogProps {
  projectId: string;
  blocks: readonly Block[];
  onClose: () => void;
}

/** Gives blocks to one labeller or two, with a target. */
export function AssignDialog({ projectId, blocks, onClose }: AssignDialogProps) {
  const members = useQuery({
    queryKey: projectKey(projectId, 'members'),
    queryFn: ({ signal }) => fetchJson(`/projects/${projectId}/members`, memberListSchema, { signal }),
    select: (list) => list.members.filter(({ roles }) => roles.includes('labeller') || roles.includes('lead')),
  });
  const assign = useAssignBlocks(projectId);
  const [userIds, setUserIds] = useState<readonly string[]>(
    blocks[0]?.assignments.map(({ person }) => person.id) ?? [],
  );
  const [target, setTarget] = useState<number | null>(blocks[0]?.targetPerClass ?? null);
  const submit = () =>
    assign.mutate(
      { blockIds: blocks.map(({ id }) => id), userIds: [...userIds], targetPerClass: target },
      {
        onSuccess: () => {
          sayDone(`${formatCount(blocks.length, 'block')} assigned`);
          onClose();
        },
      },
    );
  return (
    <Dialog
      isOpen
      onOpenChange={(isOpen) => !isOpen && onClose()}
      size="sm"
      title={blocks.length === 1 ? `Assign block ${blocks[0]?.name}` : `Assign ${formatCount(blocks.length, 'block')}`}
      description="To one labeller, or to two who label independently of each other."
      footer={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button kind="strong" isPending={assign.isPending} onClick={submit}>
            {userIds.length === 0 ? 'Give to nobody' : 'Assign'}
          </Button>
        </>
      }
    >
      {members.isPending && <PendingState label="Loading the people" rows={3} />}
      {members.isError && <ErrorState error={members.error} onRetry={() => void members.refetch()} isInline />}
      <ul className="space-y-1.5">
        {members.data?.map(({ person }) => {
          const isOn = userIds.includes(person.id);
          return (
            <li key={person.id}>
              <Checkbox
                label={person.name}
                isChecked={isOn}
                isDisabled={!isOn && userIds.length === 2}
                onChange={(next) =>
                  setUserIds(next ? [...userIds, person.id] : userIds.filter((id) => id !== person.id))
                }
              />
            </li>
          );
        })}
      </ul>
      {userIds.length === 2 && (
        <Callout title="Independently." className="mt-3">
          Each sees only their own samples in the block until both are done; then their agreement is measured.
        </Callout>
      )}
      <Field className="mt-4" label="Target per class" hint="Samples of each class in a block" isOptional>
        <NumberInput value={target} onChange={setTarget} />
      </Field>
      {assign.error && <ErrorState className="mt-4" error={assign.error} isInline />}
    </Dialog>
  );
}
