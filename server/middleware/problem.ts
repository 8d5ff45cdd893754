import type { ErrorRequestHandler, RequestHandler } from 'express';
import { MulterError } from 'multer';
import type { Logger } from 'pino';
import { EntityNotFoundError } from 'typeorm';
import type { Problem } from '../../shared/contracts/problem.ts';
import { AppError, Conflict, InvalidInput, NoRoom, NotFound, TooLarge, type ErrorKind } from '../errors.ts';
import { hideSecrets } from './hide-secrets.ts';

const STATUS: Record<ErrorKind, number> = {
  invalid: 400,
  'signed-out': 401,
  forbidden: 403,
  missing: 404,
  conflict: 409,
  'too-large': 413,
  'too-many': 429,
  'no-room': 507,
};

/** What body parsers and multer throw, in our own terms. */
function translate(error: unknown): unknown {
  if (error instanceof MulterError) {
    return error.code === 'LIMIT_FILE_SIZE'
      ? new TooLarge('The file is larger than this server takes.', {
          advice: 'Send a smaller file, or ask the site administrator to raise the limit.',
        })
      : new InvalidInput('The upload cannot be read.', { found: error.message });
  }
  const type = (error as { type?: string } | null)?.type;
  if (type === 'entity.parse.failed') return new InvalidInput('The request is not JSON.', { wanted: 'a JSON body' });
  if (type === 'entity.too.large') return new TooLarge('The request is too large.', { wanted: 'at most 8 MB of JSON' });
  if (error instanceof URIError) return new NotFound();
  if ((error as { code?: string } | null)?.code === 'ENOSPC') {
    return new NoRoom('The server’s disk is full.', {
      advice: 'Delete scenes or runs that are no longer needed, or ask the site administrator for more room.',
    });
  }
  return translateHttpError(error) ?? translateDatabaseError(error) ?? error;
}

/** Two people at once can pass a check that only the database decides; the later one is told so. */
function translateDatabaseError(error: unknown): AppError | null {
  if (error instanceof EntityNotFoundError) return new NotFound();
  switch ((error as { code?: unknown } | null)?.code) {
    case 'ER_DUP_ENTRY':
      return new Conflict('Someone did the same at this moment.', { advice: 'Load the page again and look.' }, 'taken');
    case 'ER_NO_REFERENCED_ROW_2':
      return new Conflict('Something this needs was removed in between.', { advice: 'Load the page again.' }, 'gone');
    case 'ER_ROW_IS_REFERENCED_2':
      return new Conflict('Something came to need this in between.', { advice: 'Load the page again.' }, 'in-use');
    default:
      return null;
  }
}

/** Body parsers and the file server throw errors that carry a status; those of the 400s are the sender's. */
function translateHttpError(error: unknown): AppError | null {
  const { status, message } = (error ?? {}) as { status?: unknown; message?: unknown };
  if (typeof status !== 'number' || status < 400 || status > 499) return null;
  // What the file server says of a path names folders of this machine.
  if (status === 404 || status === 403) return new NotFound('There is no such address.');
  return new InvalidInput('The request cannot be read.', { found: String(message), wanted: 'a request in plain JSON' });
}

export const missingRoute: RequestHandler = () => {
  throw new NotFound('There is no such address.');
};

/** Turns every error into a problem document (RFC 9457); what is not ours is logged and shown as 500 without its text. */
export function problemHandler(log: Logger): ErrorRequestHandler {
  return (raw, req, res, next) => {
    const error = translate(raw);
    if (res.headersSent) {
      log.error({ err: raw, url: hideSecrets(req.url) }, 'failed after the answer began');
      return next(raw);
    }
    const problem: Problem =
      error instanceof AppError
        ? {
            type: `urn:groundsel:problem:${error.code}`,
            title: error.message,
            status: STATUS[error.kind],
            code: error.code,
            ...error.detail,
          }
        : {
            type: 'urn:groundsel:problem:internal',
            title: 'Something went wrong on the server.',
            status: 500,
            code: 'internal',
            advice: 'Try again. If it comes back, tell the site administrator when it happened.',
          };
    if (problem.status === 500)
      log.error({ err: raw, method: req.method, url: hideSecrets(req.originalUrl) }, 'request failed');
    if (problem.retryAfterSeconds) res.setHeader('Retry-After', String(Math.ceil(problem.retryAfterSeconds)));
    res.status(problem.status).type('application/problem+json').send(JSON.stringify(problem));
  };
}
