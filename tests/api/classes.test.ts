import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Activity } from '../../server/entities/activity.ts';
import { LandClass } from '../../server/entities/land-class.ts';
import type { Scene } from '../../server/entities/scene.ts';
import { Sample } from '../../server/entities/sample.ts';
import { expectTurnedAway, send } from '../factories/expect-authority.ts';
import { makeClass } from '../factories/make-class.ts';
import { makeTeam, type Team } from '../factories/make-project.ts';
import { makeSample } from '../factories/make-sample.ts';
import { makeScene } from '../factories/make-scene.ts';
import { openTestApp, type TestApp } from '../factories/test-app.ts';

let test: TestApp;
let team: Team;
let classesPath: string;

beforeAll(async () => {
  test = await openTestApp();
});
afterAll(() => test.close());
beforeEach(async () => {
  team = await makeTeam(test.app);
  classesPath = `/projects/${team.project.id}/classes`;
});

const water = { code: 7, name: 'Open water', colour: '#294483', definition: 'Sea, lochs and rivers' };

describe('the class scheme', () => {
  it('is read by the team in its order, with sample counts', async () => {
    const moor = await makeClass(test.app, team.project, { name: 'Moor', position: 2 });
    const pasture = await makeClass(test.app, team.project, { name: 'Pasture', position: 1 });
    const scene = await makeScene(test.app, team.project);
    await makeSample(test.app, scene, moor, { column: 2, row: 2 });
    await makeSample(test.app, scene, moor, { column: 12, row: 2 }, { deletedAt: new Date() });
    const { status, body } = await send(test, team.reviewer, { method: 'get', path: classesPath });
    expect(status).toBe(200);
    const seen = body.classes.map(({ id, sampleCount }: { id: string; sampleCount: number }) => [id, sampleCount]);
    expect(seen).toEqual([
      [pasture.id, 0],
      [moor.id, 1],
    ]);
    await expectTurnedAway(test, team, { method: 'get', path: classesPath }, {});
  });
});

describe('adding a class', () => {
  it('puts it at the end, and takes the code given or the next one', async () => {
    const first = await send(test, team.lead, { method: 'post', path: classesPath, body: water });
    expect(first.status).toBe(201);
    expect(first.body).toMatchObject({ ...water, position: 0, sampleCount: 0, version: 1 });
    const second = await send(test, team.lead, {
      method: 'post',
      path: classesPath,
      body: { name: 'Moor', colour: '#A85AA4' },
    });
    expect(second.body).toMatchObject({ code: 8, position: 1, definition: '' });
    const lines = await test.app.db.getRepository(Activity).findBy({ projectId: team.project.id });
    expect(lines.map(({ text }) => text)).toEqual(['added class Open water', 'added class Moor']);
  });

  it('fills a gap when the highest code is taken', async () => {
    await makeClass(test.app, team.project, { code: 1 });
    await makeClass(test.app, team.project, { code: 254 });
    const { body } = await send(test, team.lead, {
      method: 'post',
      path: classesPath,
      body: { name: 'Moor', colour: '#A85AA4' },
    });
    expect(body.code).toBe(2);
  });

  it.each([0, 255, 1.5])('refuses code %d', async (code) => {
    const { status, body } = await send(test, team.lead, {
      method: 'post',
      path: classesPath,
      body: { ...water, code },
    });
    expect(status).toBe(400);
    expect(body.errors[0].path).toBe('code');
  });

  it('refuses a code that is taken, and names its holder', async () => {
    await makeClass(test.app, team.project, { code: 7, name: 'Arable' });
    const { status, body } = await send(test, team.lead, { method: 'post', path: classesPath, body: water });
    expect(status).toBe(409);
    expect(body).toMatchObject({ code: 'code-taken', errors: [{ path: 'code', message: '7 is the code of Arable.' }] });
  });

  it('gives every class a code of its own when many are added at once', async () => {
    const add = (name: string) =>
      send(test, team.lead, { method: 'post', path: classesPath, body: { name, colour: '#294483' } });
    const answers = await Promise.all(['a', 'b', 'c', 'd', 'e'].map(add));
    expect(answers.map(({ body }) => body.code).sort()).toEqual([1, 2, 3, 4, 5]);
  });

  it('is the lead’s alone', async () => {
    await expectTurnedAway(
      test,
      team,
      { method: 'post', path: classesPath, body: water },
      { forbidden: ['labeller', 'modeller', 'reviewer'] },
    );
  });
});

describe('changing a class', () => {
  it('renames, recolours and recodes', async () => {
    const landClass = await makeClass(test.app, team.project);
    const path = `/classes/${landClass.id}`;
    const body = { version: 1, code: 90, name: 'Saltmarsh', colour: '#299785' };
    const answer = await send(test, team.lead, { method: 'patch', path, body });
    expect(answer.status).toBe(200);
    expect(answer.body).toMatchObject({ code: 90, name: 'Saltmarsh', colour: '#299785', version: 2 });
    await expectTurnedAway(
      test,
      team,
      { method: 'patch', path, body: { version: 2, name: 'x' } },
      { forbidden: ['labeller', 'modeller', 'reviewer'] },
    );
  });

  it('tells the second of two people, and shows both what stands', async () => {
    const landClass = await makeClass(test.app, team.project, { name: 'Moor' });
    const path = `/classes/${landClass.id}`;
    await send(test, team.lead, { method: 'patch', path, body: { version: 1, name: 'Heath and moor' } });
    const late = await send(test, team.lead, { method: 'patch', path, body: { version: 1, colour: '#000000' } });
    expect(late.status).toBe(409);
    expect(late.body).toMatchObject({ code: 'stale-version', current: { name: 'Heath and moor', version: 2 } });
  });

  it('refuses another class’s code, and a colour that is none', async () => {
    await makeClass(test.app, team.project, { code: 1 });
    const landClass = await makeClass(test.app, team.project, { code: 2 });
    const path = `/classes/${landClass.id}`;
    const taken = await send(test, team.lead, { method: 'patch', path, body: { version: 1, code: 1 } });
    expect([taken.status, taken.body.code]).toEqual([409, 'code-taken']);
    const colour = await send(test, team.lead, { method: 'patch', path, body: { version: 1, colour: 'blue' } });
    expect([colour.status, colour.body.errors[0].path]).toEqual([400, 'colour']);
    const own = await send(test, team.lead, { method: 'patch', path, body: { version: 1, code: 2 } });
    expect(own.status).toBe(200);
  });

  it('answers 404 for a class that is not there', async () => {
    const use = { method: 'patch' as const, path: `/classes/${randomUUID()}`, body: { version: 1 } };
    expect((await send(test, team.lead, use)).status).toBe(404);
    expect((await send(test, team.lead, { ...use, path: '/classes/no-id' })).status).toBe(404);
  });
});

describe('ordering the classes', () => {
  it('sets their places', async () => {
    const [a, b, c] = [
      await makeClass(test.app, team.project),
      await makeClass(test.app, team.project),
      await makeClass(test.app, team.project),
    ];
    const use = { method: 'put' as const, path: `${classesPath}/order`, body: { ids: [c.id, a.id, b.id] } };
    const { status, body } = await send(test, team.lead, use);
    expect(status).toBe(200);
    expect(body.classes.map(({ id, position }: LandClass) => [id, position])).toEqual([
      [c.id, 0],
      [a.id, 1],
      [b.id, 2],
    ]);
    await expectTurnedAway(test, team, use, { forbidden: ['labeller', 'modeller', 'reviewer'] });
  });

  it('refuses an order that names a class twice, and one that misses a class added in between', async () => {
    const [a, b] = [await makeClass(test.app, team.project), await makeClass(test.app, team.project)];
    const path = `${classesPath}/order`;
    const twice = await send(test, team.lead, { method: 'put', path, body: { ids: [a.id, a.id] } });
    expect(twice.status).toBe(400);
    const stale = await send(test, team.lead, { method: 'put', path, body: { ids: [b.id] } });
    expect([stale.status, stale.body.code]).toEqual([409, 'stale-order']);
  });
});

describe('deleting a class', () => {
  let scene: Scene;
  let moor: LandClass;
  let heath: LandClass;
  beforeEach(async () => {
    scene = await makeScene(test.app, team.project);
    moor = await makeClass(test.app, team.project, { name: 'Moor' });
    heath = await makeClass(test.app, team.project, { name: 'Heath' });
  });

  it('works without samples', async () => {
    const path = `/classes/${moor.id}`;
    await expectTurnedAway(test, team, { method: 'delete', path, body: {} }, { forbidden: ['labeller', 'modeller'] });
    expect((await send(test, team.lead, { method: 'delete', path, body: {} })).status).toBe(204);
    expect(await test.app.db.getRepository(LandClass).existsBy({ id: moor.id })).toBe(false);
  });

  it('is refused with samples, until they move; each keeps a line of it in its history', async () => {
    const sample = await makeSample(test.app, scene, moor, { column: 2, row: 2 });
    const stays = await makeSample(test.app, scene, heath, { column: 32, row: 2 });
    const deleted = await makeSample(test.app, scene, moor, { column: 12, row: 2 }, { deletedAt: new Date() });
    const path = `/classes/${moor.id}`;
    const refused = await send(test, team.lead, { method: 'delete', path, body: {} });
    expect(refused.status).toBe(409);
    expect(refused.body).toMatchObject({ code: 'has-samples', found: '1 sample' });

    const moved = await send(test, team.lead, { method: 'delete', path, body: { moveSamplesTo: heath.id } });
    expect(moved.status).toBe(204);
    const samples = test.app.db.getRepository(Sample);
    expect(await samples.findOneByOrFail({ id: sample.id })).toMatchObject({ classId: heath.id, version: 2 });
    expect(await samples.findOneByOrFail({ id: stays.id })).toMatchObject({ classId: heath.id, version: 1 });
    expect(await samples.findOneByOrFail({ id: deleted.id })).toMatchObject({ classId: heath.id });
    const history = await send(test, team.lead, { method: 'get', path: `/samples/${sample.id}/history` });
    expect(history.body.versions).toMatchObject([
      { versionNumber: 2, change: 'edited', classId: heath.id, by: { id: team.lead.id }, geometry: sample.geometry },
      { versionNumber: 1, change: 'created', classId: moor.id },
    ]);
    const untouched = await send(test, team.lead, { method: 'get', path: `/samples/${stays.id}/history` });
    expect(untouched.body.versions).toHaveLength(1);
    const line = await test.app.db.getRepository(Activity).findOneOrFail({
      where: { projectId: team.project.id },
      order: { id: 'DESC' },
    });
    expect(line.text).toBe('deleted class Moor and moved 1 sample to Heath');
  });

  it('does not move samples to itself or into another project', async () => {
    const elsewhere = await makeClass(test.app, (await makeTeam(test.app)).project);
    for (const moveSamplesTo of [moor.id, elsewhere.id, randomUUID()]) {
      const use = { method: 'delete' as const, path: `/classes/${moor.id}`, body: { moveSamplesTo } };
      const { status, body } = await send(test, team.lead, use);
      expect([status, body.errors?.[0].path]).toEqual([400, 'moveSamplesTo']);
    }
  });

  it('takes samples that were deleted before with it', async () => {
    const deleted = await makeSample(test.app, scene, moor, { column: 12, row: 2 }, { deletedAt: new Date() });
    expect((await send(test, team.lead, { method: 'delete', path: `/classes/${moor.id}`, body: {} })).status).toBe(204);
    expect(await test.app.db.getRepository(Sample).existsBy({ id: deleted.id })).toBe(false);
  });
});
