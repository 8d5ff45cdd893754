import { useMutation, useQueryClient } from '@tanstack/react-query';
import { sendRequest } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';
import { runQuery } from './get-run.ts';

const deleteRun = (runId: string) => sendRequest(`/runs/${runId}`, { method: 'DELETE' });

/**
 * Deletes an ended run with its class map.
 *
 * @param onDeleted called even when the page that asked is gone by then: the project's event may come before the answer
 */
export function useDeleteRun(projectId: string, onDeleted: () => void) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: deleteRun,
    onSuccess: (_, runId) => {
      onDeleted();
      queryClient.removeQueries({ queryKey: runQuery(projectId, runId).queryKey });
      for (const topic of ['runs', 'accuracy', 'project', 'overview'] as const) {
        void queryClient.invalidateQueries({ queryKey: projectKey(projectId, topic), exact: topic === 'runs' });
      }
    },
  });
}
