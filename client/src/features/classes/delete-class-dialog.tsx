import { useState } from 'react';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { ConfirmDialog } from '../../components/ui/confirm-dialog.tsx';
import { Field } from '../../components/ui/field.tsx';
import { Select } from '../../components/ui/select.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { formatCount } from '../../lib/format.ts';
import { ProblemError, asProblem } from '../../lib/problem-error.ts';
import { useDeleteClass } from './delete-class.ts';

interface DeleteClassDialogProps {
  projectId: string;
  classes: readonly LandClass[];
  landClass: LandClass;
  onClose: () => void;
}

/** Deletes a class; when it has samples, another class takes them over. */
export function DeleteClassDialog({ projectId, classes, landClass, onClose }: DeleteClassDialogProps) {
  const remove = useDeleteClass(projectId);
  const [heirId, setHeirId] = useState<string | null>(null);
  const [isUnchosen, setIsUnchosen] = useState(false);
  const others = classes.filter(({ id }) => id !== landClass.id);
  // Someone may have drawn the first sample since the list was fetched.
  const wasRefused = remove.error instanceof ProblemError && remove.error.code === 'has-samples';
  const sampleCount = classes.find(({ id }) => id === landClass.id)?.sampleCount ?? landClass.sampleCount;
  const hasSamples = sampleCount > 0 || wasRefused;
  const confirm = () => {
    if (hasSamples && !heirId) return setIsUnchosen(true);
    return remove.mutate(
      { classId: landClass.id, moveSamplesTo: hasSamples ? heirId : null },
      {
        onSuccess: () => {
          sayDone(`${landClass.name} was deleted`);
          onClose();
        },
      },
    );
  };
  return (
    <ConfirmDialog
      isOpen
      onOpenChange={(isOpen) => !isOpen && onClose()}
      title={`Delete the class ${landClass.name}?`}
      loses={['Its code, colour and definition']}
      keeps={
        hasSamples
          ? `Its ${formatCount(sampleCount, 'sample')} ${sampleCount === 1 ? 'goes' : 'go'} to the class you choose. Finished runs keep the class they were made with.`
          : 'It has no samples. Finished runs keep the class they were made with.'
      }
      confirmLabel={hasSamples ? 'Move samples and delete' : 'Delete class'}
      isPending={remove.isPending}
      error={remove.error && !wasRefused ? asProblem(remove.error) : null}
      onConfirm={confirm}
    >
      {hasSamples &&
        (others.length > 0 ? (
          <Field
            label="Move samples to"
            error={isUnchosen && !heirId ? 'Choose the class that takes over the samples.' : undefined}
          >
            <Select
              value={heirId}
              onChange={setHeirId}
              placeholder="Choose a class…"
              options={others.map((other) => ({
                value: other.id,
                label: other.name,
                mark: <ClassSwatch colour={other.colour} position={other.position} />,
              }))}
            />
          </Field>
        ) : (
          <p>There is no other class to take the samples. Add one first.</p>
        ))}
    </ConfirmDialog>
  );
}
