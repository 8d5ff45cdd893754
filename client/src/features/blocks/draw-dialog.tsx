import { useState } from 'react';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import { Button } from '../../components/ui/button.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { useDrawBlock } from './change-blocks.ts';

/** Names a block that was drawn. */
export function DrawDialog({
  projectId,
  geometry,
  onClose,
}: {
  projectId: string;
  geometry: Polygon;
  onClose: () => void;
}) {
  const draw = useDrawBlock(projectId);
  const [name, setName] = useState('');
  return (
    <Dialog
      isOpen
      onOpenChange={(isOpen) => !isOpen && onClose()}
      size="sm"
      title="A new block"
      footer={
        <>
          <Button onClick={onClose}>Discard</Button>
          <Button
            kind="strong"
            disabled={!name.trim()}
            isPending={draw.isPending}
            onClick={() => draw.mutate({ name: name.trim(), geometry }, { onSuccess: onClose })}
          >
            Add block
          </Button>
        </>
      }
    >
      <Field label="Name" hint="Short: it stands on the map.">
        <TextInput maxLength={40} value={name} onChange={(event) => setName(event.target.value)} />
      </Field>
      {draw.error && <ErrorState className="mt-4" error={draw.error} isInline />}
    </Dialog>
  );
}
