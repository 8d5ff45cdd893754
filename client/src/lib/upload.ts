import type { ZodType } from 'zod';
import { API_BASE, SIGNED_OUT_EVENT } from './fetch-json.ts';
import { ProblemError, parseProblem } from './problem-error.ts';

export interface UploadOptions {
  /** `multipart` for a FormData body, `PUT` of a Blob for one part of a resumable upload. */
  method?: 'POST' | 'PUT' | 'PATCH';
  headers?: Record<string, string>;
  /** Bytes that have left this browser; `totalBytes` includes the multipart wrapping. */
  onProgress?: (sentBytes: number, totalBytes: number) => void;
  signal?: AbortSignal;
}

/**
 * Sends a form or one part of a file with progress, which `fetch` cannot report.
 *
 * @param path under /api/v1, with its leading slash
 * @param body a FormData (multipart) or a Blob (sent as it is)
 * @param schema the answer's contract
 * @throws ProblemError as fetchJson does; a DOMException named AbortError when `signal` is aborted
 */
export function upload<T>(
  path: string,
  body: FormData | Blob,
  schema: ZodType<T>,
  options: UploadOptions = {},
): Promise<T> {
  return new Promise<T>((resolve, reject) => {
    const request = new XMLHttpRequest();
    const abort = () => request.abort();
    const settle = (finish: () => void) => {
      options.signal?.removeEventListener('abort', abort);
      finish();
    };

    if (options.signal?.aborted) {
      reject(new DOMException('The upload was stopped', 'AbortError'));
      return;
    }
    options.signal?.addEventListener('abort', abort);

    request.open(options.method ?? 'POST', `${API_BASE}${path}`);
    request.setRequestHeader('accept', 'application/json');
    for (const [name, value] of Object.entries(options.headers ?? {})) request.setRequestHeader(name, value);

    request.upload.onprogress = (event) => {
      if (event.lengthComputable) options.onProgress?.(event.loaded, event.total);
    };
    request.onabort = () => settle(() => reject(new DOMException('The upload was stopped', 'AbortError')));
    request.onerror = () => settle(() => reject(connectionLost()));
    request.onload = () =>
      settle(() => {
        try {
          resolve(readAnswer(request, schema));
        } catch (error) {
          reject(error instanceof Error ? error : new Error(String(error)));
        }
      });
    request.send(body);
  });
}

function readAnswer<T>(request: XMLHttpRequest, schema: ZodType<T>): T {
  if (request.status < 200 || request.status >= 300) {
    if (request.status === 401) window.dispatchEvent(new CustomEvent(SIGNED_OUT_EVENT));
    throw parseProblem(request.responseText, request.status);
  }
  const parsed = schema.safeParse(parseJson(request.responseText));
  if (parsed.success) return parsed.data;
  throw new ProblemError({
    status: request.status,
    code: 'contract-broken',
    title: 'The server answered in a form this page does not know',
    detail: parsed.error.issues[0]?.message,
  });
}

/** undefined for what is no JSON: no contract takes that. */
function parseJson(text: string): unknown {
  try {
    return JSON.parse(text) as unknown;
  } catch {
    return undefined;
  }
}

function connectionLost(): ProblemError {
  return new ProblemError({
    status: 0,
    code: 'no-answer',
    title: 'The connection was lost during the upload',
    advice: 'Check the network and send it again.',
  });
}
