import { z } from 'zod';
import { idSchema, instantSchema } from '../../../../shared/contracts/common.ts';
import { polygonSchema } from '../../../../shared/contracts/geometry.ts';
import { confidenceSchema } from '../../../../shared/contracts/sample.ts';
import type { Draft } from './draft.ts';

const fields = {
  classId: idSchema,
  geometry: polygonSchema,
  confidence: confidenceSchema,
  note: z.string().max(2_000),
};
const storedDraftSchema = z.object({
  ...fields,
  id: idSchema,
  sceneId: idSchema,
  base: z.object({ ...fields, number: z.number().int(), version: z.number().int() }).nullable(),
  startedAt: instantSchema,
});

/** Where a person's unsaved drawing in a project is kept in this browser. */
export function draftKey(projectId: string, accountId: string): string {
  return `groundsel.draft.${projectId}.${accountId}`;
}

/** The drawing kept from before a reload; null without one or when it can no longer be read. */
export function readStoredDraft(key: string): Draft | null {
  const text = localStorage.getItem(key);
  if (!text) return null;
  try {
    return storedDraftSchema.parse(JSON.parse(text));
  } catch {
    // Written by another version of this page: nothing of it can be drawn, so it is not offered.
    localStorage.removeItem(key);
    return null;
  }
}

/** Keeps a drawing through a reload; null forgets it. */
export function storeDraft(key: string, draft: Draft | null): void {
  if (draft) localStorage.setItem(key, JSON.stringify(draft));
  else localStorage.removeItem(key);
}
