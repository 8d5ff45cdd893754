import { useQuery } from '@tanstack/react-query';
import { jobLogSchema } from '../../../../shared/contracts/queue.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const LOOK_EVERY_MS = 2_000;

/** The log of a job; asked again while the job works. */
export function useJobLog(projectId: string, jobId: string, isUnderWay: boolean) {
  return useQuery({
    queryKey: projectKey(projectId, 'runs', 'log', jobId),
    queryFn: ({ signal }) => fetchJson(`/jobs/${jobId}/log`, jobLogSchema, { signal }),
    select: ({ entries }) => entries,
    refetchInterval: isUnderWay ? LOOK_EVERY_MS : false,
  });
}
