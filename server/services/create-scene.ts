import { randomUUID } from 'node:crypto';
import type { App } from '../app-context.ts';
import { Scene, type SceneFile } from '../entities/scene.ts';
import { recordActivity } from './activities.ts';

/** An uploaded file that lies whole on this machine. */
export interface UploadedFile {
  /** As the person's machine calls it; shown, never used as a path. */
  name: string;
  path: string;
  bytes: number;
  sha256: string;
}

export interface NewScene {
  /** The first file's name where empty. */
  name: string;
  acquiredOn: string | null;
  files: readonly UploadedFile[];
}

/** Takes over uploaded files as one scene and queues its ingest. */
export async function createScene(app: App, projectId: string, byId: string | null, input: NewScene): Promise<string> {
  const id = randomUUID();
  const name = (input.name || (input.files[0]?.name ?? '').replace(/\.[^.]*$/, '') || 'Scene').slice(0, 160);
  const files: SceneFile[] = [];
  try {
    for (const [place, file] of input.files.entries()) {
      const key = `incoming/${id}/${String(place + 1).padStart(2, '0')}`;
      await app.files.adopt(key, file.path);
      files.push({ name: file.name.slice(0, 255), bytes: file.bytes, sha256: file.sha256, key });
    }
    await app.db.transaction(async (manager) => {
      await manager.insert(Scene, {
        id,
        projectId,
        name,
        acquiredOn: input.acquiredOn,
        state: 'ingesting',
        failure: null,
        files,
        uploadedById: byId,
      });
      await app.jobs.enqueue(manager, { kind: 'ingest', projectId, sceneId: id });
      await recordActivity(manager, projectId, byId, `uploaded scene ${name}`, `scenes/${id}`);
    });
  } catch (error) {
    await app.files.remove(`incoming/${id}/`);
    throw error;
  }
  await app.events.publish(projectId, { type: 'changed', what: 'scenes', id, by: byId });
  return id;
}
