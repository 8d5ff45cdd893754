import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { reproductionListSchema, reproductionSchema } from '../../../../shared/contracts/reproduction.ts';
import { runSchema } from '../../../../shared/contracts/run.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const LOOK_EVERY_MS = 1_500;

/** Attempts to make a run once more, newest first; asked again while one is under way. */
export function useReproductions(projectId: string, runId: string) {
  return useQuery({
    queryKey: projectKey(projectId, 'runs', runId, 'reproductions'),
    queryFn: ({ signal }) => fetchJson(`/runs/${runId}/reproductions`, reproductionListSchema, { signal }),
    refetchInterval: ({ state }) =>
      state.data?.reproductions.some(({ job }) => job?.state === 'queued' || job?.state === 'running')
        ? LOOK_EVERY_MS
        : false,
  });
}

/** Makes a finished run once more and compares the bytes of its class map. */
export function useReproduceRun(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (runId: string) => fetchJson(`/runs/${runId}/reproductions`, reproductionSchema, { method: 'POST' }),
    onSettled: () => queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'runs') }),
  });
}

/** Puts a failed or cancelled run back into the queue. */
export function useRetryRun(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ runId, anew }: { runId: string; anew: boolean }) =>
      fetchJson(`/runs/${runId}/retry`, runSchema, { method: 'POST', body: { anew } }),
    onSettled: () => queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'runs') }),
  });
}
