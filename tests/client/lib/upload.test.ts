import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { SIGNED_OUT_EVENT } from '../../../client/src/lib/fetch-json.ts';
import { upload } from '../../../client/src/lib/upload.ts';

class FakeRequest {
  static last: FakeRequest;
  upload: { onprogress: ((event: object) => void) | null } = { onprogress: null };
  onload: (() => void) | null = null;
  onerror: (() => void) | null = null;
  onabort: (() => void) | null = null;
  status = 0;
  responseText = '';
  opened: string[] = [];
  headers: Record<string, string> = {};
  sent: unknown;
  constructor() {
    FakeRequest.last = this;
  }
  open(...args: string[]) {
    this.opened = args;
  }
  setRequestHeader(name: string, value: string) {
    this.headers[name] = value;
  }
  send(body: unknown) {
    this.sent = body;
  }
  abort() {
    this.onabort?.();
  }
  answer(status: number, body: unknown) {
    this.status = status;
    this.responseText = typeof body === 'string' ? body : JSON.stringify(body);
    this.onload?.();
  }
}

const schema = z.object({ received: z.number() });

beforeEach(() => vi.stubGlobal('XMLHttpRequest', FakeRequest));
afterEach(() => vi.unstubAllGlobals());

describe('an upload', () => {
  it('sends the part with its headers, tells progress and gives the parsed answer', async () => {
    const onProgress = vi.fn();
    const part = new Blob(['abc']);
    const promise = upload('/uploads/1/parts/0', part, schema, { method: 'PUT', headers: { digest: 'x' }, onProgress });
    const request = FakeRequest.last;
    expect(request.opened).toEqual(['PUT', '/api/v1/uploads/1/parts/0']);
    expect(request.headers['digest']).toBe('x');
    expect(request.sent).toBe(part);
    request.upload.onprogress?.({ lengthComputable: true, loaded: 2, total: 3 });
    request.upload.onprogress?.({ lengthComputable: false, loaded: 2, total: 0 });
    expect(onProgress.mock.calls).toEqual([[2, 3]]);
    request.answer(200, { received: 3 });
    await expect(promise).resolves.toEqual({ received: 3 });
  });

  it('that is refused carries the problem document, and 401 tells the page', async () => {
    const heard = vi.fn();
    window.addEventListener(SIGNED_OUT_EVENT, heard);
    const promise = upload('/uploads', new FormData(), schema);
    FakeRequest.last.answer(401, { type: 'x', title: 'Sign in first', status: 401, code: 'signed-out' });
    await expect(promise).rejects.toMatchObject({ status: 401, title: 'Sign in first' });
    window.removeEventListener(SIGNED_OUT_EVENT, heard);
    expect(heard).toHaveBeenCalledOnce();
  });

  it('that breaks off says what to do', async () => {
    const promise = upload('/uploads', new FormData(), schema);
    FakeRequest.last.onerror?.();
    await expect(promise).rejects.toMatchObject({ status: 0, advice: expect.stringContaining('send it again') });
  });

  it('can be stopped, before and while it runs', async () => {
    const stop = new AbortController();
    const running = upload('/uploads', new FormData(), schema, { signal: stop.signal });
    stop.abort();
    await expect(running).rejects.toMatchObject({ name: 'AbortError' });
    await expect(upload('/uploads', new FormData(), schema, { signal: stop.signal })).rejects.toMatchObject({
      name: 'AbortError',
    });
  });

  it('answered with something else than the contract is a problem, not a success', async () => {
    const promise = upload('/uploads', new FormData(), schema);
    FakeRequest.last.answer(200, { received: 'all' });
    await expect(promise).rejects.toMatchObject({ code: 'contract-broken' });
  });

  it('answered with no JSON is a problem, not a success', async () => {
    const promise = upload('/uploads', new FormData(), schema);
    FakeRequest.last.answer(200, '<html>');
    await expect(promise).rejects.toMatchObject({ code: 'contract-broken' });
  });
});
