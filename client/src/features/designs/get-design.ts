import { queryOptions, useQuery } from '@tanstack/react-query';
import { designSchema } from '../../../../shared/contracts/reference.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const getDesign = (designId: string, signal: AbortSignal) =>
  fetchJson(`/designs/${designId}`, designSchema, { signal });

export const designQuery = (projectId: string, designId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'designs', designId),
    queryFn: ({ signal }) => getDesign(designId, signal),
  });

/** One reference design. */
export function useDesign(projectId: string, designId: string) {
  return useQuery(designQuery(projectId, designId));
}
