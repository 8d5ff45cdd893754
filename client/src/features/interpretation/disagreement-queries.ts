import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { z } from 'zod';
import {
  disagreementListSchema,
  disagreementSchema,
  type putDecisionSchema,
} from '../../../../shared/contracts/reference.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const listDisagreements = (designId: string, signal: AbortSignal) =>
  fetchJson(`/designs/${designId}/disagreements`, disagreementListSchema, { signal });

/** Points whose answers differ, or that nobody answered; only once the blind check has ended. */
const disagreementsQuery = (projectId: string, designId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'designs', designId, 'disagreements'),
    queryFn: ({ signal }) => listDisagreements(designId, signal),
  });

export function useDisagreements(projectId: string, designId: string) {
  return useQuery(disagreementsQuery(projectId, designId));
}

type DecisionInput = z.input<typeof putDecisionSchema>;

/** Decides what a point is. */
export function useDecide(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ pointId, decision }: { pointId: string; decision: DecisionInput }) =>
      fetchJson(`/points/${pointId}/decision`, disagreementSchema, { method: 'PUT', body: decision }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'designs') }),
  });
}
