import { keepPreviousData, queryOptions, useQuery } from '@tanstack/react-query';
import { signatureSetSchema } from '../../../../shared/contracts/signature.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const getSignatures = (projectId: string, sceneId: string, bands: readonly number[] | null, signal: AbortSignal) =>
  fetchJson(`/projects/${projectId}/signatures/${sceneId}`, signatureSetSchema, {
    query: bands ? { bands: bands.join(',') } : {},
    signal,
  });

/** Signatures of the classes in a scene; null bands are all of them. */
const signaturesQuery = (projectId: string, sceneId: string, bands: readonly number[] | null) =>
  queryOptions({
    queryKey: projectKey(projectId, 'samples', 'signatures', sceneId, bands),
    queryFn: ({ signal }) => getSignatures(projectId, sceneId, bands, signal),
    placeholderData: keepPreviousData,
  });

export function useSignatures(projectId: string, sceneId: string, bands: readonly number[] | null) {
  return useQuery(signaturesQuery(projectId, sceneId, bands));
}
