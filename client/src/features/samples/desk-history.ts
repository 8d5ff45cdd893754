import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import type { Draft, SampleFields } from './draft.ts';

/** One thing a person did at the desk that can be taken back. */
export type DeskStep =
  | { kind: 'drawn'; draft: Draft }
  | { kind: 'shaped'; before: Polygon; after: Polygon }
  | { kind: 'created'; sampleId: string; number: number }
  | { kind: 'changed'; sampleId: string; number: number; before: SampleFields; after: SampleFields }
  | { kind: 'deleted'; sampleId: string; number: number };

export interface DeskHistory {
  /** Oldest first. */
  past: readonly DeskStep[];
  /** The next one to do again last. */
  future: readonly DeskStep[];
}

export const EMPTY_HISTORY: DeskHistory = { past: [], future: [] };
const LONGEST = 200;

/** Adds a step; what had been undone can no longer be done again. */
export function pushStep(history: DeskHistory, step: DeskStep): DeskHistory {
  return { past: [...history.past, step].slice(-LONGEST), future: [] };
}

/** The step an undo takes back, and the history after it. */
export function stepBack(history: DeskHistory): { step: DeskStep; history: DeskHistory } | null {
  const step = history.past.at(-1);
  if (!step) return null;
  return { step, history: { past: history.past.slice(0, -1), future: [...history.future, step] } };
}

/** The step a redo does again, and the history after it. */
export function stepForward(history: DeskHistory): { step: DeskStep; history: DeskHistory } | null {
  const step = history.future.at(-1);
  if (!step) return null;
  return { step, history: { past: [...history.past, step], future: history.future.slice(0, -1) } };
}

/** Forgets the steps of the open drawing: it was saved or discarded. Steps of saved samples stay. */
export function closeDrawing(history: DeskHistory): DeskHistory {
  const isOfSaved = (step: DeskStep) => step.kind !== 'drawn' && step.kind !== 'shaped';
  return { past: history.past.filter(isOfSaved), future: history.future.filter(isOfSaved) };
}

/** Forgets what concerns one sample: someone else changed it, so that taking it back would take theirs. */
export function forgetSample(history: DeskHistory, sampleId: string): DeskHistory {
  const isOther = (step: DeskStep) => !('sampleId' in step) || step.sampleId !== sampleId;
  return { past: history.past.filter(isOther), future: history.future.filter(isOther) };
}

/** Forgets one kind of step of a sample: it was taken back another way. */
export function forgetStep(history: DeskHistory, kind: DeskStep['kind'], sampleId: string): DeskHistory {
  const keep = (step: DeskStep) => !(step.kind === kind && 'sampleId' in step && step.sampleId === sampleId);
  return { past: history.past.filter(keep), future: history.future.filter(keep) };
}

/** While a drawing is open only its own steps are walked; without one, its changes of outline have nothing to act on. */
export function isWithinReach(step: DeskStep | undefined, isDrawingOpen: boolean, isUndo: boolean): boolean {
  if (!step) return false;
  if (step.kind === 'shaped') return isDrawingOpen;
  if (step.kind === 'drawn') return isUndo === isDrawingOpen;
  return !isDrawingOpen;
}

/** What an undo (or redo) of the step did, for the toast. */
export function describeStep(step: DeskStep, isUndo: boolean): string {
  switch (step.kind) {
    case 'drawn':
      return isUndo ? 'Drawing taken back' : 'Drawing brought back';
    case 'shaped':
      return isUndo ? 'Change of outline undone' : 'Change of outline done again';
    case 'created':
      return isUndo ? `Sample ${step.number} taken off again` : `Sample ${step.number} put back`;
    case 'changed':
      return isUndo ? `Change of sample ${step.number} undone` : `Change of sample ${step.number} done again`;
    case 'deleted':
      return isUndo ? `Sample ${step.number} brought back` : `Sample ${step.number} deleted again`;
  }
}
