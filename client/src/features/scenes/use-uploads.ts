import { useQueryClient } from '@tanstack/react-query';
import { useSyncExternalStore } from 'react';
import { projectKey } from '../../lib/project/project-query.ts';
import type { SceneUpload } from './send-scene.ts';
import { type DeskUpload, UploadDesk } from './upload-desk.ts';

const desk = new UploadDesk();

export interface Uploads {
  uploads: readonly DeskUpload[];
  start: (scene: SceneUpload) => void;
  retry: (id: string) => void;
  drop: (id: string) => void;
}

/** The uploads of this tab into a project; they go on when the page is left. */
export function useUploads(projectId: string): Uploads {
  const queryClient = useQueryClient();
  const all = useSyncExternalStore(desk.subscribe, desk.read);
  const onStored = () => {
    for (const topic of ['scenes', 'project', 'overview'] as const) {
      void queryClient.invalidateQueries({ queryKey: projectKey(projectId, topic) });
    }
  };
  return {
    uploads: all.filter((one) => one.projectId === projectId),
    start: (scene) => desk.start(projectId, scene, onStored),
    retry: (id) => desk.retry(id, onStored),
    drop: (id) => desk.drop(id),
  };
}
