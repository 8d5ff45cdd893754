import { useState } from 'react';
import type { PostProcessingStep } from '../../../../shared/contracts/post-processing.ts';

type Steps = readonly PostProcessingStep[];
interface History {
  past: readonly Steps[];
  now: Steps;
  future: readonly Steps[];
}

export interface StepList {
  steps: Steps;
  canUndo: boolean;
  canRedo: boolean;
  /** Puts another list in place of this one; it can be taken back. */
  set: (steps: Steps) => void;
  undo: () => void;
  redo: () => void;
}

const MAX_PAST = 100;

/** A list of steps being worked on, with undo and redo; it begins with `first`. */
export function useStepList(first: Steps): StepList {
  const [history, setHistory] = useState<History>({ past: [], now: first, future: [] });
  const { past, now, future } = history;
  return {
    steps: now,
    canUndo: past.length > 0,
    canRedo: future.length > 0,
    set: (steps) =>
      setHistory((before) => ({ past: [...before.past, before.now].slice(-MAX_PAST), now: steps, future: [] })),
    undo: () =>
      setHistory((before) => {
        const last = before.past.at(-1);
        return last ? { past: before.past.slice(0, -1), now: last, future: [before.now, ...before.future] } : before;
      }),
    redo: () =>
      setHistory((before) => {
        const [next, ...rest] = before.future;
        return next ? { past: [...before.past, before.now], now: next, future: rest } : before;
      }),
  };
}

/** Whether two lists do the same. Who made an edit and when is the server's to say, and the order of fields tells nothing. */
export function areSameSteps(one: Steps, other: Steps): boolean {
  const plain = (steps: Steps) =>
    JSON.stringify(
      steps.map((step) =>
        Object.entries(step)
          .filter(([field]) => field !== 'by' && field !== 'at')
          .sort(([a], [b]) => (a < b ? -1 : 1)),
      ),
    );
  return plain(one) === plain(other);
}

/** The list with one member moved a place up (−1) or down (+1). */
export function moveStep(steps: Steps, index: number, by: -1 | 1): Steps {
  const to = index + by;
  const [one, other] = [steps[index], steps[to]];
  if (!one || !other) return steps;
  return steps.map((step, i) => (i === index ? other : i === to ? one : step));
}
