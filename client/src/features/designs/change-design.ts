import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { z } from 'zod';
import { type augmentDesignSchema, type Design, designSchema } from '../../../../shared/contracts/reference.ts';
import { fetchJson, sendRequest } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';
import { designQuery } from './get-design.ts';

/** What moves a design on; `adjudicate` ends interpretation. */
export type DesignAct =
  | { act: 'open' }
  | { act: 'adjudicate' }
  | { act: 'close'; leaveUnsettled: boolean }
  | { act: 'augment'; body: z.input<typeof augmentDesignSchema> };

function changeDesign(designId: string, change: DesignAct): Promise<Design> {
  const body =
    change.act === 'close' ? { leaveUnsettled: change.leaveUnsettled } : change.act === 'augment' ? change.body : {};
  return fetchJson(`/designs/${designId}/${change.act}`, designSchema, { method: 'POST', body });
}

/** Moves a design on: opens, ends interpretation, closes, augments. An augmented closed design answers with the new draft. */
export function useChangeDesign(projectId: string, designId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (change: DesignAct) => changeDesign(designId, change),
    onSuccess: (design) => {
      queryClient.setQueryData(designQuery(projectId, design.id).queryKey, design);
      for (const topic of ['designs', 'runs', 'accuracy', 'overview'] as const) {
        void queryClient.invalidateQueries({ queryKey: projectKey(projectId, topic) });
      }
    },
  });
}

/** Deletes a draft. @param onDeleted called even when the page that asked is gone by then */
export function useDeleteDesign(projectId: string, onDeleted: () => void) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (designId: string) => sendRequest(`/designs/${designId}`, { method: 'DELETE' }),
    onSuccess: () => {
      onDeleted();
      void queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'designs'), exact: true });
    },
  });
}
