import type { Estimate } from '../../../../shared/contracts/accuracy.ts';
import { StateTag, type TagTone } from '../../components/ui/state-tag.tsx';
import { formatPercent } from '../../lib/format.ts';
import { type TargetVerdict, judgeTarget } from './judge-target.ts';

const VERDICT: Record<TargetVerdict, { tone: TagTone; text: string }> = {
  met: { tone: 'ok', text: 'Met' },
  missed: { tone: 'danger', text: 'Missed' },
  uncertain: { tone: 'beware', text: 'Uncertain' },
  undefined: { tone: 'plain', text: 'Undefined' },
};

/** The overall accuracy against what the commission asks for. */
export function TargetLine({ overall, target }: { overall: Estimate; target: number | null }) {
  if (target === null) return null;
  const verdict = judgeTarget(overall, target);
  const { tone, text } = VERDICT[verdict];
  return (
    <p className="flex flex-wrap items-center gap-x-2.5 gap-y-1 text-sm">
      <span>
        Target: overall accuracy of at least{' '}
        <span className="font-medium">{formatPercent(target, decimals(target))}</span>
      </span>
      <StateTag tone={tone}>{text}</StateTag>
      <span className="text-ink-soft">{explain(verdict, overall)}</span>
    </p>
  );
}

function decimals(share: number): number {
  return Number.isInteger(Math.round(share * 1000) / 10) ? 0 : 1;
}

function explain(verdict: TargetVerdict, { low, high }: Estimate): string {
  if (verdict === 'undefined') return 'There is no figure to hold against it.';
  if (low === null || high === null) return 'Without an interval it cannot be told.';
  const interval = `95 % interval ${formatPercent(low, 1)} to ${formatPercent(high, 1)}`;
  if (verdict === 'met') return `The whole ${interval} reaches it.`;
  if (verdict === 'missed') return `The whole ${interval} is below it.`;
  return `The ${interval} holds it: more held-out samples would tell.`;
}
