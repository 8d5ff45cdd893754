import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { zoneLayerListSchema, zoneLayerSchema } from '../../../../shared/contracts/zone.ts';
import { fetchJson, sendRequest } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';
import { upload } from '../../lib/upload.ts';

const listZoneLayers = (projectId: string, signal: AbortSignal) =>
  fetchJson(`/projects/${projectId}/zone-layers`, zoneLayerListSchema, { signal });

/** The project's zone layers, by which points are drawn and reported. */
const zoneLayersQuery = (projectId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'designs', 'zone-layers'),
    queryFn: ({ signal }) => listZoneLayers(projectId, signal),
  });

export function useZoneLayers(projectId: string) {
  return useQuery(zoneLayersQuery(projectId));
}

/** Brings in zones from a vector file. */
export function useAddZoneLayer(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ file, name, nameField }: { file: File; name: string; nameField: string }) => {
      const form = new FormData();
      form.set('name', name);
      form.set('nameField', nameField);
      form.set('files', file);
      return upload(`/projects/${projectId}/zone-layers`, form, zoneLayerSchema);
    },
    onSuccess: () => queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'designs', 'zone-layers') }),
  });
}

export function useDeleteZoneLayer(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (layerId: string) => sendRequest(`/zone-layers/${layerId}`, { method: 'DELETE' }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'designs', 'zone-layers') }),
  });
}
