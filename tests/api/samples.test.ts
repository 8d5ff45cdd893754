import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Activity } from '../../server/entities/activity.ts';
import { EventEntry } from '../../server/entities/event-entry.ts';
import type { LandClass } from '../../server/entities/land-class.ts';
import { Project } from '../../server/entities/project.ts';
import type { Scene } from '../../server/entities/scene.ts';
import { Sample } from '../../server/entities/sample.ts';
import type { Polygon } from '../../shared/contracts/geometry.ts';
import { expectTurnedAway, send } from '../factories/expect-authority.ts';
import { makeClass } from '../factories/make-class.ts';
import { makeMembership, makeTeam, type Team } from '../factories/make-project.ts';
import { makeSample, pixelPolygon, pixelRectangle } from '../factories/make-sample.ts';
import { makeScene } from '../factories/make-scene.ts';
import { openTestApp, type TestApp } from '../factories/test-app.ts';

let test: TestApp;
let team: Team;
let scene: Scene;
let moor: LandClass;
let samplesPath: string;

/** Columns 50 to 59 have no data in the last band. */
const withGap = {
  value: (band: number, column: number, row: number) => (band === 5 && column >= 50 ? 0 : 100 * (band + 1) + row),
};

beforeAll(async () => {
  test = await openTestApp();
  team = await makeTeam(test.app);
  scene = await makeScene(test.app, team.project, {}, withGap);
  moor = await makeClass(test.app, team.project, { name: 'Moor' });
  samplesPath = `/projects/${team.project.id}/samples`;
});
afterAll(() => test.close());
beforeEach(async () => {
  await test.app.db.getRepository(Sample).delete({ projectId: team.project.id });
  await test.app.db.getRepository(Activity).delete({ projectId: team.project.id });
  await test.app.db.getRepository(Project).update({ id: team.project.id }, { studyArea: null, lastSampleNumber: 0 });
});

function drawing(overrides: object = {}) {
  return {
    id: randomUUID(),
    sceneId: scene.id,
    classId: moor.id,
    geometry: pixelRectangle(scene, 10, 10, 4, 3),
    ...overrides,
  };
}
const draw = (body: object, user = team.labeller) => send(test, user, { method: 'post', path: samplesPath, body });
const readActivity = async () =>
  (await test.app.db.getRepository(Activity).find({ where: { projectId: team.project.id }, order: { id: 'ASC' } })).map(
    ({ text }) => text,
  );

describe('drawing a sample', () => {
  it('stores it with its number, pixels and area, and says so to the others', async () => {
    const body = drawing({ confidence: 'high', note: 'Heather in flower' });
    const answer = await draw(body);
    expect(answer.status).toBe(201);
    expect(answer.body).toMatchObject({
      ...body,
      number: 1,
      pixelCount: 12,
      version: 1,
      createdBy: { id: team.labeller.id, name: team.labeller.name },
      abilities: { edit: true },
    });
    // 3.8 × 2.8 pixels of 30 m, and the ground is 0.08 % larger than the grid at the central meridian (scale 0.9996).
    expect(answer.body.areaHa).toBeCloseTo((3.8 * 30 * 2.8 * 30) / 0.9996 ** 2 / 10_000, 4);
    const event = await test.app.db
      .getRepository(EventEntry)
      .findOneOrFail({ where: { projectId: team.project.id }, order: { id: 'DESC' } });
    expect(event.event).toEqual({ type: 'changed', what: 'samples', id: body.id, by: team.labeller.id });
  });

  it('keeps every digit of the geometry', async () => {
    const body = drawing();
    await draw(body);
    const { body: list } = await send(test, team.lead, { method: 'get', path: samplesPath });
    expect(list.samples[0].geometry).toEqual(body.geometry);
    const { body: read } = await send(test, team.lead, { method: 'get', path: `/samples/${body.id}` });
    expect(read.geometry).toEqual(body.geometry);
  });

  it('answers a repeated sending with the same sample, also when both come at once', async () => {
    const body = drawing();
    const [first, second] = await Promise.all([draw(body), draw(body)]);
    const third = await draw(body);
    expect([first.status, second.status, third.status]).toEqual([201, 201, 201]);
    expect(second.body).toEqual(first.body);
    expect(third.body).toEqual(first.body);
    expect(await test.app.db.getRepository(Sample).countBy({ projectId: team.project.id })).toBe(1);
    const taken = await draw(body, team.otherLabeller);
    expect([taken.status, taken.body.code]).toEqual([409, 'id-taken']);
  });

  it('gives numbers once, whoever draws at the same time', async () => {
    const people = [team.labeller, team.otherLabeller, team.lead];
    const answers = await Promise.all(Array.from({ length: 9 }, (_, i) => draw(drawing(), people[i % 3])));
    const numbers = answers.map(({ body }) => body.number as number).sort((a, b) => a - b);
    expect(numbers).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9]);
  });

  it('puts samples drawn one after the other into one line of the diary', async () => {
    for (let i = 0; i < 3; i++) await draw(drawing());
    await draw(drawing(), team.lead);
    expect(await readActivity()).toEqual(['drew 3 samples, 1 to 3', 'drew sample 4']);
  });

  it('is for lead and labellers', async () => {
    await expectTurnedAway(
      test,
      team,
      { method: 'post', path: samplesPath, body: drawing() },
      { forbidden: ['modeller', 'reviewer'] },
    );
  });

  it.each([
    ['a class of another project', 'classId'],
    ['a scene of another project', 'sceneId'],
    ['a scene that is not ready', 'sceneId'],
  ])('refuses %s', async (what, path) => {
    const other = await makeTeam(test.app);
    const scenes = test.app.db.getRepository((await import('../../server/entities/scene.ts')).Scene);
    const unfinished = scenes.create({ projectId: team.project.id, name: 'Unfinished', files: [], failure: null });
    if (what.includes('ready')) await scenes.save({ ...unfinished, state: 'failed' });
    const stranger = scenes.create({ projectId: other.project.id, name: 'Elsewhere', files: [], failure: null });
    if (what.includes('scene of another')) await scenes.save(stranger);
    const overrides =
      path === 'classId'
        ? { classId: (await makeClass(test.app, other.project)).id }
        : { sceneId: what.includes('ready') ? await idOf('Unfinished') : stranger.id };
    const { status, body } = await draw(drawing(overrides));
    expect([status, body.errors[0].path]).toEqual([400, path]);

    async function idOf(name: string) {
      return (await scenes.findOneByOrFail({ projectId: team.project.id, name })).id;
    }
  });

  it.each([{ geometry: { type: 'Point', coordinates: [0, 0] } }, { id: 'seven' }, { confidence: 'sure' }])(
    'refuses the malformed %o',
    async (overrides) => {
      const { status, body } = await draw(drawing(overrides));
      expect(status).toBe(400);
      expect(body.errors[0].path.split('.')[0]).toBe(Object.keys(overrides)[0]);
    },
  );
});

describe('refused drawings', () => {
  const open = (polygon: Polygon): Polygon => ({ ...polygon, coordinates: [polygon.coordinates[0].slice(0, -1)] });
  const cases: [string, () => Polygon, { found?: RegExp; at?: boolean }][] = [
    [
      'self-crossing',
      () =>
        pixelPolygon(scene, [
          [10, 10],
          [14, 14],
          [14, 10],
          [10, 14],
        ]),
      { found: /crosses/, at: true },
    ],
    [
      'not-closed',
      () =>
        open(
          pixelPolygon(scene, [
            [10, 10],
            [10, 14],
            [14, 14],
            [14, 12],
            [14, 10],
          ]),
        ),
      { found: /not closed/ },
    ],
    [
      'no-area',
      () => ({
        type: 'Polygon',
        coordinates: [
          [
            [-14.99, 60.43],
            [-14.98, 60.43],
            [-14.985, 60.43],
            [-14.99, 60.43],
          ],
        ],
      }),
      { found: /one line/ },
    ],
    [
      'outside-scene',
      () =>
        pixelPolygon(scene, [
          [-2, 10],
          [-2, 14],
          [4, 14],
          [4, 10],
        ]),
      { found: /outside the scene/, at: true },
    ],
    [
      'no-pixel',
      () =>
        pixelPolygon(scene, [
          [10.6, 10.6],
          [10.6, 10.9],
          [10.9, 10.9],
          [10.9, 10.6],
        ]),
      { found: /no pixel centre/ },
    ],
    ['no-pixel', () => pixelRectangle(scene, 52, 10, 3, 3), { found: /9 pixels, none with data/ }],
  ];

  it.each(cases)('says %s, where, and what to do', async (reason, geometry, { found, at }) => {
    const refused = await draw(drawing({ geometry: geometry() }));
    expect(refused.status).toBe(400);
    expect(refused.body.code).toBe('drawing-refused');
    expect(refused.body.errors).toEqual([{ path: 'geometry', message: reason }]);
    expect(refused.body.found).toMatch(found ?? /./);
    expect(refused.body.advice).not.toBe('');
    if (at) expect(refused.body.at).toHaveLength(2);
    const measured = await send(test, team.labeller, {
      method: 'post',
      path: `${samplesPath}/measure`,
      body: { sceneId: scene.id, geometry: geometry() },
    });
    expect(measured.body.refusal).toMatchObject({ reason, found: refused.body.found });
    expect(await test.app.db.getRepository(Sample).countBy({ projectId: team.project.id })).toBe(0);
  });

  it('names the place of a crossing and of the corner outside', async () => {
    const bow = pixelPolygon(scene, [
      [10, 10],
      [14, 14],
      [14, 10],
      [10, 14],
    ]);
    const crossing = await draw(drawing({ geometry: bow }));
    const middle = pixelPolygon(scene, [
      [12, 12],
      [12, 12],
      [12, 12],
    ]).coordinates[0][0];
    expect(crossing.body.at[0]).toBeCloseTo(middle[0], 5);
    expect(crossing.body.at[1]).toBeCloseTo(middle[1], 5);
    const outside = pixelPolygon(scene, [
      [4, 10],
      [4, 14],
      [61, 14],
      [4, 9],
    ]);
    expect((await draw(drawing({ geometry: outside }))).body.at).toEqual(outside.coordinates[0][2]);
  });

  it('counts only pixels whose centre is in the study area, and refuses a drawing with none', async () => {
    const studyArea = pixelRectangle(scene, 0, 0, 12, 40);
    await test.app.db.getRepository(Project).update({ id: team.project.id }, { studyArea });
    const half = await draw(drawing());
    expect([half.status, half.body.pixelCount]).toEqual([201, 6]);
    const none = await draw(drawing({ geometry: pixelRectangle(scene, 20, 10, 3, 3) }));
    expect([none.status, none.body.errors[0].message]).toEqual([400, 'outside-study-area']);
  });

  it('refuses a drawing of more than a million pixels before it reads one', async () => {
    const big = await makeScene(
      test.app,
      team.project,
      { name: 'Big' },
      { width: 1100, height: 1000, bandNames: ['Red'], value: () => 5 },
    );
    const body = drawing({ sceneId: big.id, geometry: pixelRectangle(big, 1, 1, 1098, 998) });
    const { status, body: answer } = await draw(body);
    expect([status, answer.errors[0].message]).toEqual([400, 'too-large']);
    // Straight in longitude and latitude, the long southern edge bends a pixel out of its row.
    expect(answer.found).toBe('a drawing 1098 × 999 pixels across');
  });
});

describe('measuring a drawing', () => {
  const measure = (geometry: Polygon, user = team.labeller) =>
    send(test, user, { method: 'post', path: `${samplesPath}/measure`, body: { sceneId: scene.id, geometry } });

  it('gives pixels, area, and the mean and spread of each band in scaled values', async () => {
    const [, , red] = scene.bands;
    const bands = test.app.db.getRepository((await import('../../server/entities/band.ts')).Band);
    await bands.update({ id: red.id }, { scale: 0.001, offset: -0.1, quantity: 'reflectance' });
    const { status, body } = await measure(pixelRectangle(scene, 10, 10, 4, 3));
    await bands.update({ id: red.id }, { scale: 1, offset: 0, quantity: 'digital number' });
    expect(status).toBe(200);
    expect(body).toMatchObject({ refusal: null, pixelCount: 12, nodataPixels: 0 });
    // Rows 10, 11 and 12: band 1 holds 100 + row, band 3 holds 300 + row; the variance of 0, 1, 2 is 2/3.
    expect(body.spectrum[0].mean).toBeCloseTo(111, 9);
    expect(body.spectrum[0].standardDeviation).toBeCloseTo(Math.sqrt(2 / 3), 9);
    expect(body.spectrum[2].mean).toBeCloseTo(0.211, 9);
    expect(body.spectrum[2].standardDeviation).toBeCloseTo(0.001 * Math.sqrt(2 / 3), 9);
    expect(body.spectrum[2].quantity).toBe('reflectance');
  });

  it('leaves pixels out that lack data in one band, and counts them', async () => {
    const { body } = await measure(pixelRectangle(scene, 48, 10, 4, 3));
    expect(body).toMatchObject({ refusal: null, pixelCount: 6, nodataPixels: 6 });
  });

  it('takes under 100 ms for a drawing of usual size', async () => {
    const geometry = pixelRectangle(scene, 5, 5, 20, 20);
    await measure(geometry);
    const times = [];
    for (let i = 0; i < 9; i++) {
      const from = performance.now();
      expect((await measure(geometry)).body.pixelCount).toBe(400);
      times.push(performance.now() - from);
    }
    expect(Math.min(...times)).toBeLessThan(100);
  });

  it('is open to the team', async () => {
    const geometry = pixelRectangle(scene, 10, 10, 4, 3);
    expect((await measure(geometry, team.modeller)).status).toBe(200);
    const use = { method: 'post' as const, path: `${samplesPath}/measure`, body: { sceneId: scene.id, geometry } };
    await expectTurnedAway(test, team, use, {});
    const bad = await send(test, team.labeller, { ...use, body: { sceneId: randomUUID(), geometry } });
    expect([bad.status, bad.body.errors[0].path]).toEqual([400, 'sceneId']);
  });
});

describe('the list of samples', () => {
  it('is in the order of numbers, without deleted ones, and says what the viewer may edit', async () => {
    const own = await makeSample(test.app, scene, moor, { column: 2, row: 2 }, { createdById: team.labeller.id });
    const others = await makeSample(test.app, scene, moor, { column: 12, row: 2 }, { createdById: team.lead.id });
    await makeSample(test.app, scene, moor, { column: 22, row: 2 }, { deletedAt: new Date() });
    const list = async (user: { email: string }) =>
      (await send(test, user, { method: 'get', path: samplesPath })).body.samples.map(
        ({ id, abilities }: { id: string; abilities: { edit: boolean } }) => [id, abilities.edit],
      );
    expect(await list(team.labeller)).toEqual([
      [own.id, true],
      [others.id, false],
    ]);
    expect(await list(team.lead)).toEqual([
      [own.id, true],
      [others.id, true],
    ]);
    expect(await list(team.reviewer)).toEqual([
      [own.id, false],
      [others.id, false],
    ]);
    await expectTurnedAway(test, team, { method: 'get', path: samplesPath }, {});
  });

  it('can be cut to a box', async () => {
    const west = await makeSample(test.app, scene, moor, { column: 2, row: 2 });
    await makeSample(test.app, scene, moor, { column: 50, row: 30 });
    const [[lon, lat]] = west.geometry.coordinates[0];
    const find = async (box: number[]) =>
      send(test, team.lead, { method: 'get', path: `${samplesPath}?bbox=${box.join(',')}` });
    const near = await find([lon - 0.001, lat - 0.001, lon + 0.001, lat + 0.001]);
    expect(near.body.samples.map(({ id }: Sample) => id)).toEqual([west.id]);
    expect((await find([lon - 0.2, lat - 0.001, lon - 0.1, lat + 0.001])).body.samples).toEqual([]);
    // A box from 170° east over the antimeridian to −14.99: it meets the western sample only.
    expect((await find([170, 60, lon + 0.001, 61])).body.samples).toHaveLength(1);
    for (const bbox of ['1,2,3', '1,2,3,1.2.3', 'a,b,c,d']) {
      const use = { method: 'get' as const, path: `${samplesPath}?bbox=${bbox}` };
      expect((await send(test, team.lead, use)).status, bbox).toBe(400);
    }
  });
});

describe('changing a sample', () => {
  let sample: Sample;
  let path: string;
  beforeEach(async () => {
    sample = await makeSample(test.app, scene, moor, { column: 2, row: 2 }, { createdById: team.labeller.id });
    path = `/samples/${sample.id}`;
  });
  const patch = (body: object, user = team.labeller) => send(test, user, { method: 'patch', path, body });

  it('measures a new outline again and keeps the old one in its history', async () => {
    const geometry = pixelRectangle(scene, 20, 5, 5, 5);
    const { status, body } = await patch({ version: 1, geometry });
    expect(status).toBe(200);
    expect(body).toMatchObject({ geometry, pixelCount: 25, version: 2, number: sample.number });
    expect(body.updatedAt > body.createdAt).toBe(true);
    const history = await send(test, team.reviewer, { method: 'get', path: `${path}/history` });
    expect(history.body.versions).toMatchObject([
      { versionNumber: 2, change: 'edited', geometry, pixelCount: 25, by: { id: team.labeller.id } },
      { versionNumber: 1, change: 'created', geometry: sample.geometry, pixelCount: 9 },
    ]);
    await expectTurnedAway(test, team, { method: 'get', path: `${path}/history` }, {});
    expect(await readActivity()).toEqual([`changed sample ${sample.number}`]);
  });

  it('changes class, confidence and note without a new outline', async () => {
    const heath = await makeClass(test.app, team.project);
    const { body } = await patch({ version: 1, classId: heath.id, confidence: 'low', note: 'Unsure' });
    expect(body).toMatchObject({ classId: heath.id, confidence: 'low', note: 'Unsure', pixelCount: 9, version: 2 });
    const stranger = await makeClass(test.app, (await makeTeam(test.app)).project);
    const refused = await patch({ version: 2, classId: stranger.id });
    expect([refused.status, refused.body.errors[0].path]).toEqual([400, 'classId']);
  });

  it('refuses a crossing outline and keeps the sample as it was', async () => {
    const geometry = pixelPolygon(scene, [
      [10, 10],
      [14, 14],
      [14, 10],
      [10, 14],
    ]);
    const { status, body } = await patch({ version: 1, geometry });
    expect([status, body.code]).toEqual([400, 'drawing-refused']);
    const kept = await send(test, team.lead, { method: 'get', path });
    expect(kept.body).toMatchObject({ version: 1, geometry: sample.geometry });
  });

  it('tells the second of two people and hands over what stands', async () => {
    await patch({ version: 1, note: 'first' }, team.lead);
    const late = await patch({ version: 1, note: 'second' });
    expect(late.status).toBe(409);
    expect(late.body).toMatchObject({ code: 'stale-version', current: { id: sample.id, note: 'first', version: 2 } });
  });

  it('lets exactly one of two changes at the same moment through', async () => {
    const answers = await Promise.all([patch({ version: 1, note: 'a' }), patch({ version: 1, note: 'b' }, team.lead)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    const { body } = await send(test, team.lead, { method: 'get', path: `${path}/history` });
    expect(body.versions).toHaveLength(2);
  });

  it('is for the lead and the labeller who drew it', async () => {
    await expectTurnedAway(
      test,
      team,
      { method: 'patch', path, body: { version: 1, note: 'x' } },
      { forbidden: ['otherLabeller', 'modeller', 'reviewer'] },
    );
    await makeMembership(test.app, (await makeTeam(test.app)).project, team.outsider, 'lead');
    expect((await patch({ version: 1 }, team.outsider)).status).toBe(404);
    const missing = { method: 'patch' as const, path: `/samples/${randomUUID()}`, body: { version: 1 } };
    expect((await send(test, team.lead, missing)).status).toBe(404);
  });
});

describe('deleting and restoring a sample', () => {
  let sample: Sample;
  let path: string;
  beforeEach(async () => {
    sample = await makeSample(test.app, scene, moor, { column: 2, row: 2 }, { createdById: team.labeller.id });
    path = `/samples/${sample.id}`;
  });
  const remove = (version: number, user = team.labeller) =>
    send(test, user, { method: 'delete', path, body: { version } });
  const restore = (versionNumber: number, user = team.labeller) =>
    send(test, user, { method: 'post', path: `${path}/restore`, body: { versionNumber } });

  it('takes it off the map, twice without an error, and brings it back as it was', async () => {
    expect((await remove(1)).status).toBe(204);
    expect((await remove(1)).status).toBe(204);
    expect((await send(test, team.lead, { method: 'get', path })).status).toBe(404);
    expect((await send(test, team.lead, { method: 'get', path: samplesPath })).body.samples).toEqual([]);
    const late = await send(test, team.lead, { method: 'patch', path, body: { version: 1, note: 'late' } });
    expect([late.status, late.body.code]).toEqual([409, 'deleted']);

    const back = await restore(1);
    expect(back.status).toBe(200);
    expect(back.body).toMatchObject({ id: sample.id, number: sample.number, geometry: sample.geometry, version: 3 });
    const { body } = await send(test, team.lead, { method: 'get', path: `${path}/history` });
    expect(body.versions.map(({ change }: { change: string }) => change)).toEqual(['restored', 'deleted', 'created']);
    const { number } = sample;
    expect(await readActivity()).toEqual([`deleted sample ${number}`, `restored sample ${number}`]);
  });

  it('restores an earlier version of a sample that is on the map', async () => {
    const geometry = pixelRectangle(scene, 20, 5, 5, 5);
    await send(test, team.labeller, { method: 'patch', path, body: { version: 1, geometry, note: 'moved' } });
    const { body } = await restore(1, team.lead);
    expect(body).toMatchObject({ geometry: sample.geometry, note: '', pixelCount: 9, version: 3 });
    const unknown = await restore(17);
    expect([unknown.status, unknown.body.errors[0].path]).toEqual([400, 'versionNumber']);
  });

  it('keeps the present class where that of the version is gone', async () => {
    const heath = await makeClass(test.app, team.project);
    const other = await makeSample(test.app, scene, heath, { column: 22, row: 2 });
    const body = { moveSamplesTo: moor.id };
    await send(test, team.lead, { method: 'delete', path: `/classes/${heath.id}`, body });
    const use = { method: 'post' as const, path: `/samples/${other.id}/restore`, body: { versionNumber: 1 } };
    const restored = await send(test, team.lead, use);
    expect([restored.status, restored.body.classId]).toEqual([200, moor.id]);
  });

  it('is refused when someone changed it in between, and shows their version', async () => {
    await send(test, team.lead, { method: 'patch', path, body: { version: 1, note: 'keep this one' } });
    const late = await remove(1);
    expect(late.status).toBe(409);
    expect(late.body).toMatchObject({ code: 'stale-version', current: { note: 'keep this one', version: 2 } });
  });

  it('is for the lead and the labeller who drew it', async () => {
    const forbidden = ['otherLabeller', 'modeller', 'reviewer'] as const;
    const removal = { method: 'delete' as const, path, body: { version: 1 } };
    await expectTurnedAway(test, team, removal, { forbidden: [...forbidden] });
    const restoration = { method: 'post' as const, path: `${path}/restore`, body: { versionNumber: 1 } };
    await expectTurnedAway(test, team, restoration, { forbidden: [...forbidden] });
    await expectTurnedAway(test, team, { method: 'get', path }, {});
  });
});
