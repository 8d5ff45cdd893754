import type { Request, Response } from 'express';
import { z } from 'zod';
import { daySchema } from '../../../shared/contracts/common.ts';
import { lineSchema } from '../../../shared/contracts/text.ts';
import type { App } from '../../app-context.ts';
import type { UploadedFile } from '../../services/create-scene.ts';
import { receiveFiles } from '../receive-files.ts';

/** Files of one scene. */
export const MAX_FILES = 64;

const fields = z.object({
  name: lineSchema(160).default(''),
  acquiredOn: z.union([z.literal('').transform(() => null), daySchema]).default(null as never),
});

export interface ReceivedUpload {
  name: string;
  acquiredOn: string | null;
  files: UploadedFile[];
}

/** Receives the files of a scene with its name and day. */
export function receiveUpload<T>(
  app: App,
  req: Request,
  res: Response,
  use: (upload: ReceivedUpload) => Promise<T>,
): Promise<T> {
  return receiveFiles(app, req, res, { fields, maxFiles: MAX_FILES }, ({ fields: said, files }) =>
    use({ ...said, files }),
  );
}
