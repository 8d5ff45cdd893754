import type { ReactNode } from 'react';
import { classNames } from '../../lib/class-names.ts';
import { Sprig } from './sprig.tsx';

export interface EmptyStateProps {
  /** What is not here yet: "No scene yet". */
  title: ReactNode;
  /** What the next step is and what it gives. */
  children: ReactNode;
  /** One button. Leave out for those who may not do it, and say in the text who may. */
  action?: ReactNode;
  className?: string;
}

/** A page or list with nothing in it: teaches the next step. */
export function EmptyState({ title, children, action, className }: EmptyStateProps) {
  return (
    <div
      className={classNames(
        'flex max-w-xl items-start gap-5 rounded-xl border border-dashed border-edge bg-card px-6 py-6',
        className,
      )}
    >
      <Sprig className="h-16 shrink-0" />
      <div>
        <p className="text-xl font-semibold tracking-tight">{title}</p>
        <div className="mt-1 text-ink-soft">{children}</div>
        {action && <div className="mt-4">{action}</div>}
      </div>
    </div>
  );
}
