import { queryOptions, useQuery } from '@tanstack/react-query';
import { type Project, projectSchema } from '../../../../shared/contracts/project.ts';
import { fetchJson } from '../../lib/fetch-json.ts';

/** Asks for a project with its stages and what the viewer may do in it. */
function getProject(projectId: string, signal?: AbortSignal): Promise<Project> {
  return fetchJson(`/projects/${projectId}`, projectSchema, { signal });
}

export const projectQuery = (projectId: string) =>
  queryOptions({ queryKey: ['projects', projectId], queryFn: ({ signal }) => getProject(projectId, signal) });

export function useProject(projectId: string) {
  return useQuery(projectQuery(projectId));
}
