import { queryOptions, useQuery } from '@tanstack/react-query';
import { overviewSchema } from '../../../../shared/contracts/project.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const getOverview = (projectId: string, signal: AbortSignal) =>
  fetchJson(`/projects/${projectId}/overview`, overviewSchema, { signal });

/** Where a project stands: what waits for the viewer, figures, recent activity. */
const overviewQuery = (projectId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'overview'),
    queryFn: ({ signal }) => getOverview(projectId, signal),
  });

export function useOverview(projectId: string) {
  return useQuery(overviewQuery(projectId));
}
