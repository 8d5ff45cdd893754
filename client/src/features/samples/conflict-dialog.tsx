import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import { Button } from '../../components/ui/button.tsx';
import { ConflictNote } from '../../components/ui/conflict-note.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { conflictFields } from './conflict-fields.ts';
import { OutlinePair } from './outline-pair.tsx';
import type { SampleConflict } from './use-desk-acts.ts';

export interface ConflictDialogProps {
  conflict: SampleConflict;
  classes: readonly LandClass[];
  isSaving: boolean;
  onKeepMine: () => void;
  onTakeTheirs: () => void;
  /** Leaves the choice for later: the drawing stays open. */
  onClose: () => void;
}

/** Someone else saved the sample first: both versions, and the choice. */
export function ConflictDialog(props: ConflictDialogProps) {
  const { conflict, classes, isSaving, onKeepMine, onTakeTheirs, onClose } = props;
  const { draft: mine, current: theirs } = conflict;
  const number = mine.base?.number ?? theirs?.number;
  return (
    <Dialog
      isOpen
      onOpenChange={(isOpen) => !isOpen && onClose()}
      title={`Sample ${number}: two versions`}
      size="lg"
      description={
        theirs
          ? `It stands at version ${theirs.version}; you began from version ${mine.base?.version ?? 1}.`
          : 'Someone deleted this sample while you were changing it.'
      }
      footer={
        theirs ? undefined : (
          <>
            <Button onClick={onTakeTheirs}>Leave it deleted</Button>
            <Button kind="strong" isPending={isSaving} onClick={onKeepMine}>
              Bring it back with my changes
            </Button>
          </>
        )
      }
    >
      {theirs && (
        <div className="grid grid-cols-[minmax(0,1fr)_260px] items-start gap-5 max-md:grid-cols-1">
          <ConflictNote
            what={`sample ${number}`}
            rows={conflictFields(theirs, mine, classes)}
            onKeepMine={onKeepMine}
            onTakeTheirs={onTakeTheirs}
            isPending={isSaving}
          />
          <OutlinePair
            theirs={theirs.geometry}
            mine={mine.geometry}
            theirColour={classes.find((one) => one.id === theirs.classId)?.colour}
            myColour={classes.find((one) => one.id === mine.classId)?.colour}
          />
        </div>
      )}
    </Dialog>
  );
}
