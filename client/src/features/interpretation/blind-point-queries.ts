import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import {
  type BlindPoint,
  blindPointSchema,
  nextPointSchema,
  type PutAnswer,
} from '../../../../shared/contracts/reference.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { ProblemError } from '../../lib/problem-error.ts';
import { projectKey } from '../../lib/project/project-query.ts';

/** Outside the project's topics: what others do must not change the point under somebody's eyes. */
const checkKey = (designId: string, ...rest: readonly unknown[]) => ['blind-check', designId, ...rest];

/** The point to look at: one by its number, or with null the next that waits. */
const pointQuery = (designId: string, number: number | null) =>
  queryOptions({
    queryKey: checkKey(designId, number ?? 'next'),
    queryFn: async ({ signal }) => {
      if (number === null) return fetchJson(`/designs/${designId}/next`, nextPointSchema, { signal });
      const point = await fetchJson(`/designs/${designId}/points/${number}`, blindPointSchema, { signal });
      return { point, progress: point.progress };
    },
    // What waits next is decided by the server when it is asked, not remembered.
    gcTime: 0,
    staleTime: Infinity,
    refetchOnMount: 'always',
    refetchOnWindowFocus: false,
    refetchOnReconnect: false,
  });

export function useBlindPoint(designId: string, number: number | null) {
  return useQuery({ ...pointQuery(designId, number), placeholderData: (before) => before });
}

/** The point after, read ahead so that its pictures are there when it is gone to; null reads nothing. */
export function useFollowingPoint(designId: string, number: number | null): BlindPoint | null {
  const query = useQuery({ ...pointQuery(designId, number ?? 0), enabled: number !== null });
  return number === null ? null : (query.data?.point ?? null);
}

const LONGEST_WAIT_MS = 15_000;
const MOST_TRIES = 12;

/** No answer and the server's own faults pass; a refusal does not. */
const mayPass = (error: Error) => error instanceof ProblemError && (error.status === 0 || error.status >= 500);

/** Stores an answer, trying again by itself while the server does not answer. */
export function usePutAnswer(projectId: string, designId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ point, answer }: { point: BlindPoint; answer: PutAnswer }) =>
      fetchJson(`/points/${point.id}/answer`, blindPointSchema, { method: 'PUT', body: answer }),
    retry: (failures, error) => failures < MOST_TRIES && mayPass(error),
    retryDelay: (failures) => Math.min(LONGEST_WAIT_MS, 1000 * 2 ** failures),
    onSuccess: () => {
      queryClient.removeQueries({ queryKey: checkKey(designId), type: 'inactive' });
      void queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'designs') });
    },
  });
}

/** Puts a point at the end of the viewer's order. */
export function useSkipPoint(designId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (point: BlindPoint) =>
      fetchJson(`/points/${point.id}/skip`, nextPointSchema, { method: 'POST', body: {} }),
    onSuccess: () => queryClient.removeQueries({ queryKey: checkKey(designId), type: 'inactive' }),
  });
}
