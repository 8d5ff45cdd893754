import type { ReactNode } from 'react';
import { classNames } from '../../lib/class-names.ts';

/** A key's name, as on the key. */
export function Kbd({ children, className }: { children: ReactNode; className?: string }) {
  return (
    <kbd
      className={classNames(
        'inline-flex min-w-4.5 items-center justify-center rounded border border-line px-1 font-sans text-2xs font-medium text-ink-soft',
        className,
      )}
    >
      {children}
    </kbd>
  );
}
