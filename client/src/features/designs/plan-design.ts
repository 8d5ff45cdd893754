import { keepPreviousData, queryOptions, useQuery } from '@tanstack/react-query';
import { designPlanSchema, type PlanDesign } from '../../../../shared/contracts/reference.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const planDesign = (projectId: string, plan: PlanDesign, signal: AbortSignal) =>
  fetchJson(`/projects/${projectId}/designs/plan`, designPlanSchema, { method: 'POST', body: plan, signal });

/** What a plan comes to; nothing is stored. Null while a field of it is wrong. */
const planQuery = (projectId: string, plan: PlanDesign | null) =>
  queryOptions({
    queryKey: projectKey(projectId, 'designs', 'plan', plan),
    queryFn: ({ signal }) => {
      if (!plan) throw new Error('Nothing to plan.');
      return planDesign(projectId, plan, signal);
    },
    enabled: plan !== null,
    placeholderData: keepPreviousData,
  });

export function useDesignPlan(projectId: string, plan: PlanDesign | null) {
  return useQuery(planQuery(projectId, plan));
}
