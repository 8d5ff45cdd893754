import { sceneSchema } from '../../../../shared/contracts/scene.ts';
import { upload } from '../../lib/upload.ts';

/** What becomes a scene: its files, and what is known of them. */
export interface SceneUpload {
  name: string;
  /** yyyy-mm-dd, or null when it is not known. */
  acquiredOn: string | null;
  files: readonly File[];
}

interface SendOptions {
  signal: AbortSignal;
  onProgress: (sentBytes: number, totalBytes: number) => void;
}

/** Uploads the files of one scene; resolves with the scene, whose ingest goes on. @throws ProblemError when refused */
export function sendScene(projectId: string, { name, acquiredOn, files }: SceneUpload, options: SendOptions) {
  const form = new FormData();
  // The server reads the words before the files.
  form.append('name', name);
  if (acquiredOn) form.append('acquiredOn', acquiredOn);
  for (const file of files) form.append('files', file, file.name);
  return upload(`/projects/${projectId}/scenes`, form, sceneSchema, options);
}
