import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { sampleThreadSchema } from '../../../../shared/contracts/sample-review.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';
import { refreshSamples } from './samples-query.ts';

const threadQuery = (projectId: string, sampleId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'samples', 'thread', sampleId),
    queryFn: ({ signal }) => fetchJson(`/samples/${sampleId}/remarks`, sampleThreadSchema, { signal }),
  });

export function useSampleThread(projectId: string, sampleId: string) {
  return useQuery(threadQuery(projectId, sampleId));
}

type ThreadChange = { text: string } | { remarkId: string; resolved: boolean };

/** Adds a comment, or marks one as dealt with. */
export function useChangeThread(projectId: string, sampleId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (change: ThreadChange) =>
      'text' in change
        ? fetchJson(`/samples/${sampleId}/remarks`, sampleThreadSchema, { method: 'POST', body: change })
        : fetchJson(`/remarks/${change.remarkId}`, sampleThreadSchema, {
            method: 'PATCH',
            body: { resolved: change.resolved },
          }),
    onSuccess: (thread) => {
      queryClient.setQueryData(threadQuery(projectId, sampleId).queryKey, thread);
      void refreshSamples(queryClient, projectId);
    },
  });
}
