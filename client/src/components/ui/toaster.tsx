import { Toaster as Base, toast } from 'sonner';
import { asProblem } from '../../lib/problem-error.ts';

/** Where notes about finished acts appear; once, in the providers. Never used for what must be read. */
export function Toaster() {
  return (
    <Base
      position="bottom-center"
      // A map page's strip of tools stays free.
      offset={{ bottom: 'calc(var(--page-foot, 0px) + 24px)' }}
      duration={5000}
      toastOptions={{
        unstyled: true,
        classNames: {
          toast:
            'flex w-[min(92vw,26rem)] items-center gap-3 rounded-lg bg-ink px-4 py-3 text-base text-paper shadow-lift font-sans',
          description: 'text-sm opacity-80',
          actionButton: 'ml-auto rounded-md px-2 py-1 font-semibold underline underline-offset-3',
        },
      }}
    />
  );
}

export interface WayBack {
  label?: string;
  onUndo: () => void;
}

/**
 * Says that something was done, with a way back where there is one.
 *
 * @param line notes of one line of work take each other's place: a walk through many undos leaves one note
 */
export function sayDone(text: string, undo?: WayBack, line?: string): void {
  toast(text, {
    ...(line && { id: line }),
    // Set either way: a note that takes another's place must not keep its button.
    action: undo ? { label: undo.label ?? 'Undo', onClick: undo.onUndo } : undefined,
  });
}

/** Says that something could not be done, with its reason and what to do. */
export function sayProblem(error: unknown): void {
  const problem = asProblem(error);
  toast(problem.title, {
    description: [problem.detail, problem.advice].filter(Boolean).join(' '),
    duration: 10_000,
  });
}
