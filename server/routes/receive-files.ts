import { createHash } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { rm } from 'node:fs/promises';
import { join } from 'node:path';
import { Transform } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Request, Response } from 'express';
import multer, { type StorageEngine } from 'multer';
import type { z, ZodType } from 'zod';
import { cleanLine } from '../../shared/contracts/text.ts';
import type { App } from '../app-context.ts';
import { InvalidInput } from '../errors.ts';
import type { UploadedFile } from '../services/create-scene.ts';
import { checkRoom } from '../services/site-storage.ts';

export interface ReceivedFiles<F> {
  fields: F;
  /** At least one, none of them empty; gone once `use` has ended unless it took them over. */
  files: UploadedFile[];
}

/** Streams each file to the folder under a number of its own and digests it on the way. */
class DigestingStorage implements StorageEngine {
  private count = 0;

  constructor(private readonly dir: string) {}

  _handleFile(
    _req: Request,
    file: Express.Multer.File,
    done: (error?: unknown, info?: Partial<Express.Multer.File> & { sha256?: string }) => void,
  ): void {
    const path = join(this.dir, String(++this.count));
    const hash = createHash('sha256');
    let bytes = 0;
    const digest = new Transform({
      transform(chunk: Buffer, _encoding, next) {
        hash.update(chunk);
        bytes += chunk.length;
        next(null, chunk);
      },
    });
    pipeline(file.stream, digest, createWriteStream(path, { flags: 'wx' })).then(
      () => done(null, { path, size: bytes, sha256: hash.digest('hex') }),
      done,
    );
  }

  _removeFile(_req: Request, file: Express.Multer.File, done: (error: Error | null) => void): void {
    rm(file.path, { force: true }).then(() => done(null), done);
  }
}

/**
 * Reads a multipart upload to disk and hands it to `use`; what `use` has not taken over is gone afterwards, as after any failure.
 * Text fields come before the files, which are called "files".
 */
export async function receiveFiles<S extends ZodType, T>(
  app: App,
  req: Request,
  res: Response,
  { fields, maxFiles }: { fields: S; maxFiles: number },
  use: (received: ReceivedFiles<z.output<S>>) => Promise<T>,
): Promise<T> {
  if (!req.is('multipart/form-data')) {
    throw new InvalidInput('This is no upload.', { wanted: 'multipart/form-data with one or more files' });
  }
  await checkRoom(app, Number(req.get('content-length') ?? 0));
  const work = await app.files.scratch('upload');
  try {
    const receive = multer({
      storage: new DigestingStorage(work.path),
      limits: { fileSize: app.config.uploadLimitBytes, files: maxFiles, fields: 10, fieldSize: 10_000 },
      defParamCharset: 'utf8',
    }).array('files', maxFiles);
    await new Promise<void>((resolve, reject) => {
      receive(req, res, (error?: unknown) => (error ? reject(translateUpload(error)) : resolve()));
    });
    return await use(readReceived(req, fields));
  } finally {
    await work.dispose();
  }
}

/** What the parser says of a body that is no proper form comes without a code, unlike what the disk says. */
function translateUpload(error: unknown): Error {
  const { code, message } = error as { code?: string; message: string };
  if (code !== undefined) return error as Error;
  return new InvalidInput('The upload cannot be read.', {
    found: message,
    wanted: 'a whole multipart/form-data body',
    advice: 'Send the files again.',
  });
}

function readReceived<S extends ZodType>(req: Request, schema: S): ReceivedFiles<z.output<S>> {
  const fields = schema.safeParse({ ...(req.body as Record<string, unknown>) });
  const received = req.files as (Express.Multer.File & { sha256: string })[];
  const files = received.map(({ originalname, path, size, sha256 }) => ({
    name: cleanLine(originalname),
    path,
    bytes: size,
    sha256,
  }));
  const errors = [
    ...(fields.success ? [] : fields.error.issues.map(({ path, message }) => ({ path: path.join('.'), message }))),
    ...(files.length === 0 ? [{ path: 'files', message: 'Choose at least one file.' }] : []),
    ...files.filter(({ bytes }) => bytes === 0).map(({ name }) => ({ path: 'files', message: `${name} is empty.` })),
  ];
  if (!fields.success || errors.length > 0) throw new InvalidInput('The upload cannot be used.', { errors });
  return { fields: fields.data, files };
}
