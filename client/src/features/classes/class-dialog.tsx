import { useState } from 'react';
import { type LandClass, landClassSchema } from '../../../../shared/contracts/land-class.ts';
import { Button } from '../../components/ui/button.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { ProblemError } from '../../lib/problem-error.ts';
import { ClassForm, type ClassValues, valuesOf } from './class-form.tsx';
import { useCreateClass } from './create-class.ts';
import { nextFreeCode, nextFreeColour } from './next-class.ts';
import { useUpdateClass } from './update-class.ts';

interface ClassDialogProps {
  projectId: string;
  classes: readonly LandClass[];
  /** The class to change; null adds one. */
  landClass: LandClass | null;
  onClose: () => void;
}

const FORM_ID = 'class-form';

/** Adds or changes a class. Adding can go on: the form starts over with the next free code and colour. */
export function ClassDialog({ projectId, classes, landClass, onClose }: ClassDialogProps) {
  return landClass ? (
    <EditDialog projectId={projectId} classes={classes} landClass={landClass} onClose={onClose} />
  ) : (
    <AddDialog projectId={projectId} classes={classes} onClose={onClose} />
  );
}

function AddDialog({ projectId, classes, onClose }: Omit<ClassDialogProps, 'landClass'>) {
  const create = useCreateClass(projectId);
  const [round, setRound] = useState(0);
  // The scheme as it was when the form opened: refetches must not refuse the code just saved.
  const [known, setKnown] = useState(classes);
  const [added, setAdded] = useState<string[]>([]);
  const save = (values: ClassValues, onRefused: (error: Error) => void) =>
    create.mutate(values, {
      onSuccess: (saved) => {
        setKnown([...known, saved]);
        setAdded([...added, saved.name]);
        setRound(round + 1);
      },
      onError: onRefused,
    });
  return (
    <Dialog
      isOpen
      onOpenChange={(isOpen) => !isOpen && onClose()}
      title="Add a class"
      description={
        <span aria-live="polite">
          {added.length === 0 ? 'It goes to the end of the scheme.' : `Added ${added.join(', ')}.`}
        </span>
      }
      footer={
        <>
          <Button onClick={onClose}>{added.length > 0 ? 'Done' : 'Cancel'}</Button>
          <Button kind="strong" type="submit" form={FORM_ID} isPending={create.isPending} pendingLabel="Adding…">
            {added.length > 0 ? 'Add another' : 'Add class'}
          </Button>
        </>
      }
    >
      <ClassForm
        key={round}
        formId={FORM_ID}
        initial={{ code: nextFreeCode(known) ?? 1, name: '', colour: nextFreeColour(known), definition: '' }}
        others={known}
        error={create.error}
        isPending={create.isPending}
        conflict={null}
        onSubmit={save}
        onKeepMine={() => undefined}
        onTakeTheirs={() => undefined}
      />
    </Dialog>
  );
}

function EditDialog({ projectId, classes, landClass, onClose }: ClassDialogProps & { landClass: LandClass }) {
  const update = useUpdateClass(projectId);
  const [version, setVersion] = useState(landClass.version);
  const conflict = readConflict(update.error);
  const send = (values: ClassValues, onVersion: number, onRefused?: (error: Error) => void) =>
    update.mutate(
      { classId: landClass.id, change: { ...values, version: onVersion } },
      {
        onSuccess: (saved) => {
          sayDone(`${saved.name} saved`);
          onClose();
        },
        onError: onRefused,
      },
    );
  return (
    <Dialog
      isOpen
      onOpenChange={(isOpen) => !isOpen && onClose()}
      title={`Class ${landClass.name}`}
      footer={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button
            kind="strong"
            type="submit"
            form={FORM_ID}
            disabled={conflict !== null}
            isPending={update.isPending}
            pendingLabel="Saving…"
          >
            Save class
          </Button>
        </>
      }
    >
      <ClassForm
        formId={FORM_ID}
        initial={valuesOf(landClass)}
        others={classes.filter(({ id }) => id !== landClass.id)}
        error={update.error}
        isPending={update.isPending}
        conflict={conflict}
        onSubmit={(values, onRefused) => send(values, version, onRefused)}
        onKeepMine={(values) => {
          if (!conflict) return;
          setVersion(conflict.version);
          send(values, conflict.version);
        }}
        onTakeTheirs={() => {
          if (conflict) setVersion(conflict.version);
          update.reset();
        }}
      />
    </Dialog>
  );
}

/** The class as it stands, out of a refusal for a stale version. */
function readConflict(error: Error | null): LandClass | null {
  if (!(error instanceof ProblemError) || error.status !== 409) return null;
  const parsed = landClassSchema.safeParse(error.current);
  return parsed.success ? parsed.data : null;
}
