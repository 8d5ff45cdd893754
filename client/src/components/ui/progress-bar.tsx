import type { ReactNode } from 'react';
import { classNames } from '../../lib/class-names.ts';
import { formatNumber, formatTimeLeft } from '../../lib/format.ts';

export interface ProgressBarProps {
  /** What goes on: "Classifying blocks". */
  label: ReactNode;
  done: number;
  total: number;
  /** What is counted: "tiles". */
  unit?: string;
  /** How a count prints, when it is no plain number (bytes). */
  formatAmount?: (amount: number) => string;
  /** Said instead of “done of total”. */
  countsText?: string;
  secondsLeft?: number | null | undefined;
  /** A failed or stopped bar keeps its place but turns rust. */
  tone?: 'working' | 'danger' | 'ok';
  /** A button to cancel or take up again. */
  action?: ReactNode;
  className?: string;
}

const FILL = { working: 'bg-groundsel-deep', danger: 'bg-rust', ok: 'bg-spruce' };

/** A determinate bar with its counts and the time left. */
export function ProgressBar({
  label,
  done,
  total,
  unit,
  formatAmount = formatNumber,
  countsText,
  secondsLeft,
  tone = 'working',
  action,
  className,
}: ProgressBarProps) {
  const share = total > 0 ? Math.min(1, Math.max(0, done / total)) : 0;
  const counts = countsText ?? `${formatAmount(done)} of ${formatAmount(total)}${unit ? ` ${unit}` : ''}`;
  const left = formatTimeLeft(secondsLeft);
  return (
    <div className={className}>
      <div className="flex flex-wrap items-baseline justify-between gap-x-4 text-sm">
        <span className="font-medium">{label}</span>
        <span className="text-ink-soft">
          {counts}
          {left && ` · ${left}`}
        </span>
      </div>
      <div className="mt-1.5 flex items-center gap-3">
        <div
          role="progressbar"
          aria-label={typeof label === 'string' ? label : 'Progress'}
          aria-valuemin={0}
          aria-valuemax={100}
          aria-valuenow={Math.floor(share * 100)}
          aria-valuetext={left ? `${counts}, ${left}` : counts}
          className="h-2 grow overflow-hidden rounded-full bg-line"
        >
          <div
            className={classNames('h-full origin-left rounded-full transition-[width]', FILL[tone])}
            style={{ width: `${share * 100}%` }}
          />
        </div>
        {action}
      </div>
    </div>
  );
}

/** A thin bar against a target, without words, for a class key or a table cell: rust below half, spruce when reached. */
export function TargetBar({ done, target, className }: { done: number; target: number; className?: string }) {
  const share = target > 0 ? Math.min(1, done / target) : 1;
  return (
    <div aria-hidden className={classNames('h-1 overflow-hidden rounded-full bg-line', className)}>
      <div
        className={classNames('h-full', share < 0.5 ? 'bg-rust' : 'bg-spruce')}
        style={{ width: `${share * 100}%` }}
      />
    </div>
  );
}
