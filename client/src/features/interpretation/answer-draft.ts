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
/** Somebody else at the same browser must not be shown what was begun here. */
const keyOf = (pointId: string, personId: string) => `groundsel.answer.${personId}.${pointId}`;

/** What this person began for a point before; null without it. */
export function readDraft(pointId: string, personId: string): AnswerDraft | null {
  const text = localStorage.getItem(keyOf(pointId, personId));
  if (!text) return null;
  try {
    const parsed = draftSchema.safeParse(JSON.parse(text));
    return parsed.success ? parsed.data : null;
  } catch {
    // Text of an older version or another hand: the answer as it stands loses nothing.
    return null;
  }
}

/** What was begun for a point before, else the answer given, else nothing. */
export function openDraft(point: Pick<BlindPoint, 'id' | 'answer'>, personId: string): AnswerDraft {
  const begun = readDraft(point.id, personId);
  if (begun) return begun;
  if (!point.answer) return EMPTY;
  const { classId, alternateClassId, confidence, note } = point.answer;
  return { classId, alternateClassId, confidence, note };
}

/** Kept in the browser until it is saved, through a reload or a lost line. */
export function keepDraft(pointId: string, personId: string, draft: AnswerDraft): void {
  localStorage.setItem(keyOf(pointId, personId), JSON.stringify(draft));
}

export function forgetDraft(pointId: string, personId: string): void {
  localStorage.removeItem(keyOf(pointId, personId));
}

/** The draft with a class chosen; the first choice and the second are never the same. */
export function chooseClass<T extends Pick<AnswerDraft, 'classId' | 'alternateClassId'>>(
  draft: T,
  classId: string,
  isAlternate: boolean,
): T {
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
