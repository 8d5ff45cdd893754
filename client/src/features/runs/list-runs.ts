import { queryOptions, useQuery } from '@tanstack/react-query';
import { runListSchema } from '../../../../shared/contracts/run.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const listRuns = (projectId: string, signal: AbortSignal) =>
  fetchJson(`/projects/${projectId}/runs`, runListSchema, { signal });

/** The project's runs, newest first; events move the bars of those under way. */
const runsQuery = (projectId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'runs'),
    queryFn: ({ signal }) => listRuns(projectId, signal),
    select: ({ runs }) => runs,
  });

export function useRuns(projectId: string, isOn = true) {
  return useQuery({ ...runsQuery(projectId), enabled: isOn });
}
