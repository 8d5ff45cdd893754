import type { ReactNode } from 'react';
import { classNames } from '../../lib/class-names.ts';

export interface ReadingPageProps {
  /** A PageHeader. */
  header: ReactNode;
  /** `reading` is 16 px text in one column; `wide` lets tables and charts take the width. */
  width?: 'reading' | 'wide';
  children: ReactNode;
}

/** A page on paper: header above, body that scrolls. */
export function ReadingPage({ header, width = 'wide', children }: ReadingPageProps) {
  return (
    <>
      {header}
      <div className="relative min-h-0 grow overflow-y-auto px-11 py-6 max-lg:px-6 max-sm:overflow-visible max-sm:px-4 max-sm:py-4">
        <div
          className={classNames(
            'mx-auto',
            width === 'reading' ? 'max-w-3xl text-[1rem] leading-relaxed' : 'max-w-[82rem]',
          )}
        >
          {children}
        </div>
      </div>
    </>
  );
}

/** A part of a reading page with its heading, a line under it, and an act of its own at the right. */
export function Section({
  title,
  note,
  action,
  className,
  children,
}: {
  title: ReactNode;
  note?: ReactNode;
  action?: ReactNode;
  className?: string;
  children: ReactNode;
}) {
  return (
    <section className={classNames('min-w-0', className)}>
      <div className="mb-3 flex items-end gap-4">
        <div className="min-w-0 grow">
          <h2 className="text-lg font-semibold">{title}</h2>
          {note && <p className="text-sm text-ink-soft">{note}</p>}
        </div>
        {action}
      </div>
      {children}
    </section>
  );
}

/** The sentence a page comes to, large, with what it rests on above and below. Wrap the figure in `<Marked>`. */
export function Statement({ above, children, below }: { above?: ReactNode; children: ReactNode; below?: ReactNode }) {
  return (
    <div className="mb-6 border-b border-line pb-5">
      {above && <p className="text-sm text-ink-soft">{above}</p>}
      <p className="mt-1 max-w-[68rem] text-3xl font-medium tracking-[-0.4px] max-sm:text-2xl">{children}</p>
      {below && <div className="mt-2 max-w-[62rem] text-lg text-ink-soft">{below}</div>}
    </div>
  );
}

/** A figure under a marker stroke. */
export function Marked({ children }: { children: ReactNode }) {
  return <mark className="marked">{children}</mark>;
}
