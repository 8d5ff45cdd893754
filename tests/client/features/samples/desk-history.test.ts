import { describe, expect, it } from 'vitest';
import {
  type DeskHistory,
  type DeskStep,
  EMPTY_HISTORY,
  closeDrawing,
  describeStep,
  forgetSample,
  forgetStep,
  isWithinReach,
  pushStep,
  stepBack,
  stepForward,
} from '../../../../client/src/features/samples/desk-history.ts';
import { newDraft } from '../../../../client/src/features/samples/draft.ts';
import { square } from './sample-fixture.ts';

const created = (number: number): DeskStep => ({ kind: 'created', sampleId: `s${number}`, number });
const drawn: DeskStep = { kind: 'drawn', draft: newDraft('scene', 'class', square(0), 'medium') };
const shaped: DeskStep = { kind: 'shaped', before: square(0), after: square(1) };
const after = (...steps: DeskStep[]): DeskHistory => steps.reduce(pushStep, EMPTY_HISTORY);

describe('the desk’s line of steps', () => {
  it('goes back through steps, newest first, and forward again in the same order', () => {
    const one = stepBack(after(created(1), created(2)));
    expect(one?.step).toEqual(created(2));
    const two = stepBack(one!.history);
    expect(two?.step).toEqual(created(1));
    expect(stepBack(two!.history)).toBeNull();
    const again = stepForward(two!.history);
    expect(again?.step).toEqual(created(1));
    expect(stepForward(again!.history)?.step).toEqual(created(2));
  });

  it('forgets what was undone once something new is done', () => {
    const undone = stepBack(after(created(1), created(2)))!.history;
    expect(stepForward(pushStep(undone, created(3)))).toBeNull();
  });

  it('drops the steps of a drawing when it is saved or discarded, and keeps those of saved samples', () => {
    const history = stepBack(after(created(1), drawn, shaped))!.history;
    expect(history.future).toHaveLength(1);
    expect(closeDrawing(history)).toEqual({ past: [created(1)], future: [] });
  });

  it('forgets every step of a sample that someone else changed, in both directions', () => {
    const history = stepBack(after(created(1), created(2), { kind: 'deleted', sampleId: 's1', number: 1 }))!.history;
    expect(forgetSample(history, 's1')).toEqual({ past: [created(2)], future: [] });
  });

  it('forgets a deletion that was taken back from its note', () => {
    const history = after(created(1), { kind: 'deleted', sampleId: 's1', number: 1 });
    expect(forgetStep(history, 'deleted', 's1')).toEqual({ past: [created(1)], future: [] });
  });

  it('walks only the drawing’s own steps while one is open', () => {
    expect(isWithinReach(created(1), true, true)).toBe(false);
    expect(isWithinReach(shaped, true, true)).toBe(true);
    expect(isWithinReach(drawn, true, true)).toBe(true);
    expect(isWithinReach(drawn, true, false)).toBe(false);
  });

  it('brings a drawing back, and no change of outline, while none is open', () => {
    expect(isWithinReach(drawn, false, false)).toBe(true);
    expect(isWithinReach(shaped, false, true)).toBe(false);
    expect(isWithinReach(created(1), false, true)).toBe(true);
    expect(isWithinReach(undefined, false, true)).toBe(false);
  });

  it('keeps at most two hundred steps, the newest', () => {
    const history = after(...Array.from({ length: 230 }, (_, index) => created(index)));
    expect(history.past).toHaveLength(200);
    expect(history.past.at(-1)).toEqual(created(229));
  });

  it('names what was undone and what was done again', () => {
    expect(describeStep(created(7), true)).toBe('Sample 7 taken off again');
    expect(describeStep({ kind: 'deleted', sampleId: 's7', number: 7 }, true)).toBe('Sample 7 brought back');
    expect(describeStep(shaped, false)).toBe('Change of outline done again');
  });
});
