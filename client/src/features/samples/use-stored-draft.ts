import { useState } from 'react';
import type { Draft } from './draft.ts';
import { draftKey, readStoredDraft, storeDraft } from './stored-draft.ts';

/**
 * The open drawing, kept in this browser until it is saved or discarded.
 *
 * @param accept whether a drawing from before a reload can still be drawn (its scene and class are there)
 */
export function useStoredDraft(projectId: string, accountId: string, accept: (draft: Draft) => boolean) {
  const key = draftKey(projectId, accountId);
  const [draft, setDraft] = useState<Draft | null>(() => {
    const stored = readStoredDraft(key);
    return stored && accept(stored) ? stored : null;
  });
  const [isFromBefore, setIsFromBefore] = useState(draft !== null);
  const change = (next: Draft | null) => {
    setDraft(next);
    storeDraft(key, next);
    if (next === null) setIsFromBefore(false);
  };
  return { draft, setDraft: change, isFromBefore };
}
