import type { ZodType } from 'zod';
import { ProblemError, parseProblem } from './problem-error.ts';

export const API_BASE = '/api/v1';

/** Dispatched on `window` when a request is refused because nobody is signed in any more. */
export const SIGNED_OUT_EVENT = 'groundsel:signed-out';

export interface FetchJsonOptions {
  method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  /** Sent as JSON. */
  body?: unknown;
  /** Query parameters; undefined and null ones are left out, arrays repeat the name. */
  query?: Record<string, QueryValue | QueryValue[]>;
  /** For optimistic locking and the like. */
  headers?: Record<string, string>;
  signal?: AbortSignal;
}

type QueryValue = string | number | boolean | null | undefined;

/**
 * Asks the API for JSON and checks the answer against the contract.
 *
 * @param path under /api/v1, with its leading slash
 * @param schema the answer's contract; its parsed (not raw) value is returned
 * @throws ProblemError for every answer that is not 2xx, for one that breaks the contract, and when there is no answer
 */
export async function fetchJson<T>(path: string, schema: ZodType<T>, options: FetchJsonOptions = {}): Promise<T> {
  const response = await request(path, options);
  const parsed = schema.safeParse(await readJson(response));
  if (!parsed.success) {
    const issue = parsed.error.issues[0];
    throw new ProblemError({
      status: response.status,
      code: 'contract-broken',
      title: 'The server answered in a form this page does not know',
      detail: issue ? `At ${issue.path.join('.') || 'the top'}: ${issue.message}` : 'The answer did not parse.',
      advice: 'Reload the page; if it stays, the page and the server are of different versions.',
    });
  }
  return parsed.data;
}

/** Sends a request whose answer has no body (204). @throws ProblemError as fetchJson does */
export async function sendRequest(path: string, options: FetchJsonOptions = {}): Promise<void> {
  await request(path, options);
}

/** The URL of an API path with its query, for links, downloads and image sources. */
export function apiUrl(path: string, query: FetchJsonOptions['query'] = {}): string {
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries(query)) {
    for (const item of Array.isArray(value) ? value : [value]) {
      if (item !== undefined && item !== null) search.append(name, String(item));
    }
  }
  const text = search.toString();
  return `${API_BASE}${path}${text ? `?${text}` : ''}`;
}

async function request(path: string, options: FetchJsonOptions): Promise<Response> {
  const headers: Record<string, string> = { accept: 'application/json', ...options.headers };
  if (options.body !== undefined) headers['content-type'] = 'application/json';
  let response: Response;
  try {
    response = await fetch(apiUrl(path, options.query), {
      method: options.method ?? 'GET',
      credentials: 'same-origin',
      headers,
      body: options.body === undefined ? null : JSON.stringify(options.body),
      signal: options.signal ?? null,
    });
  } catch (error) {
    if (options.signal?.aborted) throw error;
    throw new ProblemError({
      status: 0,
      code: 'no-answer',
      title: 'The server did not answer',
      detail: 'The connection was closed or could not be made.',
      advice: 'Check the network and try again. Nothing you saved is lost.',
    });
  }
  if (!response.ok) {
    const problem = parseProblem(await response.text(), response.status);
    if (response.status === 401) window.dispatchEvent(new CustomEvent(SIGNED_OUT_EVENT));
    throw problem;
  }
  return response;
}

async function readJson(response: Response): Promise<unknown> {
  const text = await response.text();
  try {
    return JSON.parse(text) as unknown;
  } catch {
    throw new ProblemError({
      status: response.status,
      code: 'not-json',
      title: 'The server did not answer in JSON',
      found: text.slice(0, 80) || 'an empty answer',
      wanted: 'a JSON document',
    });
  }
}
