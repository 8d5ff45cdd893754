import type { StageState } from './stage.ts';

/** A stage's bud: closed and empty, half full while under way, opened when done. The shapes differ, not only the fill. */
export function Bud({ state, className }: { state: StageState; className?: string }) {
  return (
    <svg aria-hidden viewBox="0 0 22 22" className={className} strokeWidth="1.700" strokeLinejoin="round">
      {state === 'empty' && <path d={CLOSED} fill="var(--paper)" stroke="var(--edge)" />}
      {state === 'part' && (
        <>
          <path d={CLOSED} fill="var(--paper)" stroke="none" />
          <path d={CLOSED_LEFT_HALF} fill="var(--groundsel)" stroke="none" />
          <path d={CLOSED} fill="none" stroke="var(--groundsel-deep)" />
        </>
      )}
      {state === 'done' && <path d={OPEN} fill="var(--groundsel)" stroke="var(--groundsel-deep)" />}
    </svg>
  );
}

const CLOSED =
  'M11 2.200c4.600 4.300 6.600 7.500 6.600 10.700a6.600 6.600 0 0 1-13.200 0c0-3.200 2-6.400 6.600-10.700Z';
const CLOSED_LEFT_HALF = 'M11 2.200v17.300a6.600 6.600 0 0 1-6.600-6.600c0-3.200 2-6.400 6.600-10.700Z';
const OPEN =
  'M11 19.500c-4.800 0-7.900-3.300-7.900-8.200L2.700 4.900l4.600 2.900L11 2.400l3.700 5.400 4.600-2.900-.4 6.400c0 4.900-3.100 8.200-7.900 8.200Z';
