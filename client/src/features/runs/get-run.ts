import { queryOptions, useQuery } from '@tanstack/react-query';
import { runSchema } from '../../../../shared/contracts/run.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const getRun = (runId: string, signal: AbortSignal) => fetchJson(`/runs/${runId}`, runSchema, { signal });

/** One run with its recipe, progress and areas. */
export const runQuery = (projectId: string, runId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'runs', runId),
    queryFn: ({ signal }) => getRun(runId, signal),
  });

/** Nothing is asked while `runId` is null. */
export function useRun(projectId: string, runId: string | null) {
  return useQuery({ ...runQuery(projectId, runId ?? ''), enabled: runId !== null });
}
