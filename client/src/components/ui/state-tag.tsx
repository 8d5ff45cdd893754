import type { ReactNode } from 'react';
import { classNames } from '../../lib/class-names.ts';

export type TagTone = 'plain' | 'working' | 'ok' | 'beware' | 'danger';

const TONE: Record<TagTone, string> = {
  plain: 'border-edge text-ink-soft',
  working: 'border-ink text-ink',
  ok: 'border-spruce bg-spruce-wash text-spruce',
  beware: 'border-groundsel-deep bg-groundsel-wash text-ink',
  danger: 'border-rust bg-rust-wash text-rust',
};

/** The state of a thing in one or two words. The shape before the word differs too, so colour is not alone. */
export function StateTag({
  tone = 'plain',
  children,
  className,
}: {
  tone?: TagTone;
  children: ReactNode;
  className?: string;
}) {
  return (
    <span
      className={classNames(
        'inline-flex items-center gap-1.5 rounded-full border px-2 py-px text-xs font-medium whitespace-nowrap',
        TONE[tone],
        className,
      )}
    >
      <StateShape tone={tone} />
      {children}
    </span>
  );
}

function StateShape({ tone }: { tone: TagTone }) {
  return (
    <svg aria-hidden viewBox="0 0 8 8" className="size-2" fill="none" stroke="currentColor" strokeWidth="1.4">
      {tone === 'plain' && <circle cx="4" cy="4" r="3" />}
      {tone === 'working' && (
        <>
          <circle cx="4" cy="4" r="3" />
          <path d="M4 1a3 3 0 0 1 0 6Z" fill="currentColor" stroke="none" />
        </>
      )}
      {tone === 'ok' && <circle cx="4" cy="4" r="3.4" fill="currentColor" stroke="none" />}
      {tone === 'beware' && <path d="M4 .8 7.4 7H.6Z" strokeLinejoin="round" />}
      {tone === 'danger' && <path d="M1 1l6 6M7 1 1 7" strokeLinecap="round" />}
    </svg>
  );
}
