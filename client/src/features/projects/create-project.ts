import { useMutation, useQueryClient } from '@tanstack/react-query';
import { type CreateProject, projectSchema } from '../../../../shared/contracts/project.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectQuery } from '../../lib/project/project-query.ts';
import { projectListQuery } from './list-projects.ts';

const createProject = (body: CreateProject) => fetchJson('/projects', projectSchema, { method: 'POST', body });

/** Creates a project; the maker becomes its lead. */
export function useCreateProject() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: createProject,
    onSuccess: (project) => {
      queryClient.setQueryData(projectQuery(project.id).queryKey, project);
      void queryClient.invalidateQueries({ queryKey: projectListQuery().queryKey });
    },
  });
}
