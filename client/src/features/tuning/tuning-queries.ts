import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { type StartTuning, tuningListSchema, tuningSchema } from '../../../../shared/contracts/tuning.ts';
import { fetchJson, sendRequest } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const LOOK_EVERY_MS = 1_500;
const tuningsKey = (projectId: string, ...rest: readonly string[]) => projectKey(projectId, 'runs', 'tunings', ...rest);

/** The project's searches for settings, newest first. */
export function useTunings(projectId: string) {
  return useQuery({
    queryKey: tuningsKey(projectId),
    queryFn: ({ signal }) => fetchJson(`/projects/${projectId}/tunings`, tuningListSchema, { signal }),
    select: ({ tunings }) => tunings,
  });
}

/** One search; asked again while it works. Nothing is asked while `tuningId` is null. */
export function useTuning(projectId: string, tuningId: string | null) {
  return useQuery({
    queryKey: tuningsKey(projectId, tuningId ?? ''),
    queryFn: ({ signal }) => fetchJson(`/tunings/${tuningId ?? ''}`, tuningSchema, { signal }),
    enabled: tuningId !== null,
    refetchInterval: ({ state }) =>
      state.data?.job?.state === 'queued' || state.data?.job?.state === 'running' ? LOOK_EVERY_MS : false,
  });
}

/** Starts a search; it waits its turn in the queue. */
export function useStartTuning(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: StartTuning) =>
      fetchJson(`/projects/${projectId}/tunings`, tuningSchema, { method: 'POST', body }),
    onSettled: () => queryClient.invalidateQueries({ queryKey: tuningsKey(projectId) }),
  });
}

/** Deletes an ended search. */
export function useDeleteTuning(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (tuningId: string) => sendRequest(`/tunings/${tuningId}`, { method: 'DELETE' }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: tuningsKey(projectId), exact: true }),
  });
}
