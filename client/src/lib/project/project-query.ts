import { queryOptions } from '@tanstack/react-query';
import { type Project, projectSchema } from '../../../../shared/contracts/project.ts';
import { fetchJson } from '../fetch-json.ts';

/** What a query of a project is about; the event stream refetches by it. */
export type ProjectTopic =
  | 'project'
  | 'overview'
  | 'scenes'
  | 'classes'
  | 'samples'
  | 'runs'
  | 'accuracy'
  | 'members'
  | 'designs'
  | 'blocks'
  | 'presence';

/** The first parts of the key of every query about a project: `['project', projectId, topic, …]`. */
export function projectKey(projectId: string, topic: ProjectTopic, ...rest: readonly unknown[]): readonly unknown[] {
  return ['project', projectId, topic, ...rest];
}

/** Asks for a project with its stages and what the viewer may do in it. */
function getProject(projectId: string, signal: AbortSignal): Promise<Project> {
  return fetchJson(`/projects/${projectId}`, projectSchema, { signal });
}

export const projectQuery = (projectId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'project'),
    queryFn: ({ signal }) => getProject(projectId, signal),
  });
