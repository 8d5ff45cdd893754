import { queryOptions, useQuery } from '@tanstack/react-query';
import { sceneListSchema } from '../../../../shared/contracts/scene.ts';
import { fetchJson } from '../fetch-json.ts';
import { projectKey } from './project-query.ts';

const listScenes = (projectId: string, signal: AbortSignal) =>
  fetchJson(`/projects/${projectId}/scenes`, sceneListSchema, { signal });

/** The project's scenes with their bands and statistics, in the order they came in. */
export const scenesQuery = (projectId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'scenes'),
    queryFn: ({ signal }) => listScenes(projectId, signal),
    select: ({ scenes }) => scenes,
  });

export function useScenes(projectId: string) {
  return useQuery(scenesQuery(projectId));
}
