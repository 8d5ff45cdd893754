import { Check, CornerUpLeft, Send, Trash2 } from 'lucide-react';
import { useState } from 'react';
import type { Sample } from '../../../../shared/contracts/sample.ts';
import { Button } from '../../components/ui/button.tsx';
import { ConfirmDialog } from '../../components/ui/confirm-dialog.tsx';
import { formatCount } from '../../lib/format.ts';
import { ReturnDialog } from './return-dialog.tsx';
import { useReview } from './use-review.ts';

export interface BulkActsProps {
  projectId: string;
  viewerId: string;
  /** Ticked in the list. */
  chosen: readonly Sample[];
  /** Those the filter lets through. */
  shown: readonly Sample[];
  onDone: () => void;
}

/** Acts on the samples ticked; with none ticked, submitting all of one's own. */
export function BulkActs({ projectId, viewerId, chosen, shown, onDone }: BulkActsProps) {
  const { isBusy, review, erase } = useReview(projectId);
  const [asks, setAsks] = useState<'return' | 'delete' | null>(null);
  const isUnsubmitted = ({ state, abilities }: Sample) => abilities.edit && (state === 'draft' || state === 'returned');
  const mine = shown.filter((sample) => sample.createdBy?.id === viewerId && isUnsubmitted(sample));
  const ready = chosen.filter(isUnsubmitted);
  const waiting = chosen.filter(({ state, abilities }) => abilities.review && state === 'submitted');
  const returnable = chosen.filter(
    ({ state, abilities }) => abilities.review && (state === 'submitted' || state === 'accepted'),
  );
  const mayDelete = chosen.filter(({ abilities }) => abilities.edit);
  const act = (work: Promise<void>) => void work.then(onDone);
  if (chosen.length === 0) {
    if (mine.length === 0) return null;
    return (
      <div className="flex items-center gap-1.5 border-t border-line px-3.5 py-2">
        <Button size="sm" icon={<Send aria-hidden />} isPending={isBusy} onClick={() => act(review('submit', mine))}>
          Submit all mine ({mine.length})
        </Button>
        <span className="text-xs text-ink-soft">Tick samples for other acts.</span>
      </div>
    );
  }
  return (
    <div className="flex flex-wrap items-center gap-1.5 border-t border-line px-3.5 py-2">
      <span role="status" className="mr-1 text-xs text-ink-soft">
        {formatCount(chosen.length, 'sample')} ticked
      </span>
      {ready.length > 0 && (
        <Button size="sm" icon={<Send aria-hidden />} isPending={isBusy} onClick={() => act(review('submit', ready))}>
          Submit {ready.length}
        </Button>
      )}
      {waiting.length > 0 && (
        <Button
          size="sm"
          icon={<Check aria-hidden />}
          isPending={isBusy}
          onClick={() => act(review('accept', waiting))}
        >
          Accept {waiting.length}
        </Button>
      )}
      {returnable.length > 0 && (
        <Button size="sm" icon={<CornerUpLeft aria-hidden />} onClick={() => setAsks('return')}>
          Return {returnable.length}…
        </Button>
      )}
      {mayDelete.length > 0 && (
        <Button size="sm" kind="ghost" icon={<Trash2 aria-hidden />} onClick={() => setAsks('delete')}>
          Delete {mayDelete.length}…
        </Button>
      )}
      {asks === 'return' && (
        <ReturnDialog
          count={returnable.length}
          onClose={() => setAsks(null)}
          onReturn={(comment) => {
            setAsks(null);
            act(review('return', returnable, comment));
          }}
        />
      )}
      <ConfirmDialog
        isOpen={asks === 'delete'}
        onOpenChange={(isOpen) => !isOpen && setAsks(null)}
        title={`Delete ${formatCount(mayDelete.length, 'sample')}?`}
        keeps="They leave the map. Undo, or their history, brings them back."
        confirmLabel="Delete samples"
        cancelLabel="Keep them"
        onConfirm={() => {
          setAsks(null);
          act(erase(mayDelete));
        }}
      />
    </div>
  );
}
