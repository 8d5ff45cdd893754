import { queryOptions, useQuery } from '@tanstack/react-query';
import { landClassListSchema } from '../../../../shared/contracts/land-class.ts';
import { fetchJson } from '../fetch-json.ts';
import { projectKey } from './project-query.ts';

const listClasses = (projectId: string, signal: AbortSignal) =>
  fetchJson(`/projects/${projectId}/classes`, landClassListSchema, { signal });

/** The class scheme in its order; every stage after it prints by it. */
export const classesQuery = (projectId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'classes'),
    queryFn: ({ signal }) => listClasses(projectId, signal),
    select: ({ classes }) => classes,
  });

export function useClasses(projectId: string) {
  return useQuery(classesQuery(projectId));
}
