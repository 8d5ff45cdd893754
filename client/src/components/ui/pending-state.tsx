import { classNames } from '../../lib/class-names.ts';

/** A grey shape the size of what is on its way. */
export function Skeleton({ className }: { className?: string }) {
  return <span aria-hidden className={classNames('waiting block rounded-md bg-line/70', className ?? 'h-4 w-full')} />;
}

export interface PendingStateProps {
  /** What is being fetched, read out: "Loading samples". */
  label: string;
  /** The shape of what comes: a table, text, figures, or one block (chart, map). */
  shape?: 'table' | 'text' | 'figures' | 'block';
  rows?: number;
  className?: string;
}

/** Stands for a part of the page while it is fetched, in its shape. */
export function PendingState({ label, shape = 'text', rows = 5, className }: PendingStateProps) {
  const lines = Array.from({ length: rows }, (_, index) => index);
  return (
    <div role="status" className={className}>
      <span className="sr-only">{label}…</span>
      {shape === 'block' && <Skeleton className="h-56 w-full rounded-lg" />}
      {shape === 'figures' && (
        <div className="flex gap-8">
          {lines.map((line) => (
            <div key={line} className="w-32 space-y-2">
              <Skeleton className="h-6 w-24" />
              <Skeleton className="h-3 w-32" />
            </div>
          ))}
        </div>
      )}
      {shape === 'text' && (
        <div className="max-w-2xl space-y-3">
          {lines.map((line) => (
            <Skeleton key={line} className={classNames('h-4', WIDTHS[line % WIDTHS.length])} />
          ))}
        </div>
      )}
      {shape === 'table' && (
        <div className="divide-y divide-line border-y border-line">
          {lines.map((line) => (
            <div key={line} className="flex gap-6 py-3">
              <Skeleton className="h-3.5 w-1/4" />
              <Skeleton className="h-3.5 w-1/6" />
              <Skeleton className="ml-auto h-3.5 w-1/12" />
            </div>
          ))}
        </div>
      )}
    </div>
  );
}

const WIDTHS = ['w-11/12', 'w-full', 'w-4/5', 'w-10/12', 'w-2/3'];
