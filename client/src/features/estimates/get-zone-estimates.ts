import { queryOptions, useQuery } from '@tanstack/react-query';
import { zoneEstimatesSchema } from '../../../../shared/contracts/zone.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const getZoneEstimates = (designId: string, layerId: string, signal: AbortSignal) =>
  fetchJson(`/designs/${designId}/zones`, zoneEstimatesSchema, { query: { layerId }, signal });

/** What the reference points say of each zone; nothing is asked without a layer. */
const zoneEstimatesQuery = (projectId: string, designId: string, layerId: string | null) =>
  queryOptions({
    queryKey: projectKey(projectId, 'designs', designId, 'zones', layerId),
    queryFn: ({ signal }) => getZoneEstimates(designId, layerId ?? '', signal),
    enabled: layerId !== null,
  });

export function useZoneEstimates(projectId: string, designId: string, layerId: string | null) {
  return useQuery(zoneEstimatesQuery(projectId, designId, layerId));
}
