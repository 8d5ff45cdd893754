import { useMutation, useQueryClient } from '@tanstack/react-query';
import { type UpdateScene, sceneSchema } from '../../../../shared/contracts/scene.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { refreshScenes } from './refresh-scenes.ts';

function updateScene(sceneId: string, body: UpdateScene) {
  return fetchJson(`/scenes/${sceneId}`, sceneSchema, { method: 'PATCH', body });
}

/** Changes a scene that still stands at `version`; a 409 carries the scene as it stands. */
export function useUpdateScene(projectId: string, sceneId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: UpdateScene) => updateScene(sceneId, body),
    // After a conflict, too: the page then shows what the other person made of it.
    onSettled: () => refreshScenes(queryClient, projectId),
  });
}
