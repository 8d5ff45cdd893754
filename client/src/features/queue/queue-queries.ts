import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { type JobPriority, jobSchema } from '../../../../shared/contracts/job.ts';
import { queueSchema } from '../../../../shared/contracts/queue.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

/** Work of other projects sends no events here, so the queue is asked again while it is looked at. */
const LOOK_EVERY_MS = 3_000;

const queueQuery = (projectId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'runs', 'queue'),
    queryFn: ({ signal }) => fetchJson(`/projects/${projectId}/queue`, queueSchema, { signal }),
    refetchInterval: LOOK_EVERY_MS,
  });

/** What works and what waits, as members of a project may see it. */
export function useQueue(projectId: string) {
  return useQuery(queueQuery(projectId));
}

const SITE_QUEUE = ['site', 'queue'] as const;

/** What works and what waits over all projects, for site administrators. */
export function useSiteQueue() {
  return useQuery({
    queryKey: SITE_QUEUE,
    queryFn: ({ signal }) => fetchJson('/site/queue', queueSchema, { signal }),
    refetchInterval: LOOK_EVERY_MS,
  });
}

/** Puts waiting jobs before all others, in this order. */
export function useOrderSiteQueue() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (jobIds: readonly string[]) =>
      fetchJson('/site/queue/order', queueSchema, { method: 'PUT', body: { jobIds } }),
    onSuccess: (queue) => queryClient.setQueryData(SITE_QUEUE, queue),
  });
}

/** Which of the project's own waiting jobs goes first. */
export function useSetPriority(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ jobId, priority }: { jobId: string; priority: JobPriority }) =>
      fetchJson(`/jobs/${jobId}/priority`, jobSchema, { method: 'PUT', body: { priority } }),
    onSettled: () => queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'runs') }),
  });
}

/** Stops a job that waits or works. */
export function useCancelJob(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (jobId: string) => fetchJson(`/jobs/${jobId}/cancel`, jobSchema, { method: 'POST' }),
    onSettled: () => queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'runs') }),
  });
}
