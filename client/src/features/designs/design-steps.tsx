import { Check } from 'lucide-react';
import type { Design, DesignState } from '../../../../shared/contracts/reference.ts';
import { classNames } from '../../lib/class-names.ts';
import { formatDateTime } from '../../lib/format-date.ts';

const STEPS: readonly { state: DesignState; name: string; note: string }[] = [
  { state: 'draft', name: 'Drawn', note: 'may still be changed' },
  { state: 'open', name: 'Blind check', note: 'frozen; people answer' },
  { state: 'adjudicating', name: 'Decisions', note: 'answers that differ' },
  { state: 'closed', name: 'Closed', note: 'estimates stand' },
];

/** The four states of a design in their order, and which one it is in. */
export function DesignSteps({ design }: { design: Design }) {
  const current = STEPS.findIndex(({ state }) => state === design.state);
  const when: Partial<Record<DesignState, string | null>> = {
    draft: design.createdAt,
    open: design.openedAt,
    closed: design.closedAt,
  };
  return (
    <ol aria-label="Where the design stands" className="grid grid-cols-4 gap-2 max-sm:grid-cols-2">
      {STEPS.map(({ state, name, note }, place) => {
        const isDone = place < current || design.state === 'closed';
        const isCurrent = place === current;
        const at = isDone || isCurrent ? when[state] : null;
        return (
          <li
            key={state}
            aria-current={isCurrent ? 'step' : undefined}
            className={classNames(
              'border-t-[3px] pt-2',
              isCurrent ? 'border-groundsel' : isDone ? 'border-spruce' : 'border-line',
            )}
          >
            <span
              className={classNames('flex items-center gap-1.5 font-medium', !isDone && !isCurrent && 'text-ink-soft')}
            >
              {isDone && <Check aria-hidden className="size-4 text-spruce" />}
              {name}
              {isDone && <span className="sr-only">, done</span>}
            </span>
            <span className="block text-xs text-ink-soft">{at ? formatDateTime(at) : note}</span>
          </li>
        );
      })}
    </ol>
  );
}
