import type { DrawingRefusal } from '../../../../shared/contracts/sample.ts';
import { Callout } from '../../components/ui/callout.tsx';

/** Why a drawing cannot be saved as it is: found, wanted, what to do. */
export function RefusalNote({ refusal }: { refusal: Pick<DrawingRefusal, 'found' | 'wanted' | 'advice' | 'at'> }) {
  return (
    <Callout tone="danger" isAlert title="This cannot be a sample yet.">
      <p className="mt-1">
        Found {refusal.found}; wanted {refusal.wanted}.
      </p>
      <p className="mt-1">
        {refusal.advice} {refusal.at && 'The mark on the map shows the place.'}
      </p>
    </Callout>
  );
}
