import { CircleCheck, RotateCcw, Trash2, UserPlus } from 'lucide-react';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { Block } from '../../../../shared/contracts/block.ts';
import { Facts, Slip } from '../../components/layout/slip.tsx';
import { Button, buttonClass } from '../../components/ui/button.tsx';
import { ConfirmDialog } from '../../components/ui/confirm-dialog.tsx';
import { formatHectares, formatNumber } from '../../lib/format.ts';
import { asProblem } from '../../lib/problem-error.ts';
import { paths } from '../../lib/paths.ts';
import { useMoveBlock } from '../../components/blocks/move-block.ts';
import { AgreementPart } from './agreement-part.tsx';
import { BlockStateTag } from './block-state.tsx';
import { useDeleteBlock } from './change-blocks.ts';

export interface BlockSlipProps {
  block: Block;
  canManage: boolean;
  onAssign: () => void;
  onShow: (sampleIds: readonly [string, string]) => void;
  onClose: () => void;
}

/** The selected block: its people, their progress and agreement, and the lead's acts. */
export function BlockSlip({ block, canManage, onAssign, onShow, onClose }: BlockSlipProps) {
  const move = useMoveBlock(block.projectId);
  const remove = useDeleteBlock(block.projectId);
  const [isRemoving, setIsRemoving] = useState(false);
  const isChecked = block.state === 'checked';
  return (
    <Slip title={`Block ${block.name}`} note={<BlockStateTag state={block.state} />} onClose={onClose}>
      <Facts
        facts={[
          { name: 'Area', value: formatHectares(block.areaHa) },
          { name: 'Target per class', value: formatNumber(block.targetPerClass) },
          { name: 'Samples (centre inside)', value: formatNumber(block.sampleCount) },
          ...block.assignments.map(({ person, samples, submitted, accepted, returned, doneAt }) => ({
            name: `${person.name}${doneAt ? ', done' : ''}`,
            value: `${samples}: ${accepted} accepted, ${submitted} submitted, ${returned} returned`,
          })),
        ]}
      />
      {block.isIndependent && (
        <p className="text-ink-soft">
          Two label it independently: each sees only their own samples until both are done.
        </p>
      )}
      <div className="flex flex-wrap gap-1.5 border-t border-line pt-2.5">
        {canManage && (
          <Button size="sm" icon={<UserPlus aria-hidden />} onClick={onAssign}>
            Assign…
          </Button>
        )}
        {block.abilities.finish && (
          <Button size="sm" onClick={() => move.mutate({ block, to: 'done' })}>
            Block done
          </Button>
        )}
        {block.abilities.check && (
          <Button
            size="sm"
            icon={<CircleCheck aria-hidden />}
            isPending={move.isPending}
            onClick={() => move.mutate({ block, to: isChecked ? 'unchecked' : 'checked' })}
          >
            {isChecked ? 'Take check back' : 'Mark as checked'}
          </Button>
        )}
        {block.abilities.reopen && (
          <Button
            size="sm"
            kind="ghost"
            icon={<RotateCcw aria-hidden />}
            onClick={() => move.mutate({ block, to: 'in-work' })}
          >
            Open again
          </Button>
        )}
        {canManage && (
          <Button size="sm" kind="ghost" icon={<Trash2 aria-hidden />} onClick={() => setIsRemoving(true)}>
            Remove…
          </Button>
        )}
        <Link to={paths.samples(block.projectId)} className={buttonClass('ghost', 'sm')}>
          Go to the desk
        </Link>
      </div>
      {block.assignments.length === 2 && !block.isIndependent && (
        <AgreementPart key={block.id} block={block} canSettle={canManage} onShow={onShow} />
      )}
      <ConfirmDialog
        isOpen={isRemoving}
        onOpenChange={setIsRemoving}
        title={`Remove block ${block.name}?`}
        loses={['Who works in it, its state and the agreement measured in it.']}
        keeps="Its samples stay, in no block."
        confirmLabel="Remove block"
        isPending={remove.isPending}
        error={remove.error && asProblem(remove.error)}
        onConfirm={() =>
          remove.mutate(block, {
            onSuccess: () => {
              setIsRemoving(false);
              onClose();
            },
          })
        }
      />
    </Slip>
  );
}
