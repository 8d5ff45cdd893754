import { useMutation, useQueryClient } from '@tanstack/react-query';
import {
  type AssignBlocks,
  type Block,
  type BlockList,
  type CutBlocks,
  type DrawBlock,
  type SettleBlock,
  blockListSchema,
} from '../../../../shared/contracts/block.ts';
import { fetchJson, sendRequest } from '../../lib/fetch-json.ts';
import { blocksQuery } from '../../lib/project/blocks-query.ts';
import { projectKey } from '../../lib/project/project-query.ts';

function useListChange<T>(projectId: string, send: (input: T) => Promise<BlockList>) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: send,
    onSuccess: (list) => {
      queryClient.setQueryData(blocksQuery(projectId).queryKey, list);
      for (const topic of ['samples', 'overview'] as const)
        void queryClient.invalidateQueries({ queryKey: projectKey(projectId, topic) });
    },
  });
}

export const useCutBlocks = (projectId: string) =>
  useListChange(projectId, (body: CutBlocks) =>
    fetchJson(`/projects/${projectId}/blocks/grid`, blockListSchema, { method: 'POST', body }),
  );
export const useDrawBlock = (projectId: string) =>
  useListChange(projectId, (body: DrawBlock) =>
    fetchJson(`/projects/${projectId}/blocks`, blockListSchema, { method: 'POST', body }),
  );
export const useAssignBlocks = (projectId: string) =>
  useListChange(projectId, (body: AssignBlocks) =>
    fetchJson(`/projects/${projectId}/blocks/assign`, blockListSchema, { method: 'POST', body }),
  );

/** Removes a block; its samples stay. */
export function useDeleteBlock(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (block: Block) => sendRequest(`/blocks/${block.id}`, { method: 'DELETE' }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'blocks') }),
  });
}

/** Keeps one of two samples that differ. */
export function useSettle(projectId: string, blockId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: SettleBlock) => sendRequest(`/blocks/${blockId}/settle`, { method: 'POST', body }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'samples') }),
  });
}
