import { queryOptions, useQuery } from '@tanstack/react-query';
import { estimatesSchema } from '../../../../shared/contracts/reference.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const getEstimates = (designId: string, signal: AbortSignal) =>
  fetchJson(`/designs/${designId}/estimates`, estimatesSchema, { signal });

/** What the reference points of a closed design say of its map. */
const estimatesQuery = (projectId: string, designId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'designs', designId, 'estimates'),
    queryFn: ({ signal }) => getEstimates(designId, signal),
  });

export function useEstimates(projectId: string, designId: string) {
  return useQuery(estimatesQuery(projectId, designId));
}
