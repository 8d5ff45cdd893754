import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { EventEntry } from '../../server/entities/event-entry.ts';
import { makeProject, makeTeam, type Team } from '../factories/make-project.ts';
import { makeUser } from '../factories/make-user.ts';
import { openTestApp, type Agent, type TestApp } from '../factories/test-app.ts';

let test: TestApp;
let team: Team;
let lead: Agent;

beforeAll(async () => {
  test = await openTestApp();
  team = await makeTeam(test.app);
  lead = await test.signedIn(team.lead);
});
afterAll(() => test.close());

const area = (west: number, south: number, size = 0.1) => ({
  type: 'Polygon',
  coordinates: [
    [
      [west, south],
      [west + size, south],
      [west + size, south + size],
      [west, south + size],
      [west, south],
    ],
  ],
});

describe('projects', () => {
  it('make their creator the lead and show up in the list of no one else', async () => {
    const user = await makeUser(test.app);
    const agent = await test.signedIn(user);
    const made = await agent
      .post('/api/v1/projects')
      .send({ name: '  Heath survey ', client: 'Vennory Island Trust' })
      .expect(201);
    expect(made.body).toMatchObject({
      name: 'Heath survey',
      roles: ['lead'],
      version: 1,
      abilities: { manageProject: true, drawSamples: true },
    });
    const mine = (await agent.get('/api/v1/projects').expect(200)).body.projects;
    expect(mine.map(({ id }: { id: string }) => id)).toEqual([made.body.id]);
    const theirs = (await lead.get('/api/v1/projects').expect(200)).body.projects;
    expect(theirs.map(({ id }: { id: string }) => id)).not.toContain(made.body.id);
  });

  it('refuse an empty name, naming the field', async () => {
    const answer = await lead.post('/api/v1/projects').send({ name: '  ', extra: 1 }).expect(400);
    expect(answer.body.errors.map(({ path }: { path: string }) => path)).toContain('name');
    expect(answer.headers['content-type']).toMatch(/application\/problem\+json/);
  });

  it('refuse a change made against an older version', async () => {
    const path = `/api/v1/projects/${team.project.id}`;
    const { version } = (await lead.get(path).expect(200)).body;
    const changed = await lead
      .patch(path)
      .send({ version, description: 'Moor and coast', targetOverallAccuracy: 0.85 })
      .expect(200);
    expect(changed.body).toMatchObject({
      version: version + 1,
      description: 'Moor and coast',
      targetOverallAccuracy: 0.85,
    });
    await lead.patch(path).send({ version, description: 'Older' }).expect(409);
    expect((await lead.get(path)).body.description).toBe('Moor and coast');
  });

  it('tell a client only that the project is there', async () => {
    const client = await test.signedIn(team.client);
    const seen = (await client.get(`/api/v1/projects/${team.project.id}`).expect(200)).body;
    expect(seen.stages).toEqual([]);
    expect(Object.values(seen.abilities)).toEqual(Object.values(seen.abilities).map(() => false));
    await client.get(`/api/v1/projects/${team.project.id}/overview`).expect(404);
  });

  it('go only when their name is typed, with everything in them', async () => {
    const user = await makeUser(test.app);
    const agent = await test.signedIn(user);
    const { id, name } = (await agent.post('/api/v1/projects').send({ name: 'Short-lived' })).body;
    await agent.delete(`/api/v1/projects/${id}`).send({ confirmName: 'something else' }).expect(400);
    await agent.get(`/api/v1/projects/${id}`).expect(200);
    await agent.delete(`/api/v1/projects/${id}`).send({ confirmName: name }).expect(204);
    await agent.get(`/api/v1/projects/${id}`).expect(404);
  });
});

describe('the overview', () => {
  it('says what is next for each role', async () => {
    const project = await makeTeam(test.app);
    const path = `/api/v1/projects/${project.project.id}/overview`;
    const asLead = (await (await test.signedIn(project.lead)).get(path).expect(200)).body;
    expect(asLead.waiting.map(({ path: to }: { path: string }) => to)).toEqual(['scenes', 'classes']);
    const asReviewer = (await (await test.signedIn(project.reviewer)).get(path).expect(200)).body;
    expect(asReviewer.waiting).toEqual([]);
    expect(asReviewer.figures).toMatchObject({ sceneCount: 0, sampleCount: 0, bestRun: null });
  });
});

describe('the study area', () => {
  it('is set, read back and removed by the lead', async () => {
    const path = `/api/v1/projects/${team.project.id}`;
    let { version } = (await lead.get(path)).body;
    const set = await lead
      .put(`${path}/study-area`)
      .send({ version, geometry: area(-16.5, 59.3) })
      .expect(200);
    expect(set.body.studyArea).toEqual(area(-16.5, 59.3));
    expect(set.body.studyAreaBounds).toEqual([-16.5, 59.3, -16.4, 59.4].map((value) => expect.closeTo(value, 9)));
    version = set.body.version;
    const removed = await lead.put(`${path}/study-area`).send({ version, geometry: null }).expect(200);
    expect(removed.body.studyArea).toBeNull();
  });

  it('is refused with more positions than browsers can carry about', async () => {
    const path = `/api/v1/projects/${team.project.id}`;
    const { version } = (await lead.get(path)).body;
    const ringOf = (n: number, west: number): [number, number][] => {
      const corners = Array.from({ length: n }, (_, i): [number, number] => [
        west + Math.cos((2 * Math.PI * i) / n),
        59 + Math.sin((2 * Math.PI * i) / n),
      ]);
      return [...corners, [...(corners[0] ?? [0, 0])]];
    };
    const geometry = { type: 'MultiPolygon', coordinates: [-20, -16, -12].map((west) => [ringOf(17_000, west)]) };
    const refused = await lead.put(`${path}/study-area`).send({ version, geometry }).expect(400);
    expect(refused.body.errors).toMatchObject([
      { path: 'geometry', message: expect.stringContaining('50000 positions') },
    ]);
    geometry.coordinates.pop();
    await lead.put(`${path}/study-area`).send({ version, geometry }).expect(200);
  });

  it('is refused when it crosses itself or is not closed, and says where', async () => {
    const path = `/api/v1/projects/${team.project.id}`;
    const { version } = (await lead.get(path)).body;
    const bowTie = {
      type: 'Polygon',
      coordinates: [
        [
          [0, 0],
          [1, 1],
          [1, 0],
          [0, 1],
          [0, 0],
        ],
      ],
    };
    const crossed = await lead.put(`${path}/study-area`).send({ version, geometry: bowTie }).expect(400);
    expect(crossed.body.found).toMatch(/0\.50000, 0\.50000/);
    const open = {
      type: 'Polygon',
      coordinates: [
        [
          [0, 0],
          [1, 1],
          [1, 0],
          [0, 0.5],
        ],
      ],
    };
    await lead.put(`${path}/study-area`).send({ version, geometry: open }).expect(400);
    await lead
      .put(`${path}/study-area`)
      .send({ version, geometry: { type: 'Point', coordinates: [0, 0] } })
      .expect(400);
  });
});

describe('members', () => {
  const members = (project = team.project.id) => `/api/v1/projects/${project}/members`;

  it('are added by e-mail, with or without an account', async () => {
    const known = await makeUser(test.app);
    const added = await lead
      .post(members())
      .send({ email: known.email, roles: ['labeller', 'modeller'] })
      .expect(201);
    expect(added.body).toMatchObject({
      mailed: false,
      link: null,
      member: { email: known.email, roles: ['labeller', 'modeller'], invited: false },
    });
    await lead
      .post(members())
      .send({ email: known.email, roles: ['labeller'] })
      .expect(409);
    const invited = await lead
      .post(members())
      .send({ email: 'someone-new@vennory.example', roles: ['reviewer'] })
      .expect(201);
    expect(invited.body.member.invited).toBe(true);
    expect(invited.body.link).toMatch(/\/welcome\//);
    await lead.post(members()).send({ email: 'x@vennory.example', roles: [] }).expect(400);
    await lead
      .post(members())
      .send({ email: 'x@vennory.example', roles: ['owner'] })
      .expect(400);
  });

  it('gain and lose what their roles allow at once', async () => {
    const user = await makeUser(test.app);
    const { member } = (await lead.post(members()).send({ email: user.email, roles: ['reviewer'] })).body;
    const agent = await test.signedIn(user);
    const path = `/api/v1/projects/${team.project.id}`;
    await agent.patch(path).send({ version: 1 }).expect(403);
    await lead
      .patch(`${members()}/${member.id}`)
      .send({ roles: ['lead'] })
      .expect(200);
    const { version } = (await agent.get(path)).body;
    await agent.patch(path).send({ version, name: 'Renamed' }).expect(200);
    await lead.delete(`${members()}/${member.id}`).expect(204);
    await agent.get(path).expect(404);
  });

  it('always keep a lead', async () => {
    const { members: listed } = (await lead.get(members()).expect(200)).body;
    const self = listed.find(({ email }: { email: string }) => email === team.lead.email);
    const refused = await lead
      .patch(`${members()}/${self.id}`)
      .send({ roles: ['labeller'] })
      .expect(409);
    expect(refused.body.code).toBe('last-lead');
    await lead.delete(`${members()}/${self.id}`).expect(409);
  });

  it('of another project cannot be changed through this one', async () => {
    const other = await makeTeam(test.app);
    const otherLead = await test.signedIn(other.lead);
    const { members: listed } = (await otherLead.get(members(other.project.id))).body;
    await lead
      .patch(`${members()}/${listed[0].id}`)
      .send({ roles: ['client'] })
      .expect(404);
    await lead.delete(`${members()}/${listed[0].id}`).expect(404);
  });
});

describe('the event stream', () => {
  it('tells other browsers of a change, and replays what was missed', async () => {
    const project = await makeProject(test.app);
    const user = await makeUser(test.app);
    await test.app.db.query('INSERT INTO memberships (id, projectId, userId, roles) VALUES (UUID(), ?, ?, ?)', [
      project.id,
      user.id,
      'lead',
    ]);
    const agent = await test.signedIn(user);
    const cookie = (await agent.post('/api/v1/session').send({ email: user.email, password: 'a password for tests' }))
      .headers['set-cookie'] as unknown as string[];
    const listen = async (headers: Record<string, string>, until: string) => {
      const abort = new AbortController();
      const answer = await fetch(`${test.url}/api/v1/projects/${project.id}/events`, {
        headers: { cookie: cookie[0] ?? '', ...headers },
        signal: abort.signal,
      });
      expect(answer.headers.get('content-type')).toBe('text/event-stream');
      let text = '';
      const reader = answer.body?.getReader();
      const timer = setTimeout(() => abort.abort(new Error(`nothing came: ${text}`)), 8000);
      while (reader && !text.includes(until)) text += new TextDecoder().decode((await reader.read()).value);
      clearTimeout(timer);
      await reader?.cancel();
      return text;
    };
    const heard = listen({}, '"what":"project"');
    await new Promise((resolve) => setTimeout(resolve, 300));
    await agent.patch(`/api/v1/projects/${project.id}`).send({ version: 1, name: 'Heard' }).expect(200);
    expect(await heard).toMatch(/id: \d+\ndata: /);
    const first = await test.app.db.getRepository(EventEntry).findOneByOrFail({ projectId: project.id });
    expect(await listen({ 'Last-Event-ID': String(Number(first.id) - 1) }, '"what":"project"')).toContain(
      `id: ${first.id}\n`,
    );
  });
});

describe('the API document', () => {
  it('is OpenAPI 3.1 and names every route with its schemas', async () => {
    const { routes } = await import('../../server/routes/index.ts');
    const { body } = await test.stranger.get('/api/v1/openapi.json').expect(200);
    expect(body.openapi).toBe('3.1.0');
    const ids = Object.values(body.paths as Record<string, Record<string, { operationId: string }>>).flatMap((path) =>
      Object.values(path).map(({ operationId }) => operationId),
    );
    expect(ids.sort()).toEqual(routes.map(({ id }) => id).sort());
    expect(body.paths['/projects'].post.requestBody.content['application/json'].schema.properties.name.maxLength).toBe(
      120,
    );
  });
});

describe('an address that is not there', () => {
  it('is a problem document with 404', async () => {
    const answer = await lead.get('/api/v1/nothing').expect(404);
    expect(answer.body).toMatchObject({ status: 404, code: 'not-found' });
    await lead.get('/api/v1/projects/not-a-uuid').expect(404);
  });
});
