import { queryOptions, useQuery } from '@tanstack/react-query';
import { mapComparisonSchema } from '../../../../shared/contracts/reference.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const compareMaps = (designId: string, runId: string, signal: AbortSignal) =>
  fetchJson(`/designs/${designId}/compare`, mapComparisonSchema, { query: { runId }, signal });

/** The design's map and another run's on the same points; nothing is asked without a run. */
const comparisonQuery = (projectId: string, designId: string, runId: string | null) =>
  queryOptions({
    queryKey: projectKey(projectId, 'designs', designId, 'compare', runId),
    queryFn: ({ signal }) => compareMaps(designId, runId ?? '', signal),
    enabled: runId !== null,
  });

export function useMapComparison(projectId: string, designId: string, runId: string | null) {
  return useQuery(comparisonQuery(projectId, designId, runId));
}
