import { useMutation, useQueryClient } from '@tanstack/react-query';
import { runSchema } from '../../../../shared/contracts/run.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const cancelRun = (runId: string) => fetchJson(`/runs/${runId}/cancel`, runSchema, { method: 'POST' });

/** Stops a run that waits or works. */
export function useCancelRun(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: cancelRun,
    onSettled: () => queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'runs') }),
  });
}
