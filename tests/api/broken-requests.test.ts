import { mkdir, mkdtemp, readdir, rm, writeFile } from 'node:fs/promises';
import { createServer } from 'node:http';
import { connect, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { pino } from 'pino';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createHttpApp } from '../../server/app.ts';
import { createHttpServer, createLogger } from '../../server/start-server.ts';
import { makeTeam, type Team } from '../factories/make-project.ts';
import { openTestApp, type Agent, type TestApp } from '../factories/test-app.ts';

let test: TestApp;
let team: Team;
let lead: Agent;
let cookie: string;

beforeAll(async () => {
  test = await openTestApp();
  team = await makeTeam(test.app);
  lead = await test.signedIn(team.lead);
  const answer = await test.stranger
    .post('/api/v1/session')
    .send({ email: team.lead.email, password: 'a password for tests' });
  cookie = answer.headers['set-cookie']?.[0]?.split(';')[0] ?? '';
});
afterAll(() => test.close());

describe('a body that cannot be read', () => {
  it.each([
    ['in an unknown character set', { 'content-type': 'application/json; charset=foo' }, '{"name":"x"}'],
    ['packed in an unknown way', { 'content-type': 'application/json', 'content-encoding': 'foo' }, '{"name":"x"}'],
    ['that is not packed as it says', { 'content-type': 'application/json', 'content-encoding': 'gzip' }, '{}'],
    ['cut short', { 'content-type': 'application/json' }, '{"name":'],
    ['that is JSON by another name', { 'content-type': 'text/plain' }, '{"name":"x"}'],
    ['nested without end', { 'content-type': 'application/json' }, '['.repeat(100_000) + ']'.repeat(100_000)],
    ['that reaches for the prototype', { 'content-type': 'application/json' }, '{"name":"x","__proto__":{"a":1}}'],
  ])('is the fault of the sender: one %s', async (_, headers, body) => {
    const answer = await fetch(`${test.url}/api/v1/projects`, {
      method: 'POST',
      headers: { cookie, ...headers },
      body,
    });
    expect(answer.status).toBe(400);
    expect(answer.headers.get('content-type')).toMatch(/^application\/problem\+json/);
    expect(await answer.json()).toMatchObject({ status: 400, code: 'invalid-input' });
  });

  const form = 'multipart/form-data; boundary=X';
  const part = '--X\r\nContent-Disposition: form-data; name="files"; filename="a.tif"\r\n\r\nabc';
  it.each([
    ['without a boundary', 'multipart/form-data', 'abc'],
    ['that ends in the middle of a file', form, part],
    ['with a broken part', form, '--X\r\n:::\r\n\r\nabc\r\n--X--\r\n'],
    ['with nothing in it', form, ''],
    ['with a file under another name', form, `${part.replace('"files"', '"evil"')}\r\n--X--\r\n`],
  ])('is the fault of the sender: an upload %s', async (_, type, body) => {
    const answer = await fetch(`${test.url}/api/v1/projects/${team.project.id}/scenes`, {
      method: 'POST',
      headers: { cookie, 'content-type': type },
      body,
    });
    expect(await answer.json()).toMatchObject({ status: 400, code: 'invalid-input' });
    expect(await readdir(join(test.dataDir, 'scratch'))).toEqual([]);
  });

  it('is no failure of the server when the sender hangs up in the middle of an upload', async () => {
    const lines: string[] = [];
    const log = pino({ level: 'error' }, { write: (line: string) => void lines.push(line) });
    const http = createServer(createHttpApp({ ...test.app, log }, null));
    await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', resolve));
    const { port } = http.address() as AddressInfo;
    const socket = connect(port, '127.0.0.1');
    const head = [
      `POST /api/v1/projects/${team.project.id}/scenes HTTP/1.1`,
      'Host: localhost',
      `Cookie: ${cookie}`,
      `Content-Type: ${form}`,
      'Content-Length: 5000000',
    ];
    socket.write(`${head.join('\r\n')}\r\n\r\n${part}${'y'.repeat(100_000)}`);
    const scratch = () => readdir(join(test.dataDir, 'scratch'));
    await expect.poll(async () => (await scratch()).length).toBe(1);
    socket.destroy();
    await expect.poll(async () => (await scratch()).length).toBe(0);
    await sleep(100);
    await new Promise<void>((resolve) => http.close(() => resolve()));
    expect(lines).toEqual([]);
  });
});

describe('names', () => {
  it('lose what no page and no file can hold', async () => {
    const name = ' Coast\u0000\u0001 of\r\nVennory \ud800\u202e ';
    const made = await lead.post('/api/v1/projects').send({ name, description: 'one\r\ntwo\u0007' }).expect(201);
    expect(made.body).toMatchObject({ name: 'Coast of Vennory', description: 'one\ntwo' });
    await lead.post('/api/v1/projects').send({ name: '\u0000\u202e' }).expect(400);
  });
});

describe('what is sent', () => {
  it('may be kept by the browser of the one who asked and by nobody between', async () => {
    for (const path of ['/session', '/projects', `/projects/${team.project.id}`, '/nothing']) {
      const { headers } = await lead.get(`/api/v1${path}`);
      expect(headers['cache-control'], path).toBe('private, no-cache');
    }
  });

  it('is a problem document for every address below /api that is not there', async () => {
    for (const path of ['/api', '/api/v2', '/api/v1/nothing']) {
      const answer = await lead.get(path).expect(404);
      expect(answer.body, path).toMatchObject({ status: 404, code: 'not-found' });
    }
  });
});

describe('the built client', () => {
  it('is served from its folder and from nowhere else', async () => {
    const dir = await mkdtemp(join(tmpdir(), 'groundsel-client-'));
    const clientDir = join(dir, 'client');
    await mkdir(join(clientDir, 'assets'), { recursive: true });
    await writeFile(join(dir, 'secret.txt'), 'secret');
    await writeFile(join(clientDir, 'index.html'), '<title>page</title>');
    await writeFile(join(clientDir, 'assets', 'app-1.js'), '1');
    const http = createServer(createHttpApp(test.app, clientDir));
    await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', resolve));
    const url = `http://127.0.0.1:${(http.address() as AddressInfo).port}`;
    try {
      const script = await fetch(`${url}/assets/app-1.js`);
      expect(script.headers.get('cache-control')).toContain('immutable');
      const page = await fetch(`${url}/projects/anything`);
      expect([page.status, page.headers.get('cache-control')]).toEqual([200, 'no-cache']);
      expect(page.headers.get('content-security-policy')).toContain("default-src 'self'");
      for (const path of ['/assets/gone.js', '/assets/', '/assets/..%2f..%2fsecret.txt']) {
        const answer = await fetch(url + path);
        expect([path, answer.status]).toEqual([path, 404]);
        expect(await answer.text()).not.toMatch(/secret|groundsel-client/);
      }
      expect((await fetch(`${url}/assets/%00`)).status).toBe(400);
    } finally {
      http.closeAllConnections();
      await new Promise<void>((resolve) => http.close(() => resolve()));
      await rm(dir, { recursive: true, force: true });
    }
  });
});

describe('the connection', () => {
  it('lasts as long as an upload moves, and no longer than it is of use', () => {
    const server = createHttpServer(() => undefined);
    // Zero is without end; Node's own limit for a whole request is five minutes, less than many uploads take.
    expect(server.requestTimeout).toBe(0);
    expect(server.headersTimeout).toBe(60_000);
    expect(server.timeout).toBe(120_000);
  });
});

describe('the log', () => {
  it('holds no welcome link, no cookie, and nothing of what a failed query was to store', async () => {
    const lines: string[] = [];
    const log = createLogger({ logLevel: 'debug' }, { write: (line: string) => void lines.push(line) });
    const http = createServer(createHttpApp({ ...test.app, log }, null));
    await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', resolve));
    const url = `http://127.0.0.1:${(http.address() as AddressInfo).port}`;
    const secret = 'a-secret-of-a-welcome-link-0123456789';
    await fetch(`${url}/api/v1/welcome/${secret}`, { headers: { cookie } });
    const failure = await test.app.db
      .query('INSERT INTO sessions (id, data) VALUES (?, ?)', ['x', 'data of a session'])
      .catch((error: unknown) => error);
    expect(JSON.stringify(failure)).toContain('data of a session');
    log.error({ err: failure }, 'request failed');
    http.closeAllConnections();
    await new Promise<void>((resolve) => http.close(() => resolve()));
    const text = lines.join('\n');
    expect(text).toContain('/welcome/[hidden]');
    expect(text).toContain('request failed');
    expect(text).not.toContain(secret);
    expect(text).not.toContain('data of a session');
    expect(text).not.toContain(cookie.split('=')[1]);
  });
});

describe('the API document', () => {
  it('holds together: every reference and every part of an address is described', async () => {
    const { body } = await test.stranger.get('/api/v1/openapi.json').expect(200);
    interface Operation {
      operationId: string;
      parameters?: { name: string; in: string; required?: boolean; schema?: unknown }[];
      responses: Record<string, { description: string }>;
    }
    const references = [...JSON.stringify(body).matchAll(/"\$ref":"([^"]+)"/g)].map(([, reference]) => reference ?? '');
    for (const reference of references) {
      const found = reference
        .replace(/^#\//, '')
        .split('/')
        .reduce<unknown>((at, key) => (at as Record<string, unknown> | undefined)?.[key], body);
      expect(found, reference).toBeDefined();
    }
    const operations = Object.entries(body.paths as Record<string, Record<string, Operation>>).flatMap(
      ([path, methods]) => Object.values(methods).map((operation) => ({ path, operation })),
    );
    const probe = body.paths['/scenes/{sceneId}/probe'].get.parameters as { name: string; required: boolean }[];
    expect(probe.map(({ name, required }) => [name, required]).sort()).toEqual([
      ['lat', true],
      ['lon', true],
      ['sceneId', true],
    ]);
    const list = body.paths['/projects/{projectId}/samples'].get.parameters as { name: string; required: boolean }[];
    expect(list.find(({ name }) => name === 'bbox')?.required).toBe(false);
    expect(operations.length).toBeGreaterThan(40);
    expect(new Set(operations.map(({ operation }) => operation.operationId)).size).toBe(operations.length);
    for (const { path, operation } of operations) {
      const wanted = [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name);
      const described = (operation.parameters ?? []).filter((parameter) => parameter.in === 'path');
      expect(described.map(({ name }) => name).sort(), path).toEqual(wanted.sort());
      for (const { required, schema } of described) expect([required, typeof schema], path).toEqual([true, 'object']);
      const statuses = Object.keys(operation.responses);
      expect(
        statuses.some((status) => status.startsWith('2')),
        path,
      ).toBe(true);
      for (const { description } of Object.values(operation.responses)) expect(description).not.toBe('');
    }
  });
});
