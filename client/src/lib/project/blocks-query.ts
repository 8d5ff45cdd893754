import { queryOptions, useQuery } from '@tanstack/react-query';
import { type Block, blockListSchema } from '../../../../shared/contracts/block.ts';
import { fetchJson } from '../fetch-json.ts';
import { projectKey } from './project-query.ts';

/** The project's blocks with their people and how far each is. */
export const blocksQuery = (projectId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'blocks', 'list'),
    queryFn: ({ signal }) => fetchJson(`/projects/${projectId}/blocks`, blockListSchema, { signal }),
  });

export function useBlocks(projectId: string) {
  return useQuery(blocksQuery(projectId));
}

/** Blocks given to a person that they are not done with, in the order of the work. */
export function openBlocksOf(blocks: readonly Block[], userId: string): Block[] {
  return blocks.filter(({ assignments }) => assignments.some(({ person, doneAt }) => person.id === userId && !doneAt));
}
