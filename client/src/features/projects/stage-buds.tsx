import type { Stage } from '../../../../shared/contracts/project.ts';
import { Bud } from '../../components/layout/bud.tsx';
import { STAGE_NAMES, STATE_TEXT } from '../../components/layout/stage.ts';
import { Skeleton } from '../../components/ui/pending-state.tsx';
import { formatNumber } from '../../lib/format.ts';

/** The stages of a project lying down: each a bud with its name and count. A client is shown none. */
export function StageBuds({ stages, isPending }: { stages: readonly Stage[]; isPending: boolean }) {
  if (isPending) return <Skeleton className="h-10 w-full" />;
  if (stages.length === 0) return <p className="text-sm text-ink-soft">Nothing has been handed over yet.</p>;
  const shown = STAGE_NAMES.flatMap(({ id, name }) => {
    const stage = stages.find((candidate) => candidate.id === id);
    return stage && id !== 'overview' ? [{ ...stage, name }] : [];
  });
  return (
    <ol aria-label="Stages" className="grid auto-cols-fr grid-flow-col">
      {shown.map((stage, index) => (
        <li key={stage.id} className="relative text-center text-2xs text-ink-soft">
          {index > 0 && (
            <span
              aria-hidden
              className={`absolute top-[10px] right-1/2 h-0.5 w-full ${stage.state === 'empty' ? 'bg-line' : 'bg-spruce'}`}
            />
          )}
          <Bud state={stage.state} className="relative z-[1] mx-auto size-[22px]" />
          <span className="mt-1 block">
            {stage.name}
            <span className="sr-only">, {STATE_TEXT[stage.state]}</span>
          </span>
          <span className="block h-3.5 font-medium text-ink">
            {stage.count !== null && stage.count > 0 && formatNumber(stage.count)}
          </span>
        </li>
      ))}
    </ol>
  );
}
