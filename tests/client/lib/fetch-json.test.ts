import { afterEach, describe, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { SIGNED_OUT_EVENT, apiUrl, fetchJson, sendRequest } from '../../../client/src/lib/fetch-json.ts';
import { ProblemError, asProblem } from '../../../client/src/lib/problem-error.ts';

const answer = z.object({ name: z.string() });

function serverAnswers(status: number, body: unknown): ReturnType<typeof vi.fn> {
  const text = typeof body === 'string' ? body : JSON.stringify(body);
  const fake = vi.fn(async () => new Response(status === 204 ? null : text, { status }));
  vi.stubGlobal('fetch', fake);
  return fake;
}

async function problemOf(promise: Promise<unknown>): Promise<ProblemError> {
  const error = await promise.then(
    () => null,
    (thrown: unknown) => thrown,
  );
  expect(error).toBeInstanceOf(ProblemError);
  return error as ProblemError;
}

afterEach(() => vi.unstubAllGlobals());

describe('a request', () => {
  it('goes under /api/v1 as JSON and gives back what the contract parsed', async () => {
    const fake = serverAnswers(200, { name: 'Saltmarsh', extra: 1 });
    const parsed = await fetchJson('/projects', answer, { method: 'POST', body: { name: 'Saltmarsh' } });
    expect(parsed).toEqual({ name: 'Saltmarsh' });
    const [url, init] = fake.mock.calls[0] as [string, RequestInit];
    expect(url).toBe('/api/v1/projects');
    expect(init.method).toBe('POST');
    expect(init.body).toBe('{"name":"Saltmarsh"}');
    expect(init.headers).toMatchObject({ 'content-type': 'application/json' });
  });

  it('leaves empty query parameters out and repeats arrays', () => {
    expect(apiUrl('/samples', { class: ['a', 'b'], block: null, page: 0 })).toBe(
      '/api/v1/samples?class=a&class=b&page=0',
    );
  });

  it('needs no body in the answer when none is asked for', async () => {
    serverAnswers(204, '');
    await expect(sendRequest('/session', { method: 'DELETE' })).resolves.toBeUndefined();
  });

  it('passes its abort on', async () => {
    const stop = new AbortController();
    vi.stubGlobal('fetch', (_url: string, init: RequestInit) => {
      init.signal?.throwIfAborted();
      return Promise.resolve(new Response('{}'));
    });
    stop.abort();
    await expect(fetchJson('/projects', answer, { signal: stop.signal })).rejects.toMatchObject({ name: 'AbortError' });
  });
});

describe('a refusal', () => {
  it('carries found, wanted, advice and field errors of the problem document', async () => {
    serverAnswers(422, {
      type: 'about:blank',
      title: 'This ring crosses itself',
      status: 422,
      code: 'ring-crosses',
      found: 'a crossing at vertex 4',
      wanted: 'a simple ring',
      advice: 'Move vertex 4.',
      errors: [{ path: 'geometry.coordinates', message: 'crosses itself' }],
    });
    const problem = await problemOf(fetchJson('/samples', answer));
    expect(problem).toMatchObject({
      status: 422,
      code: 'ring-crosses',
      title: 'This ring crosses itself',
      found: 'a crossing at vertex 4',
      wanted: 'a simple ring',
      advice: 'Move vertex 4.',
      errors: [{ path: 'geometry.coordinates', message: 'crosses itself' }],
    });
  });

  it('keeps the version that stands on the server in a conflict', async () => {
    serverAnswers(409, {
      type: 'x',
      title: 'Changed meanwhile',
      status: 409,
      code: 'conflict',
      current: { version: 4 },
    });
    expect((await problemOf(fetchJson('/samples/1', answer))).current).toEqual({ version: 4 });
  });

  it('without a problem document still has its status and a reason', async () => {
    serverAnswers(502, '<html>bad gateway</html>');
    const problem = await problemOf(fetchJson('/projects', answer));
    expect(problem.status).toBe(502);
    expect(problem.detail).toContain('502');
  });

  it('with 401 tells the page that nobody is signed in', async () => {
    const heard = vi.fn();
    window.addEventListener(SIGNED_OUT_EVENT, heard);
    serverAnswers(401, { type: 'x', title: 'Sign in first', status: 401, code: 'signed-out' });
    await problemOf(fetchJson('/projects', answer));
    window.removeEventListener(SIGNED_OUT_EVENT, heard);
    expect(heard).toHaveBeenCalledOnce();
  });

  it('with 403 does not', async () => {
    const heard = vi.fn();
    window.addEventListener(SIGNED_OUT_EVENT, heard);
    serverAnswers(403, { type: 'x', title: 'Not yours', status: 403, code: 'forbidden' });
    await problemOf(fetchJson('/projects', answer));
    window.removeEventListener(SIGNED_OUT_EVENT, heard);
    expect(heard).not.toHaveBeenCalled();
  });
});

describe('an answer that cannot be used', () => {
  it('says where it breaks the contract', async () => {
    serverAnswers(200, { name: 7 });
    const problem = await problemOf(fetchJson('/projects', answer));
    expect(problem.code).toBe('contract-broken');
    expect(problem.detail).toContain('name');
  });

  it('is named when it is no JSON', async () => {
    serverAnswers(200, '<html>');
    expect((await problemOf(fetchJson('/projects', answer))).code).toBe('not-json');
  });

  it('is a problem with status 0 when there is none', async () => {
    vi.stubGlobal('fetch', () => Promise.reject(new TypeError('Failed to fetch')));
    expect(await problemOf(fetchJson('/projects', answer))).toMatchObject({ status: 0, code: 'no-answer' });
  });

  it('keeps the words of any other fault', () => {
    expect(asProblem(new Error('boom'))).toMatchObject({ code: 'page-fault', detail: 'boom' });
  });
});
