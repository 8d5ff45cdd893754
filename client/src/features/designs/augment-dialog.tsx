import { useState } from 'react';
import type { Design } from '../../../../shared/contracts/reference.ts';
import { Button } from '../../components/ui/button.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { NumberInput } from '../../components/ui/number-input.tsx';
import { formatCount } from '../../lib/format.ts';
import { useChangeDesign } from './change-design.ts';

export interface AugmentDialogProps {
  design: Design;
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
  onAugmented: (design: Design) => void;
}

/** Adds points to a design; those it has stay, with their answers. */
export function AugmentDialog({ design, isOpen, onOpenChange, onAugmented }: AugmentDialogProps) {
  const change = useChangeDesign(design.projectId, design.id);
  const [total, setTotal] = useState<number | null>(Math.ceil((design.n * 1.5) / 10) * 10);
  const isTooSmall = total === null || total <= design.n;
  const grow = () => {
    if (isTooSmall) return;
    change.mutate(
      { act: 'augment', body: { target: { kind: 'total', total }, allocation: { kind: 'proportional' } } },
      {
        onSuccess: (grown) => {
          onOpenChange(false);
          onAugmented(grown);
        },
      },
    );
  };
  return (
    <Dialog
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      title="Add points"
      description={
        design.state === 'closed'
          ? 'A new draft begins with the points and answers of this design; further ones are drawn along the same random order.'
          : 'The points drawn so far stay; further ones follow along the same random order.'
      }
      footer={
        <>
          <Button onClick={() => onOpenChange(false)}>Leave as it is</Button>
          <Button kind="primary" onClick={grow} isPending={change.isPending} disabled={isTooSmall}>
            Draw further points
          </Button>
        </>
      }
    >
      <Field
        label="Points in all"
        hint={`The design has ${formatCount(design.n, 'point')}. New ones are shared out by area; no stratum loses any.`}
        error={total !== null && total <= design.n ? `More than ${design.n} are wanted.` : undefined}
      >
        <NumberInput value={total} onChange={setTotal} />
      </Field>
      {change.error && <ErrorState error={change.error} isInline className="mt-4" />}
    </Dialog>
  );
}
