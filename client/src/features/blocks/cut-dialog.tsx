import { useState } from 'react';
import { MIN_BLOCK_METERS } from '../../../../shared/contracts/block.ts';
import { Button } from '../../components/ui/button.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { NumberInput } from '../../components/ui/number-input.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { formatCount } from '../../lib/format.ts';
import { useCutBlocks } from './change-blocks.ts';

export interface CutDialogProps {
  projectId: string;
  /** Blocks that would be replaced. */
  nBlocks: number;
  onClose: () => void;
}

/** Cuts the study area into squares. */
export function CutDialog({ projectId, nBlocks, onClose }: CutDialogProps) {
  const cut = useCutBlocks(projectId);
  const [sizeMeters, setSizeMeters] = useState<number | null>(6_000);
  const [target, setTarget] = useState<number | null>(3);
  const isTooSmall = sizeMeters === null || sizeMeters < MIN_BLOCK_METERS;
  const submit = () => {
    if (sizeMeters === null || isTooSmall) return;
    cut.mutate(
      { sizeMeters, targetPerClass: target, replace: nBlocks > 0 },
      {
        onSuccess: ({ blocks }) => {
          sayDone(`${formatCount(blocks.length, 'block')} cut`);
          onClose();
        },
      },
    );
  };
  return (
    <Dialog
      isOpen
      onOpenChange={(isOpen) => !isOpen && onClose()}
      size="sm"
      title="Cut the study area into blocks"
      description="Squares from its north-west corner; those that meet the study area are kept. A sample belongs to the block its centre lies in."
      footer={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button
            kind={nBlocks > 0 ? 'danger' : 'strong'}
            isPending={cut.isPending}
            pendingLabel="Cutting…"
            onClick={submit}
          >
            {nBlocks > 0 ? `Replace ${formatCount(nBlocks, 'block')}` : 'Cut blocks'}
          </Button>
        </>
      }
    >
      <div className="grid grid-cols-2 gap-4">
        <Field label="Width of a block" error={isTooSmall ? `At least ${MIN_BLOCK_METERS} m.` : undefined}>
          <NumberInput unit="m" value={sizeMeters} onChange={setSizeMeters} />
        </Field>
        <Field label="Target per class" hint="Samples of each class in a block" isOptional>
          <NumberInput value={target} onChange={setTarget} />
        </Field>
      </div>
      {nBlocks > 0 && (
        <Callout tone="beware" title="The blocks there are go." className="mt-4">
          With them go their assignments, their states and the agreement measured in them. Samples stay.
        </Callout>
      )}
      {cut.error && <ErrorState className="mt-4" error={cut.error} isInline />}
    </Dialog>
  );
}
