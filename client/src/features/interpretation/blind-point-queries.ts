import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import {
  type BlindPoint,
  blindPointSchema,
  nextPointSchema,
  type PutAnswer,
} from '../../../../shared/contracts/reference.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
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
    refetchOnWindowFocus: false,
  });

export function useBlindPoint(designId: string, number: number | null) {
  return useQuery(pointQuery(designId, number));
}

/** Stores an answer, and forgets what was asked before so that the next point is the server's choice. */
export function usePutAnswer(projectId: string, designId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ point, answer }: { point: BlindPoint; answer: PutAnswer }) =>
      fetchJson(`/points/${point.id}/answer`, blindPointSchema, { method: 'PUT', body: answer }),
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
