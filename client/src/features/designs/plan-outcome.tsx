import type { UseQueryResult } from '@tanstack/react-query';
import type { DesignPlan } from '../../../../shared/contracts/reference.ts';
import { Callout } from '../../components/ui/callout.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { formatCount, formatNumber } from '../../lib/format.ts';
import { PrecisionCurve } from './precision-curve.tsx';

export interface PlanOutcomeProps {
  plan: UseQueryResult<DesignPlan>;
  /** What is wrong with the form, when nothing can be planned. */
  problem: string | null;
}

/** What the plan comes to, beside the form: points, precision, the curve, and what to think of. */
export function PlanOutcome({ plan, problem }: PlanOutcomeProps) {
  if (problem) {
    return (
      <Callout tone="danger" isAlert>
        {problem}
      </Callout>
    );
  }
  if (plan.isError) return <ErrorState error={plan.error} onRetry={() => void plan.refetch()} isInline />;
  if (plan.isPending) return <PendingState label="Planning" shape="block" />;
  const { n, halfWidth, standardError, notes, how } = plan.data;
  return (
    <div
      aria-live="polite"
      aria-busy={plan.isPlaceholderData}
      className={plan.isPlaceholderData ? 'space-y-5 opacity-60' : 'space-y-5'}
    >
      <p className="text-2xl font-medium tracking-tight">
        <mark className="marked">{formatCount(n, 'point')}</mark>
        <span className="mt-1 block text-base font-normal text-ink-soft">
          {halfWidth === null
            ? 'precision undefined'
            : `overall accuracy ± ${formatNumber(halfWidth * 100, 1)} % (standard error ${formatNumber((standardError ?? Number.NaN) * 100, 2)} %)`}
        </span>
      </p>
      <PrecisionCurve plan={plan.data} />
      {notes.map((note) => (
        <Callout key={note} tone="beware">
          {note}
        </Callout>
      ))}
      <details className="text-sm">
        <summary className="cursor-pointer font-medium">How was this computed?</summary>
        <ul className="mt-2 list-disc space-y-1.5 pl-5 text-ink-soft">
          {how.map((text) => (
            <li key={text}>{text}</li>
          ))}
        </ul>
      </details>
    </div>
  );
}
