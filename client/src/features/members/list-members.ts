import { queryOptions, useQuery } from '@tanstack/react-query';
import { memberListSchema } from '../../../../shared/contracts/project.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const listMembers = (projectId: string, signal: AbortSignal) =>
  fetchJson(`/projects/${projectId}/members`, memberListSchema, { signal });

/** The project's people with their roles, by name. */
export const memberListQuery = (projectId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'members'),
    queryFn: ({ signal }) => listMembers(projectId, signal),
    select: ({ members }) => members,
  });

export function useMembers(projectId: string) {
  return useQuery(memberListQuery(projectId));
}
