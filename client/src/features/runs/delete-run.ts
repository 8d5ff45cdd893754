import { useMutation, useQueryClient } from '@tanstack/react-query';
import { sendRequest } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

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
    onSuccess: () => {
      onDeleted();
      // Exact: the run's own page, still there for a moment, must not ask for what is gone.
      for (const topic of ['runs', 'accuracy', 'project', 'overview'] as const) {
        void queryClient.invalidateQueries({ queryKey: projectKey(projectId, topic), exact: topic === 'runs' });
      }
    },
  });
}
