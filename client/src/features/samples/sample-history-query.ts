import { queryOptions, useQuery } from '@tanstack/react-query';
import { sampleHistorySchema } from '../../../../shared/contracts/sample.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const getSampleHistory = (sampleId: string, signal: AbortSignal) =>
  fetchJson(`/samples/${sampleId}/history`, sampleHistorySchema, { signal });

/** Every version of a sample, the newest first. */
const sampleHistoryQuery = (projectId: string, sampleId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'samples', sampleId, 'history'),
    queryFn: ({ signal }) => getSampleHistory(sampleId, signal),
    select: ({ versions }) => [...versions].sort((first, second) => second.versionNumber - first.versionNumber),
  });

export function useSampleHistory(projectId: string, sampleId: string) {
  return useQuery(sampleHistoryQuery(projectId, sampleId));
}
