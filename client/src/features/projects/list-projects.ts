import { queryOptions, useQuery } from '@tanstack/react-query';
import { projectListSchema } from '../../../../shared/contracts/project.ts';
import { fetchJson } from '../../lib/fetch-json.ts';

const listProjects = (signal: AbortSignal) => fetchJson('/projects', projectListSchema, { signal });

/** Projects the viewer is a member of, last changed first. */
export const projectListQuery = () =>
  queryOptions({
    queryKey: ['projects'],
    queryFn: ({ signal }) => listProjects(signal),
    select: ({ projects }) => projects,
  });

export function useProjects() {
  return useQuery(projectListQuery());
}
