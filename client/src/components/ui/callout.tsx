import type { ReactNode } from 'react';
import { classNames } from '../../lib/class-names.ts';

export type CalloutTone = 'note' | 'ok' | 'beware' | 'danger';

export interface CalloutProps {
  tone?: CalloutTone;
  /** Leading words, bold: "Beware." */
  title?: ReactNode;
  children?: ReactNode;
  /** A link or button that mends it. */
  action?: ReactNode;
  /** Read out when it appears. */
  isAlert?: boolean;
  className?: string;
}

const TONE: Record<CalloutTone, string> = {
  note: 'border-edge bg-sunken',
  ok: 'border-spruce bg-spruce-wash',
  beware: 'border-groundsel bg-groundsel-wash',
  danger: 'border-rust bg-rust-wash',
};

/** A thing to know about what stands beside it. */
export function Callout({ tone = 'note', title, children, action, isAlert = false, className }: CalloutProps) {
  return (
    <div
      role={isAlert ? 'alert' : undefined}
      className={classNames('rounded-r-lg border-l-[3px] px-3 py-2 text-sm leading-snug', TONE[tone], className)}
    >
      {title && <strong className="font-semibold">{title} </strong>}
      {children}
      {action && <div className="mt-2">{action}</div>}
    </div>
  );
}
