import { useMutation, useQueryClient } from '@tanstack/react-query';
import { sendRequest } from '../../lib/fetch-json.ts';
import { refreshScenes } from './refresh-scenes.ts';

/** Deletes a scene with its files; 409 `in-use` while samples or runs need it. */
export function useDeleteScene(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (sceneId: string) => sendRequest(`/scenes/${sceneId}`, { method: 'DELETE' }),
    onSuccess: () => refreshScenes(queryClient, projectId),
  });
}
