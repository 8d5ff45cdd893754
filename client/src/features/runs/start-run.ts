import { useMutation, useQueryClient } from '@tanstack/react-query';
import { type StartRun, runSchema } from '../../../../shared/contracts/run.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';
import { runQuery } from './get-run.ts';

function startRun(projectId: string, body: StartRun) {
  return fetchJson(`/projects/${projectId}/runs`, runSchema, { method: 'POST', body });
}

/** Starts a run; it waits its turn in the queue. */
export function useStartRun(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (run: StartRun) => startRun(projectId, run),
    onSuccess: (run) => {
      queryClient.setQueryData(runQuery(projectId, run.id).queryKey, run);
      void queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'runs'), exact: true });
      void queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'project') });
    },
  });
}
