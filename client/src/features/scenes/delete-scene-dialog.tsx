import type { Scene } from '../../../../shared/contracts/scene.ts';
import { ConfirmDialog } from '../../components/ui/confirm-dialog.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { formatCount } from '../../lib/format.ts';
import { asProblem } from '../../lib/problem-error.ts';
import { useDeleteScene } from './delete-scene.ts';

interface DeleteSceneDialogProps {
  scene: Scene;
  onClose: () => void;
  onDeleted?: () => void;
}

/** Asks before a scene is lost; says what uses it when it cannot go. */
export function DeleteSceneDialog({ scene, onClose, onDeleted }: DeleteSceneDialogProps) {
  const remove = useDeleteScene(scene.projectId);
  return (
    <ConfirmDialog
      isOpen
      onOpenChange={(isOpen) => !isOpen && onClose()}
      title={`Delete the scene ${scene.name}?`}
      loses={
        scene.state === 'ready'
          ? [`Its ${formatCount(scene.bands.length, 'band')} and their statistics`, 'Its band table']
          : [scene.state === 'failed' ? 'The note why it was not taken' : 'The ingest under way']
      }
      keeps={
        scene.state === 'ready'
          ? 'The files on your own computer stay as they are. A scene with samples or runs cannot be deleted.'
          : 'The files on your own computer stay as they are.'
      }
      confirmLabel="Delete scene"
      isPending={remove.isPending}
      error={remove.error ? asProblem(remove.error) : null}
      onConfirm={() =>
        remove.mutate(scene.id, {
          onSuccess: () => {
            sayDone(`${scene.name} deleted`);
            onClose();
            onDeleted?.();
          },
        })
      }
    />
  );
}
