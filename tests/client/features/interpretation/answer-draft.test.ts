import { beforeEach, describe, expect, it } from 'vitest';
import type { ReferenceAnswer } from '../../../../shared/contracts/reference.ts';
import {
  chooseClass,
  forgetDraft,
  keepDraft,
  nextConfidence,
  openDraft,
} from '../../../../client/src/features/interpretation/answer-draft.ts';

const given: ReferenceAnswer = {
  ...{ classId: 'a', alternateClassId: null, confidence: 'high' as const, note: 'seen' },
  ...{ source: 'image' as const, answeredAt: '2025-09-02T10:00:00.000Z' },
};
const begun = { classId: 'b', alternateClassId: 'a', confidence: 'low', note: 'wet' } as const;

beforeEach(() => localStorage.clear());

describe('an answer that is begun', () => {
  it('stands above the answer given, until it is forgotten', () => {
    const point = { id: 'p', answer: given };
    expect(openDraft(point, 'me')).toEqual({ classId: 'a', alternateClassId: null, confidence: 'high', note: 'seen' });
    keepDraft('p', 'me', begun);
    expect(openDraft(point, 'me')).toEqual(begun);
    forgetDraft('p', 'me');
    expect(openDraft(point, 'me').classId).toBe('a');
  });

  it('is not shown to somebody else at the same browser, nor at another point', () => {
    keepDraft('p', 'me', begun);
    expect(openDraft({ id: 'p', answer: null }, 'someone else').classId).toBeNull();
    expect(openDraft({ id: 'q', answer: null }, 'me').note).toBe('');
  });

  it('gives way to the answer given where its text can no longer be read', () => {
    localStorage.setItem('groundsel.answer.me.p', '{"classId":');
    expect(openDraft({ id: 'p', answer: given }, 'me').classId).toBe('a');
    localStorage.setItem('groundsel.answer.me.p', '{"classId":7}');
    expect(openDraft({ id: 'p', answer: given }, 'me').classId).toBe('a');
  });
});

describe('choosing', () => {
  it('never makes the second choice the same as the class', () => {
    const first = chooseClass({ classId: null, alternateClassId: null }, 'a', false);
    expect(chooseClass(first, 'a', true)).toEqual({ classId: 'a', alternateClassId: null });
    const both = chooseClass(first, 'b', true);
    expect(both).toEqual({ classId: 'a', alternateClassId: 'b' });
    expect(chooseClass(both, 'b', false)).toEqual({ classId: 'b', alternateClassId: null });
  });

  it('takes the second choice back when it is pressed again', () => {
    expect(chooseClass({ classId: 'a', alternateClassId: 'b' }, 'b', true).alternateClassId).toBeNull();
  });

  it('goes round the three confidences', () => {
    expect(nextConfidence(nextConfidence(nextConfidence('medium')))).toBe('medium');
    expect(new Set([nextConfidence('low'), nextConfidence('medium'), nextConfidence('high')]).size).toBe(3);
  });
});
