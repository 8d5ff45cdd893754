import { z } from 'zod';
import type { BlindPoint } from '../../../../shared/contracts/reference.ts';
import { type Confidence, confidenceSchema } from '../../../../shared/contracts/sample.ts';

/** An answer as it is being given; nothing of it is on the server yet. */
export interface AnswerDraft {
  classId: string | null;
  alternateClassId: string | null;
  confidence: Confidence;
  note: string;
}

const draftSchema = z.object({
  classId: z.string().nullable(),
  alternateClassId: z.string().nullable(),
  confidence: confidenceSchema,
  note: z.string(),
});

const EMPTY: AnswerDraft = { classId: null, alternateClassId: null, confidence: 'medium', note: '' };
const keyOf = (pointId: string) => `groundsel.answer.${pointId}`;

/** What was begun for a point before, else the answer given, else nothing. */
export function openDraft(point: BlindPoint): AnswerDraft {
  const text = localStorage.getItem(keyOf(point.id));
  if (text) {
    try {
      const parsed = draftSchema.safeParse(JSON.parse(text));
      if (parsed.success) return parsed.data;
    } catch {
      // Text of an older version or another hand: the answer as it stands loses nothing.
    }
  }
  if (!point.answer) return EMPTY;
  const { classId, alternateClassId, confidence, note } = point.answer;
  return { classId, alternateClassId, confidence, note };
}

/** Kept in the browser until it is saved, through a reload or a lost line. */
export function keepDraft(pointId: string, draft: AnswerDraft): void {
  localStorage.setItem(keyOf(pointId), JSON.stringify(draft));
}

export function forgetDraft(pointId: string): void {
  localStorage.removeItem(keyOf(pointId));
}

/** The draft with a class chosen; the first choice and the alternate are never the same. */
export function chooseClass(draft: AnswerDraft, classId: string, isAlternate: boolean): AnswerDraft {
  if (isAlternate) {
    if (classId === draft.classId) return draft;
    return { ...draft, alternateClassId: draft.alternateClassId === classId ? null : classId };
  }
  return { ...draft, classId, alternateClassId: draft.alternateClassId === classId ? null : draft.alternateClassId };
}

const CONFIDENCES = confidenceSchema.options;

/** The next confidence, round and round. */
export function nextConfidence(confidence: Confidence): Confidence {
  return CONFIDENCES[(CONFIDENCES.indexOf(confidence) + 1) % CONFIDENCES.length] ?? 'medium';
}
