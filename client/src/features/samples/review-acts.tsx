import { Check, CornerUpLeft, Send } from 'lucide-react';
import { useState } from 'react';
import type { Sample } from '../../../../shared/contracts/sample.ts';
import { Button } from '../../components/ui/button.tsx';
import { ReturnDialog } from './return-dialog.tsx';
import { useReview } from './use-review.ts';

/** The steps of the review the viewer may take with a sample. */
export function ReviewActs({ sample }: { sample: Sample }) {
  const { isBusy, review } = useReview(sample.projectId);
  const [isReturning, setIsReturning] = useState(false);
  const { state, abilities } = sample;
  const canSubmit = abilities.edit && (state === 'draft' || state === 'returned');
  const canTakeBack = abilities.edit && state === 'submitted';
  const canAccept = abilities.review && (state === 'submitted' || state === 'returned');
  const canReturn = abilities.review && (state === 'submitted' || state === 'accepted');
  if (!canSubmit && !canTakeBack && !canAccept && !canReturn) return null;
  return (
    <div className="flex flex-wrap gap-1.5 border-t border-line pt-2.5">
      {canAccept && (
        <Button
          size="sm"
          icon={<Check aria-hidden />}
          isPending={isBusy}
          onClick={() => void review('accept', [sample])}
        >
          Accept
        </Button>
      )}
      {canReturn && (
        <Button size="sm" icon={<CornerUpLeft aria-hidden />} onClick={() => setIsReturning(true)}>
          Return…
        </Button>
      )}
      {canSubmit && (
        <Button
          size="sm"
          icon={<Send aria-hidden />}
          isPending={isBusy}
          onClick={() => void review('submit', [sample])}
        >
          {state === 'returned' ? 'Submit again' : 'Submit'}
        </Button>
      )}
      {canTakeBack && (
        <Button size="sm" kind="ghost" isPending={isBusy} onClick={() => void review('withdraw', [sample])}>
          Back to draft
        </Button>
      )}
      {isReturning && (
        <ReturnDialog
          count={1}
          onClose={() => setIsReturning(false)}
          onReturn={(comment) => {
            setIsReturning(false);
            void review('return', [sample], comment);
          }}
        />
      )}
    </div>
  );
}
