import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { z } from 'zod';
import { projectSchema, type updateProjectSchema } from '../../../../shared/contracts/project.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { ProblemError } from '../../lib/problem-error.ts';
import { projectKey, projectQuery } from '../../lib/project/project-query.ts';
import { projectListQuery } from './list-projects.ts';

export type ProjectChange = z.infer<typeof updateProjectSchema>;

function updateProject(projectId: string, body: ProjectChange) {
  return fetchJson(`/projects/${projectId}`, projectSchema, { method: 'PATCH', body });
}

/** Changes name, client, description or targets. When someone else was first, the project as it stands is fetched. */
export function useUpdateProject(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (change: ProjectChange) => updateProject(projectId, change),
    onSuccess: (project) => {
      queryClient.setQueryData(projectQuery(projectId).queryKey, project);
      void queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'overview') });
      void queryClient.invalidateQueries({ queryKey: projectListQuery().queryKey });
    },
    onError: (error) => {
      if (error instanceof ProblemError && error.status === 409) {
        return queryClient.invalidateQueries({ queryKey: projectQuery(projectId).queryKey });
      }
      return undefined;
    },
  });
}
