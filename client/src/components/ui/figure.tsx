import type { ReactNode } from 'react';
import { classNames } from '../../lib/class-names.ts';
import { formatPlusMinus } from '../../lib/format.ts';
import { Popover } from './popover.tsx';

export interface FigureProps {
  /** What it is: "overall accuracy, area-weighted". */
  label: ReactNode;
  /** null prints "–". */
  value: number | null;
  /** Half the interval; the popover says which interval. */
  halfWidth?: number | null;
  decimals?: number;
  unit?: string;
  /** Overrides value and halfWidth where another form reads better. */
  text?: ReactNode;
  /** How it was obtained: estimator, sample size, interval. No figure goes without. */
  how: ReactNode;
  /** Link words that open `how`. */
  howLabel?: string;
  size?: 'md' | 'lg';
  className?: string;
}

/** A figure with its interval and the way it was obtained. */
export function Figure({
  label,
  value,
  halfWidth = null,
  decimals = 0,
  unit,
  text,
  how,
  howLabel = 'how?',
  size = 'md',
  className,
}: FigureProps) {
  return (
    <div className={classNames('min-w-0', className)}>
      <p className={classNames('font-medium tracking-tight whitespace-nowrap', size === 'lg' ? 'text-2xl' : 'text-xl')}>
        {text ?? formatPlusMinus(value, halfWidth, decimals)}
        {unit && text === undefined && value !== null && (
          <span className="ml-1 text-base font-normal text-ink-soft">{unit}</span>
        )}
      </p>
      <p className="text-xs text-ink-soft">
        {label}{' '}
        <Popover
          label="How was this obtained?"
          trigger={
            <button type="button" className="link">
              {howLabel}
            </button>
          }
        >
          {how}
        </Popover>
      </p>
    </div>
  );
}
