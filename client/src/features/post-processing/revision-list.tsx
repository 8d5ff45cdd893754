import type { PostProcessingRevision } from '../../../../shared/contracts/post-processing.ts';
import { Button } from '../../components/ui/button.tsx';
import { formatDateTime } from '../../lib/format-date.ts';
import { formatCount } from '../../lib/format.ts';

interface RevisionListProps {
  revisions: readonly PostProcessingRevision[];
  isLocked: boolean;
  onTake: (revision: PostProcessingRevision) => void;
}

/** Lists that were applied before, newest first; each can be taken up again. */
export function RevisionList({ revisions, isLocked, onTake }: RevisionListProps) {
  return (
    <ul className="space-y-2">
      {revisions.map((revision) => {
        const { number, steps, madeBy, createdAt, isApplied, job } = revision;
        const state = isApplied ? 'the map as it stands' : job?.state === 'finished' || !job ? '' : job.state;
        return (
          <li key={number} className="flex items-start justify-between gap-2">
            <span>
              <span className="font-medium">
                {number}. {formatCount(steps.length, 'step')}
              </span>
              {state && ` · ${state}`}
              <span className="block text-xs text-ink-soft">
                {madeBy?.name ?? 'Someone who left'}, {formatDateTime(createdAt)}
              </span>
            </span>
            {!isLocked && (
              <Button size="sm" kind="ghost" onClick={() => onTake(revision)}>
                Take up
              </Button>
            )}
          </li>
        );
      })}
    </ul>
  );
}
