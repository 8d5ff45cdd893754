import { useQuery } from '@tanstack/react-query';
import { recipeDiffSchema } from '../../../../shared/contracts/named-recipe.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

/** What sets two recipes apart; each side is `run:<id>` or `recipe:<id>`, null while it is not chosen. */
export function useRecipeDiff(projectId: string, left: string | null, right: string | null) {
  return useQuery({
    queryKey: projectKey(projectId, 'runs', 'recipe-diff', left, right),
    queryFn: ({ signal }) =>
      fetchJson(`/projects/${projectId}/recipe-diff`, recipeDiffSchema, { query: { left, right }, signal }),
    enabled: left !== null && right !== null,
  });
}
