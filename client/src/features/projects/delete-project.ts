import { useMutation, useQueryClient } from '@tanstack/react-query';
import { sendRequest } from '../../lib/fetch-json.ts';
import { projectListQuery } from './list-projects.ts';

function deleteProject(projectId: string, confirmName: string) {
  return sendRequest(`/projects/${projectId}`, { method: 'DELETE', body: { confirmName } });
}

/** Deletes a project for everyone, its name typed as a guard. */
export function useDeleteProject(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (confirmName: string) => deleteProject(projectId, confirmName),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: projectListQuery().queryKey }),
  });
}
