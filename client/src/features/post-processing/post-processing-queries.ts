import { keepPreviousData, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import {
  type PostProcessingStep,
  postProcessingPreviewSchema,
  runPostProcessingSchema,
} from '../../../../shared/contracts/post-processing.ts';
import { jobSchema } from '../../../../shared/contracts/job.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const LOOK_EVERY_MS = 1_200;

/** The list of steps applied to a run's map, with its revisions; asked again while one is being applied. */
export function usePostProcessing(projectId: string, runId: string | null) {
  return useQuery({
    queryKey: projectKey(projectId, 'runs', runId ?? '', 'post-processing'),
    queryFn: ({ signal }) => fetchJson(`/runs/${runId}/post-processing`, runPostProcessingSchema, { signal }),
    enabled: runId !== null,
    refetchInterval: ({ state }) =>
      state.data?.revisions.some(({ job }) => job?.state === 'queued' || job?.state === 'running')
        ? LOOK_EVERY_MS
        : false,
  });
}

/** What a list would make of the classifier's map. A change of the list hangs up on the request before. */
export function usePreview(projectId: string, runId: string, steps: readonly PostProcessingStep[], isOn: boolean) {
  return useQuery({
    queryKey: projectKey(projectId, 'runs', runId, 'post-processing', 'preview', steps),
    queryFn: ({ signal }) =>
      fetchJson(`/runs/${runId}/post-processing/preview`, postProcessingPreviewSchema, {
        ...{ method: 'POST', body: { steps }, signal },
      }),
    enabled: isOn,
    retry: false,
    staleTime: Infinity,
    placeholderData: keepPreviousData,
  });
}

/** Keeps a list as the next revision and has it applied. */
export function useApplySteps(projectId: string, runId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: { steps: readonly PostProcessingStep[]; basedOn: number }) =>
      fetchJson(`/runs/${runId}/post-processing`, runPostProcessingSchema, { method: 'POST', body }),
    onSettled: () => queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'runs') }),
  });
}

/** Stops the application under way; the map stays as it was. */
export function useStopApplying(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (jobId: string) => fetchJson(`/jobs/${jobId}/cancel`, jobSchema, { method: 'POST' }),
    onSettled: () => queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'runs') }),
  });
}
