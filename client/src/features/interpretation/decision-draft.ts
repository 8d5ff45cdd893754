import { z } from 'zod';
import type { Disagreement } from '../../../../shared/contracts/reference.ts';

/** A decision as it is being made; nothing of it is on the server yet. */
export interface DecisionDraft {
  classId: string | null;
  alternateClassId: string | null;
  note: string;
}

const draftSchema = z.object({
  classId: z.string().nullable(),
  alternateClassId: z.string().nullable(),
  note: z.string(),
});

const keyOf = (pointId: string, personId: string) => `groundsel.decision.${personId}.${pointId}`;

/** What this person began for a point before, else the decision that stands, else nothing. */
export function openDecision({ point, decision }: Disagreement, personId: string): DecisionDraft {
  const text = localStorage.getItem(keyOf(point.id, personId));
  if (text) {
    try {
      const parsed = draftSchema.safeParse(JSON.parse(text));
      if (parsed.success) return parsed.data;
    } catch {
      // Text of an older version or another hand: the decision as it stands loses nothing.
    }
  }
  if (!decision) return { classId: null, alternateClassId: null, note: '' };
  const { classId, alternateClassId, note } = decision;
  return { classId, alternateClassId, note };
}

/** Kept in the browser until it is decided. */
export function keepDecision(pointId: string, personId: string, draft: DecisionDraft): void {
  localStorage.setItem(keyOf(pointId, personId), JSON.stringify(draft));
}

export function forgetDecision(pointId: string, personId: string): void {
  localStorage.removeItem(keyOf(pointId, personId));
}
