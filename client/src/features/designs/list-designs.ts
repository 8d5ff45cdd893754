import { queryOptions, useQuery } from '@tanstack/react-query';
import { designListSchema } from '../../../../shared/contracts/reference.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const listDesigns = (projectId: string, signal: AbortSignal) =>
  fetchJson(`/projects/${projectId}/designs`, designListSchema, { signal });

/** The project's reference designs, newest first, and whether maps are kept from the viewer. */
const designsQuery = (projectId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'designs'),
    queryFn: ({ signal }) => listDesigns(projectId, signal),
  });

export function useDesigns(projectId: string, isOn = true) {
  return useQuery({ ...designsQuery(projectId), enabled: isOn });
}
