import { queryOptions, useQuery } from '@tanstack/react-query';
import { recipeDiffSchema } from '../../../../shared/contracts/named-recipe.ts';
import { runComparisonSchema } from '../../../../shared/contracts/run-comparison.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

export interface RunPair {
  first: string;
  second: string;
}

const runComparisonQuery = (projectId: string, pair: RunPair) =>
  queryOptions({
    queryKey: projectKey(projectId, 'runs', 'comparison', pair.first, pair.second),
    queryFn: ({ signal }) =>
      fetchJson(`/projects/${projectId}/run-comparison`, runComparisonSchema, { query: { ...pair }, signal }),
  });

/** Two maps laid over each other; nothing is asked while `pair` is null. */
export function useRunComparison(projectId: string, pair: RunPair | null) {
  return useQuery({
    ...runComparisonQuery(projectId, pair ?? { first: '', second: '' }),
    enabled: pair !== null,
    retry: false,
  });
}

/** What the recipes of two runs have that differs. */
export function useRecipeDiff(projectId: string, pair: RunPair | null) {
  return useQuery({
    queryKey: projectKey(projectId, 'runs', 'recipe-diff', pair?.first ?? '', pair?.second ?? ''),
    queryFn: ({ signal }) =>
      fetchJson(`/projects/${projectId}/recipe-diff`, recipeDiffSchema, {
        query: { left: `run:${pair?.first}`, right: `run:${pair?.second}` },
        signal,
      }),
    enabled: pair !== null,
  });
}
