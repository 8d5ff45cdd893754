import { randomUUID } from 'node:crypto';
import { mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { request as openRequest } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import request from 'supertest';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { EventEntry } from '../../server/entities/event-entry.ts';
import { Job } from '../../server/entities/job.ts';
import { Run } from '../../server/entities/run.ts';
import { Scene } from '../../server/entities/scene.ts';
import { Sample } from '../../server/entities/sample.ts';
import { ingestScene } from '../../server/services/ingest-scene.ts';
import { browserOf, expectTurnedAway, send } from '../factories/expect-authority.ts';
import { makeClass } from '../factories/make-class.ts';
import { makeTeam, type Team } from '../factories/make-project.ts';
import { makeRaster, type RasterSpec } from '../factories/make-raster.ts';
import { makeSample, pixelPolygon } from '../factories/make-sample.ts';
import { makeScene, waitForScene } from '../factories/make-scene.ts';
import { openTestApp, type TestApp } from '../factories/test-app.ts';

const MB = 1024 * 1024;
const PATIENT = { timeout: 20_000 };
let test: TestApp;
let team: Team;
let scenesPath: string;
let dir: string;

beforeAll(async () => {
  test = await openTestApp({ uploadLimitBytes: 16 * MB, maxScenePixels: 4_000_000 });
  dir = await mkdtemp(join(tmpdir(), 'groundsel-scenes-'));
});
afterAll(async () => {
  await test.close();
  await rm(dir, { recursive: true, force: true });
});
beforeEach(async () => {
  team = await makeTeam(test.app);
  scenesPath = `/projects/${team.project.id}/scenes`;
});

async function raster(spec: Partial<RasterSpec> = {}): Promise<string> {
  const path = join(dir, `${randomUUID()}.tif`);
  await makeRaster(path, spec);
  return path;
}

/** Uploads files as the lead does. */
async function upload(files: { path: string; name?: string }[], fields: Record<string, string> = {}) {
  let post = (await browserOf(test, team.lead)).post(`/api/v1${scenesPath}`);
  for (const [name, value] of Object.entries(fields)) post = post.field(name, value);
  for (const { path, name } of files) post = post.attach('files', path, name ?? 'scene.tif');
  return post;
}

async function filesBelow(folder: string): Promise<string[]> {
  const path = join(test.dataDir, folder);
  await mkdir(path, { recursive: true });
  return (await readdir(path, { recursive: true, withFileTypes: true }))
    .filter((entry) => entry.isFile())
    .map(({ name }) => name);
}
const leftovers = async () => [...(await filesBelow('scratch')), ...(await filesBelow('files/incoming'))];

describe('uploading a scene', () => {
  it('answers at once, and ingests the file in the background', async () => {
    const path = await raster();
    const fields = { name: 'Late summer', acquiredOn: '2026-08-30' };
    const answer = await upload([{ path, name: 'île.tif' }], fields);
    expect(answer.status).toBe(201);
    expect(answer.body).toMatchObject({ ...fields, state: 'ingesting', bands: [], uploadedBy: { id: team.lead.id } });
    expect(answer.body.files).toMatchObject([{ name: 'île.tif' }]);
    expect(answer.body.job).toMatchObject({ kind: 'ingest' });

    const scene = await waitForScene(test.app, answer.body.id);
    const { body } = await send(test, team.labeller, { method: 'get', path: `/scenes/${scene.id}` });
    expect(body).toMatchObject({
      state: 'ready',
      failure: null,
      width: 60,
      height: 40,
      pixelWidth: 30,
      crsEpsg: 32628,
      guessedRoles: false,
      bounds: [
        expect.closeTo(-15, 9),
        expect.closeTo(60.4255, 4),
        expect.closeTo(-14.9673, 4),
        expect.closeTo(60.43628, 4),
      ],
    });
    expect(body.bands.map(({ number, name, role }: never) => [number, name, role])).toEqual([
      [1, 'Blue', 'blue'],
      [2, 'Green', 'green'],
      [3, 'Red', 'red'],
      [4, 'Near infrared', 'nir'],
      [5, 'SWIR 1', 'swir1'],
      [6, 'SWIR 2', 'swir2'],
    ]);
    expect(body.bands[0]).toMatchObject({ gsdMeters: 30, scale: 1, offset: 0, nodata: 0, dataType: 'uint16' });
    expect(body.bands[0].statistics).toMatchObject({ validPixels: 2400, nodataPixels: 0, min: 1000, max: 5039 });
    expect(await test.app.files.list(`scenes/${scene.id}/`)).toHaveLength(6);
    expect(await leftovers()).toEqual([]);
    const events = await test.app.db.getRepository(EventEntry).findBy({ projectId: team.project.id });
    const seen = events.map(({ event }) => (event.type === 'job' ? event.job.state : event.what));
    expect(seen).toContain('scenes');
    // The last word on the job follows the scene's row.
    await expect.poll(async () => (await readJob(scene.id)).state, PATIENT).toBe('finished');
  });

  const readJob = async (sceneId: string) => test.app.db.getRepository(Job).findOneByOrFail({ sceneId });

  it('takes the file’s name where none is given, and never as a path', async () => {
    const { body } = await upload([{ path: await raster(), name: '../../../etc/evil.tif' }]);
    expect(body.name).not.toMatch(/[/\\]/);
    await waitForScene(test.app, body.id);
    expect((await test.app.files.list(`scenes/${body.id}/`))[0]).toBe(`scenes/${body.id}/band-01.tif`);
  });

  it('makes one scene of several files, and leaves a coarse thermal band on its own grid', async () => {
    const optical = await raster();
    const thermal = await raster({
      width: 20,
      height: 14,
      pixelSize: 90,
      bandNames: ['Thermal 10.9 µm'],
      scale: 0.01,
      offset: 150,
      value: (_band, column, row) => 13_000 + column * 10 + row,
    });
    const { body } = await upload([
      { path: thermal, name: 'thermal.tif' },
      { path: optical, name: 'optical.tif' },
    ]);
    const scene = await waitForScene(test.app, body.id);
    expect(scene).toMatchObject({ state: 'ready', width: 60, height: 40, pixelWidth: 30 });
    expect(scene.bands).toHaveLength(7);
    expect(scene.bands[0]).toMatchObject({
      role: 'thermal',
      width: 20,
      height: 14,
      pixelWidth: 90,
      gsdMeters: 90,
      scale: 0.01,
      offset: 150,
      quantity: 'kelvin',
      centreWavelengthUm: 10.9,
    });
    // Scene pixel (31, 20) lies in thermal pixel (10, 6).
    const [[lon, lat]] = pixelPolygon(scene, [
      [31.5, 20.5],
      [31.6, 20.5],
      [31.6, 20.6],
    ]).coordinates[0];
    const probe = await send(test, team.labeller, {
      method: 'get',
      path: `/scenes/${scene.id}/probe?lon=${lon}&lat=${lat}`,
    });
    expect(probe.body.pixel).toEqual({ column: 31, row: 20 });
    expect(probe.body.values[0]).toMatchObject({
      stored: 13_106,
      value: expect.closeTo(281.06, 6),
      quantity: 'kelvin',
    });
    const tile = await send(test, team.labeller, { method: 'get', path: tilePath(scene, '?bands=1') });
    expect(tile.status).toBe(200);
  });

  it('guesses the roles of six bands without names, and says so until the band table is saved', async () => {
    const { body } = await upload([{ path: await raster({ bandNames: ['', '', '', '', '', ''] }) }]);
    const scene = await waitForScene(test.app, body.id);
    expect(scene.guessedRoles).toBe(true);
    expect(scene.bands.map(({ role }) => role)).toEqual(['blue', 'green', 'red', 'nir', 'swir1', 'swir2']);
    expect(scene.bands[0].name).toBe('Band 1');
    const [{ id, name, role, centreWavelengthUm, gsdMeters, scale, offset, quantity }] = scene.bands;
    const bands = [{ id, name, role, centreWavelengthUm, gsdMeters, scale, offset, quantity }];
    const saved = await send(test, team.lead, {
      method: 'patch',
      path: `/scenes/${scene.id}`,
      body: { version: 1, bands },
    });
    expect(saved.body.guessedRoles).toBe(false);
  });

  it('guesses nothing for five bands without names', async () => {
    const scene = await makeScene(test.app, team.project, {}, { bandNames: ['', '', '', '', ''] });
    expect(scene.guessedRoles).toBe(false);
    expect(new Set(scene.bands.map(({ role }) => role))).toEqual(new Set(['other']));
  });

  it('is for lead and modeller', async () => {
    const use = { method: 'post' as const, path: scenesPath };
    await expectTurnedAway(test, team, use, { forbidden: ['labeller', 'reviewer'] });
    await expectTurnedAway(test, team, { method: 'get', path: scenesPath }, {});
  });

  it('is told its limits with the list, so that a browser can say so before sending', async () => {
    const { body } = await send(test, team.labeller, { method: 'get', path: scenesPath });
    expect(body.limits).toEqual({ fileBytes: test.app.config.uploadLimitBytes, files: 64 });
  });

  it('refuses what is no upload, has no file, an empty file, or a date that is none', async () => {
    const json = await send(test, team.lead, { method: 'post', path: scenesPath, body: { name: 'x' } });
    expect(json.status).toBe(400);
    const none = await upload([], { name: 'Nothing' });
    expect([none.status, none.body.errors[0].path]).toEqual([400, 'files']);
    const empty = join(dir, 'empty.tif');
    await writeFile(empty, '');
    const zero = await upload([{ path: empty }]);
    expect([zero.status, zero.body.errors[0].message]).toEqual([400, 'scene.tif is empty.']);
    const date = await upload([{ path: await raster() }], { acquiredOn: '30 August' });
    expect([date.status, date.body.errors[0].path]).toEqual([400, 'acquiredOn']);
    expect(await leftovers()).toEqual([]);
    expect(await test.app.db.getRepository(Scene).countBy({ projectId: team.project.id })).toBe(0);
  });

  it('refuses a file above the limit and keeps none of it', async () => {
    const big = join(dir, 'big.tif');
    await writeFile(big, Buffer.alloc(17 * MB));
    const { status, body } = await upload([{ path: await raster() }, { path: big }]);
    expect([status, body.code]).toEqual([413, 'too-large']);
    expect(await leftovers()).toEqual([]);
  });

  it('leaves nothing of an upload that breaks off', async () => {
    const cookie = await signInByHand();
    const head = '--edge\r\nContent-Disposition: form-data; name="files"; filename="half.tif"\r\n\r\n';
    const sent = openRequest(`${test.url}/api/v1${scenesPath}`, {
      method: 'POST',
      headers: { cookie, 'content-type': 'multipart/form-data; boundary=edge', 'content-length': String(8 * MB) },
    });
    sent.on('error', () => undefined);
    sent.write(head);
    sent.write(Buffer.alloc(2 * MB, 1));
    await expect.poll(leftovers, PATIENT).toHaveLength(1);
    sent.destroy();
    await expect.poll(leftovers, PATIENT).toEqual([]);
    expect(await readdir(join(test.dataDir, 'scratch'))).toEqual([]);
    expect(await test.app.db.getRepository(Scene).countBy({ projectId: team.project.id })).toBe(0);
  });

  it('refuses an upload that the disk has no room for before a byte is stored', async () => {
    const cookie = await signInByHand();
    const status = await new Promise<[number | undefined, string]>((resolve, reject) => {
      const sent = openRequest(`${test.url}/api/v1${scenesPath}`, {
        method: 'POST',
        headers: { cookie, 'content-type': 'multipart/form-data; boundary=edge', 'content-length': String(1e15) },
      });
      sent.on('error', reject);
      sent.on('response', (response) => {
        let text = '';
        response.on('data', (chunk: Buffer) => (text += String(chunk)));
        response.on('end', () => {
          sent.destroy();
          resolve([response.statusCode, JSON.parse(text).code]);
        });
      });
      sent.write('--edge\r\n');
    });
    expect(status).toEqual([507, 'no-room']);
  });

  async function signInByHand(): Promise<string> {
    const answer = await request(test.url)
      .post('/api/v1/session')
      .send({ email: team.lead.email, password: 'a password for tests' });
    return String(answer.headers['set-cookie']).split(';')[0];
  }
});

describe('files that cannot become a scene', () => {
  const blank = async (): Promise<string> => {
    const path = join(dir, `${randomUUID()}.tif`);
    await writeFile(path, 'This is a letter, not an image.');
    return path;
  };
  const cutShort = async (): Promise<string> => {
    const path = await raster();
    const bytes = await readFile(path);
    await writeFile(path, bytes.subarray(0, bytes.length / 2));
    return path;
  };
  const cases: [string, () => Promise<string[]>, RegExp][] = [
    ['not-a-raster', async () => [await blank()], /none of the allowed readers/],
    ['not-a-raster', async () => [await raster(), await blank()], /^scene-1\.tif: /],
    ['unreadable', async () => [await cutShort()], /./],
    ['no-crs', async () => [await raster({ crs: '' })], /no coordinate reference system/],
    ['all-nodata', async () => [await raster({ value: () => 0 })], /no pixel with data/],
    ['empty-band', async () => [await raster({ value: (band) => (band === 2 ? 0 : 9) })], /band 3 \(Red\)/],
    [
      'too-many-pixels',
      async () => [await raster({ width: 2100, height: 2000, bandNames: ['Red'] })],
      /4200000 pixels/,
    ],
    ['crs-mismatch', async () => [await raster(), await raster({ crs: 'EPSG:32629' })], /28N.*29N|29N.*28N/],
    ['no-overlap', async () => [await raster(), await raster({ originX: 600_000 })], /do not overlap/],
    [
      'partial-cover',
      async () => [
        await raster(),
        await raster({ pixelSize: 90, width: 10, height: 14, nodata: null, bandNames: ['Thermal'] }),
      ],
      /covers 50 %/,
    ],
  ];

  it.each(cases)('fail with %s in words', async (code, files, found) => {
    const paths = await files();
    const { status, body } = await upload(paths.map((path, i) => ({ path, name: `scene-${i}.tif` })));
    expect(status).toBe(201);
    await waitForScene(test.app, body.id);
    const { body: scene } = await send(test, team.lead, { method: 'get', path: `/scenes/${body.id}` });
    expect(scene.state).toBe('failed');
    expect(scene.failure).toMatchObject({ code, found: expect.stringMatching(found) });
    expect(scene.failure.wanted).not.toBe('');
    expect(scene.failure.advice).not.toBe('');
    expect(JSON.stringify(scene)).not.toContain(test.dataDir);
    await expect.poll(leftovers, PATIENT).toEqual([]);
    expect(await test.app.files.list(`scenes/${body.id}/`)).toEqual([]);
  });
});

describe('an ingest that is stopped', () => {
  /** Large enough to be met at work. */
  const slow = () => raster({ width: 1500, height: 1200, bandNames: ['Blue', 'Green', 'Red'] });
  const cancel = (id: string, user = team.lead) => send(test, user, { method: 'post', path: `/scenes/${id}/cancel` });

  it('fails as cancelled, under way or still waiting, and leaves no files', async () => {
    const running = (await upload([{ path: await slow() }])).body;
    const waiting = (await upload([{ path: await raster() }])).body;
    const jobs = test.app.db.getRepository(Job);
    await expect.poll(async () => (await jobs.findOneByOrFail({ sceneId: running.id })).state, PATIENT).toBe('running');
    for (const { id } of [waiting, running]) {
      const { status, body } = await cancel(id);
      expect(status).toBe(200);
      expect(body).toMatchObject({ state: 'failed', failure: { code: 'cancelled' } });
    }
    await expect
      .poll(async () => (await jobs.findOneByOrFail({ sceneId: running.id })).state, PATIENT)
      .toBe('cancelled');
    await expect.poll(leftovers, PATIENT).toEqual([]);
    expect(await test.app.files.list('scenes/' + running.id + '/')).toEqual([]);
    await expectTurnedAway(
      test,
      team,
      { method: 'post', path: `/scenes/${running.id}/cancel` },
      { forbidden: ['labeller', 'reviewer'] },
    );
  });

  it('leaves a scene that is ready as it is', async () => {
    const scene = await makeScene(test.app, team.project);
    const { status, body } = await cancel(scene.id);
    expect([status, body.state]).toEqual([200, 'ready']);
  });

  it('starts again from the beginning after its server went down', async () => {
    const { id } = await makeQueuedScene();
    const job = { sceneId: id } as Job;
    const down = new AbortController();
    const stopped = ingestScene(test.app, {
      job,
      signal: down.signal,
      report: (_step, done) => done > 1 && down.abort('shutdown'),
      note: () => undefined,
    });
    await expect(stopped).rejects.toThrow();
    const scenes = test.app.db.getRepository(Scene);
    expect(await scenes.findOneByOrFail({ id })).toMatchObject({ state: 'ingesting', failure: null });
    expect(await test.app.files.list(`scenes/${id}/`)).toEqual([]);

    const again = { job, signal: new AbortController().signal, report: () => undefined, note: () => undefined };
    await ingestScene(test.app, again);
    const scene = await waitForScene(test.app, id);
    expect([scene.state, scene.bands.length]).toEqual(['ready', 6]);
    // Taken up once more, for whatever reason, it finds nothing to do.
    await ingestScene(test.app, again);
    expect((await waitForScene(test.app, id)).bands.map((band) => band.id)).toEqual(scene.bands.map((band) => band.id));
  });

  it('is called failed when the server gave it up', async () => {
    const scene = await makeQueuedScene();
    const jobs = test.app.db.getRepository(Job);
    await jobs.save(
      jobs.create({
        kind: 'ingest',
        projectId: team.project.id,
        sceneId: scene.id,
        runId: null,
        state: 'failed',
        error: 'The server stopped 5 times during this work; it was given up.',
      }),
    );
    const { body } = await send(test, team.lead, { method: 'get', path: `/scenes/${scene.id}` });
    expect(body).toMatchObject({
      state: 'failed',
      failure: { code: 'given-up', found: expect.stringMatching(/5 times/) },
    });
    expect((await send(test, team.lead, { method: 'delete', path: `/scenes/${scene.id}` })).status).toBe(204);
    expect(await leftovers()).toEqual([]);
  });

  /** A scene whose job no runner will take up. */
  async function makeQueuedScene(): Promise<Scene> {
    const scenes = test.app.db.getRepository(Scene);
    const id = randomUUID();
    const key = `incoming/${id}/01`;
    await test.app.files.adopt(key, await raster());
    const files = [{ name: 'scene.tif', bytes: 1, sha256: '', key }];
    return scenes.save(
      scenes.create({ id, projectId: team.project.id, name: 'Spring', state: 'ingesting', failure: null, files }),
    );
  }
});

describe('changing a scene', () => {
  let scene: Scene;
  let path: string;
  beforeEach(async () => {
    scene = await makeScene(test.app, team.project);
    path = `/scenes/${scene.id}`;
  });
  const settings = ({
    id,
    name,
    role,
    centreWavelengthUm,
    gsdMeters,
    scale,
    offset,
    quantity,
  }: Scene['bands'][number]) => ({
    ...{ id, name, role, centreWavelengthUm, gsdMeters, scale, offset, quantity },
  });

  it('saves name, day and band table; a new band table is new content', async () => {
    const before = (await send(test, team.lead, { method: 'get', path })).body;
    const renamed = await send(test, team.modeller, {
      method: 'patch',
      path,
      body: { version: 1, name: 'Spring', acquiredOn: '2026-04-02' },
    });
    expect(renamed.status).toBe(200);
    expect(renamed.body).toMatchObject({ name: 'Spring', acquiredOn: '2026-04-02', version: 2 });
    expect(renamed.body.contentKey).toBe(before.contentKey);
    const band = { ...settings(scene.bands[5]), name: 'Thermal', role: 'thermal', scale: 0.1, quantity: 'kelvin' };
    const { body } = await send(test, team.lead, { method: 'patch', path, body: { version: 2, bands: [band] } });
    expect(body.bands[5]).toMatchObject(band);
    expect(body.bands[4]).toMatchObject(settings(scene.bands[4]));
    expect(body.contentKey).not.toBe(before.contentKey);
  });

  it('tells the second of two people and hands over what stands', async () => {
    await send(test, team.lead, { method: 'patch', path, body: { version: 1, name: 'Spring' } });
    const late = await send(test, team.modeller, { method: 'patch', path, body: { version: 1, name: 'Summer' } });
    expect(late.status).toBe(409);
    expect(late.body).toMatchObject({ code: 'stale-version', current: { name: 'Spring', version: 2 } });
  });

  it('refuses bands of another scene, a band twice, and a scale of 0', async () => {
    const other = await makeScene(test.app, team.project);
    const [band] = scene.bands.map(settings);
    const patch = (bands: object[]) => send(test, team.lead, { method: 'patch', path, body: { version: 1, bands } });
    const foreign = await patch([settings(other.bands[0])]);
    expect([foreign.status, foreign.body.errors[0].path]).toEqual([400, 'bands.0.id']);
    const twice = await patch([band, band]);
    expect([twice.status, twice.body.errors[0].path]).toEqual([400, 'bands.1.id']);
    const zero = await patch([{ ...band, scale: 0 }]);
    expect([zero.status, zero.body.errors[0].path]).toEqual([400, 'bands.0.scale']);
  });

  it('is for lead and modeller, and 404 where there is none', async () => {
    const use = { method: 'patch' as const, path, body: { version: 1 } };
    await expectTurnedAway(test, team, use, { forbidden: ['labeller', 'reviewer'] });
    await expectTurnedAway(test, team, { method: 'get', path }, {});
    expect((await send(test, team.lead, { ...use, path: `/scenes/${randomUUID()}` })).status).toBe(404);
  });
});

describe('deleting a scene', () => {
  let scene: Scene;
  let path: string;
  beforeEach(async () => {
    scene = await makeScene(test.app, team.project);
    path = `/scenes/${scene.id}`;
  });

  it('removes its files and the samples that were deleted before', async () => {
    const moor = await makeClass(test.app, team.project);
    const gone = await makeSample(test.app, scene, moor, { column: 2, row: 2 }, { deletedAt: new Date() });
    await expectTurnedAway(test, team, { method: 'delete', path }, { forbidden: ['labeller', 'reviewer'] });
    expect((await send(test, team.modeller, { method: 'delete', path })).status).toBe(204);
    expect((await send(test, team.lead, { method: 'get', path })).status).toBe(404);
    expect(await test.app.files.list(`scenes/${scene.id}/`)).toEqual([]);
    expect(await test.app.db.getRepository(Sample).existsBy({ id: gone.id })).toBe(false);
    expect((await send(test, team.lead, { method: 'get', path: scenesPath })).body.scenes).toEqual([]);
  });

  it('is refused while samples or runs use it, and says how many', async () => {
    const moor = await makeClass(test.app, team.project);
    await makeSample(test.app, scene, moor, { column: 2, row: 2 });
    await makeSample(test.app, scene, moor, { column: 12, row: 2 });
    const jobs = test.app.db.getRepository(Job);
    const job = await jobs.save(
      jobs.create({
        kind: 'run',
        projectId: team.project.id,
        sceneId: null,
        runId: null,
        state: 'finished',
        error: null,
      }),
    );
    const runs = test.app.db.getRepository(Run);
    await runs.save(
      runs.create({
        projectId: team.project.id,
        number: 1,
        name: '',
        note: '',
        sceneId: scene.id,
        recipe: {} as Run['recipe'],
        classes: [],
        studyArea: null,
        warnings: [],
        inputSha256: '',
        jobId: job.id,
        result: null,
      }),
    );
    const refused = await send(test, team.lead, { method: 'delete', path });
    expect(refused.status).toBe(409);
    expect(refused.body).toMatchObject({ code: 'in-use', found: '2 samples and 1 run on this scene' });
    expect((await send(test, team.lead, { method: 'get', path })).body.state).toBe('ready');
  });

  it('stops an ingest under way first', async () => {
    const { body } = await upload([
      { path: await raster({ width: 1500, height: 1200, bandNames: ['Blue', 'Green', 'Red'] }) },
    ]);
    expect((await send(test, team.lead, { method: 'delete', path: `/scenes/${body.id}` })).status).toBe(204);
    await expect.poll(leftovers, PATIENT).toEqual([]);
    expect(await test.app.files.list(`scenes/${body.id}/`)).toEqual([]);
  });
});

/** The tile at zoom 14 that holds the middle of a scene. */
function tilePath(scene: Scene, query = '', z = 14): string {
  const [west, south, east, north] = scene.bounds!;
  const phi = ((south + north) / 2) * (Math.PI / 180);
  const x = Math.floor((((west + east) / 2 + 180) / 360) * 2 ** z);
  const y = Math.floor(((1 - Math.asinh(Math.tan(phi)) / Math.PI) / 2) * 2 ** z);
  return `/scenes/${scene.id}/tiles/${z}/${x}/${y}.webp${query}`;
}

describe('probing a scene', () => {
  it('gives every band’s value, nothing outside, and null where a band has no data', async () => {
    const value = (band: number, column: number) => (band === 1 && column >= 30 ? 0 : 1000 * (band + 1) + column);
    const scene = await makeScene(test.app, team.project, {}, { value, bandNames: ['Blue', 'Green'] });
    const at = async (column: number, row: number) => {
      const [[lon, lat]] = pixelPolygon(scene, [[column, row]]).coordinates[0];
      return send(test, team.reviewer, { method: 'get', path: `/scenes/${scene.id}/probe?lon=${lon}&lat=${lat}` });
    };
    const inside = await at(10.5, 20.5);
    expect(inside.body.pixel).toEqual({ column: 10, row: 20 });
    expect(inside.body.values.map(({ stored }: { stored: number }) => stored)).toEqual([1010, 2010]);
    const gap = await at(40.5, 20.5);
    expect(gap.body.values.map(({ stored, value: scaled }: never) => [stored, scaled])).toEqual([
      [1040, 1040],
      [null, null],
    ]);
    expect((await at(-3, 20)).body).toEqual({ pixel: null, values: [] });
    const path = `/scenes/${scene.id}/probe`;
    expect((await send(test, team.lead, { method: 'get', path: `${path}?lon=200&lat=1` })).status).toBe(400);
    await expectTurnedAway(test, team, { method: 'get', path: `${path}?lon=1&lat=1` }, {});
  });
});

describe('tiles of a scene', () => {
  let scene: Scene;
  beforeAll(async () => {
    team = await makeTeam(test.app);
    const value = (band: number, column: number) => (column < 30 ? 0 : 1000 + band * 100 + column * 10);
    scene = await makeScene(test.app, team.project, {}, { value });
    tilesTeam = team;
  });
  let tilesTeam: Team;
  const get = (path: string) => send(test, tilesTeam.labeller, { method: 'get', path });

  it('are WebP of 256 pixels, transparent where there is no data or no scene', async () => {
    const { status, headers, body } = await get(tilePath(scene));
    expect([status, headers['content-type']]).toEqual([200, 'image/webp']);
    const { default: sharp } = await import('sharp');
    const { data, info } = await sharp(body as Buffer)
      .ensureAlpha()
      .raw()
      .toBuffer({ resolveWithObject: true });
    expect([info.width, info.height]).toEqual([256, 256]);
    let nShown = 0;
    for (let i = 3; i < data.length; i += 4) nShown += data[i] > 0 ? 1 : 0;
    // The scene's eastern half is all there is to see.
    expect(nShown).toBeGreaterThan(1000);
    expect(nShown).toBeLessThan(256 * 256 * 0.75);
    const far = await get(`/scenes/${scene.id}/tiles/3/0/0.webp`);
    expect([far.status, far.headers['content-type']]).toEqual([200, 'image/webp']);
    const empty = await sharp(far.body as Buffer)
      .ensureAlpha()
      .raw()
      .toBuffer();
    expect(empty.length).toBe(256 * 256 * 4);
    expect(empty.every((channel, i) => i % 4 !== 3 || channel === 0)).toBe(true);
  });

  it('are kept for good under their content key, and asked about otherwise', async () => {
    const { body } = await get(`/scenes/${scene.id}`);
    const kept = await get(tilePath(scene, `?v=${body.contentKey}`));
    expect(kept.headers['cache-control']).toBe('private, max-age=31536000, immutable');
    const asked = await get(tilePath(scene, '?v=older'));
    expect(asked.headers['cache-control']).toBe('private, no-cache');
    expect(asked.headers['etag']).toBe(kept.headers['etag']);
    const agent = await browserOf(test, tilesTeam.labeller);
    const again = await agent.get(`/api/v1${tilePath(scene)}`).set('If-None-Match', kept.headers['etag']);
    expect([again.status, again.text]).toEqual([304, '']);
    const other = await get(tilePath(scene, '?bands=4,3,2'));
    expect(other.headers['etag']).not.toBe(kept.headers['etag']);
  });

  it('show the bands, stretch and gamma asked for', async () => {
    const one = await get(tilePath(scene, '?bands=4&stretch=1000:2000&gamma=1.5'));
    const three = await get(tilePath(scene, '?bands=4,3,2&stretch=1000:2000,1000:2000,1000:2000'));
    expect([one.status, three.status]).toEqual([200, 200]);
    expect(Buffer.compare(one.body as Buffer, three.body as Buffer)).not.toBe(0);
  });

  it.each([
    ['?bands=9', 'bands'],
    ['?bands=1,2', 'bands'],
    ['?stretch=1:2', 'stretch'],
    ['?bands=1&stretch=low:high', 'stretch'],
    ['?gamma=0', 'gamma'],
  ])('refuse %s', async (query, path) => {
    const { status, body } = await get(tilePath(scene, query));
    expect([status, body.errors[0].path]).toEqual([400, path]);
  });

  it('do not exist beyond the map, for strangers, or before the scene is ready', async () => {
    for (const address of ['2/4/0', '2/0/4', '25/0/0', 'a/b/c']) {
      expect((await get(`/scenes/${scene.id}/tiles/${address}.webp`)).status, address).toBe(404);
    }
    await expectTurnedAway(test, tilesTeam, { method: 'get', path: tilePath(scene) }, {});
    const scenes = test.app.db.getRepository(Scene);
    const { projectId } = scene;
    const failed = await scenes.save(
      scenes.create({ projectId, name: 'Failed', state: 'failed', failure: null, files: [] }),
    );
    const early = await get(`/scenes/${failed.id}/tiles/3/0/0.webp`);
    expect([early.status, early.body.code]).toEqual([409, 'not-ready']);
  });
});
