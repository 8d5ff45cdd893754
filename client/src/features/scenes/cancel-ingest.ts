import { useMutation, useQueryClient } from '@tanstack/react-query';
import { sceneSchema } from '../../../../shared/contracts/scene.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { refreshScenes } from './refresh-scenes.ts';

/** Stops the ingest of a scene; it then stands as failed and can be deleted. */
export function useCancelIngest(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (sceneId: string) => fetchJson(`/scenes/${sceneId}/cancel`, sceneSchema, { method: 'POST' }),
    onSettled: () => refreshScenes(queryClient, projectId),
  });
}
