import { execFile } from 'node:child_process';
import { createHash } from 'node:crypto';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { MAP_CAUTIONS } from '../../shared/constants/cautions.ts';
import type { Run } from '../../shared/contracts/run.ts';
import { Project } from '../../server/entities/project.ts';
import { Run as RunEntity } from '../../server/entities/run.ts';
import { Sample } from '../../server/entities/sample.ts';
import { makeClass } from '../factories/make-class.ts';
import { makeTeam, type Team } from '../factories/make-project.ts';
import { makeRunGround, type RunGround } from '../factories/make-run-ground.ts';
import { makeSample, pixelRectangle } from '../factories/make-sample.ts';
import { readBytes } from '../factories/read-bytes.ts';
import { openTestApp, type Agent, type TestApp } from '../factories/test-app.ts';
import { waitForRun } from '../factories/wait-for-run.ts';

const run = promisify(execFile);
const NOWHERE = '00000000-0000-4000-8000-000000000000';

let test: TestApp;
let team: Team;
let ground: RunGround;
let modeller: Agent;
let finished: Run;

function start(agent: Agent, recipe: unknown, name = '') {
  return agent.post(`/api/v1/projects/${team.project.id}/runs`).send({ name, recipe });
}

async function inFolder<T>(work: (dir: string) => Promise<T>): Promise<T> {
  const dir = await mkdtemp(join(tmpdir(), 'groundsel-runs-'));
  try {
    return await work(dir);
  } finally {
    await rm(dir, { recursive: true, force: true });
  }
}

beforeAll(async () => {
  test = await openTestApp();
  team = await makeTeam(test.app);
  ground = await makeRunGround(test.app, team.project);
  modeller = await test.signedIn(team.modeller);
  const { body } = await start(modeller, ground.recipe, 'First – try').expect(201);
  finished = await waitForRun(modeller, (body as Run).id);
});

afterAll(() => test.close());

describe('a run', () => {
  it('finishes with a class map, areas and notes', () => {
    expect(finished.job).toMatchObject({ state: 'finished', share: 1, error: null });
    expect(finished.number).toBe(1);
    expect(finished.classMapSha256).toMatch(/^[0-9a-f]{64}$/);
    expect(finished.areas?.map(({ code }) => code)).toEqual([3, 7, 21, 255]);
    expect(finished.areas?.reduce((sum, { pixels }) => sum + pixels, 0)).toBe(96 * 96);
    // The corner without data; a pixel of 30 m is 0.09 ha.
    const nodata = finished.areas?.[3];
    expect(nodata).toMatchObject({ classId: null, pixels: 64 });
    for (const { pixels, areaHa } of finished.areas ?? []) expect(areaHa).toBeCloseTo(pixels * 0.09, 9);
    expect(finished.notes.join(' ')).toMatch(/stored values/);
    expect(finished.notes.join(' ')).toMatch(/at most 120 a class: Open water \(120 of/);
  });

  it('holds out whole polygons and learns from the others alone', () => {
    // Eight polygons a class, 40 % held out: three, and five to learn from.
    expect(finished).toMatchObject({ heldOutPolygons: 9, trainingPolygons: 15, trainingPixels: 360 });
  });

  it('shows nobody accuracy who may not read it', async () => {
    const labeller = await test.signedIn(team.labeller);
    const { body } = await labeller.get(`/api/v1/runs/${finished.id}`).expect(200);
    expect(body).toMatchObject({ overallAccuracy: null, abilities: { cancel: false, delete: false } });
    expect(finished.overallAccuracy).toBeGreaterThan(0.6);
    expect(finished.abilities).toEqual({ cancel: false, delete: true, prioritise: false, retry: false });
  });

  it('leaves no work files behind', async () => {
    const keys = await test.app.files.list(`runs/${finished.id}/`);
    expect(keys.map((key) => key.split('/').pop())).toEqual([
      'class-map.tif',
      'class-map.tif.aux.xml',
      'confidence.tif',
      'margin.tif',
      'model.bin',
    ]);
  });

  it('gives the same bytes again from the same recipe', async () => {
    const { body } = await start(modeller, ground.recipe, 'Again').expect(201);
    const again = await waitForRun(modeller, (body as Run).id);
    expect(again.number).toBeGreaterThan(finished.number);
    expect(again.inputSha256).toBe(finished.inputSha256);
    expect(again.classMapSha256).toBe(finished.classMapSha256);
    const path = (id: string) => `/api/v1/runs/${id}/class-map.tif`;
    expect(await readBytes(modeller, path(again.id))).toEqual(await readBytes(modeller, path(finished.id)));
  });

  it('gives another map from another seed', async () => {
    const { body } = await start(modeller, { ...ground.recipe, seed: 8 }).expect(201);
    const other = await waitForRun(modeller, (body as Run).id);
    expect(other.job.state).toBe('finished');
    expect(other.classMapSha256).not.toBe(finished.classMapSha256);
  });

  it.each([
    { kind: 'random-subspace-forest', trees: 10, maxDepth: 12, minLeaf: 2, featuresPerTree: 2 },
    { kind: 'nearest-neighbours', neighbours: 5 },
    { kind: 'nearest-neighbours', neighbours: 3, standardise: false },
    { kind: 'random-forest', trees: 10, classWeights: 'balanced' },
    { kind: 'gaussian-maximum-likelihood' },
    { kind: 'gaussian-maximum-likelihood', priors: 'training', ridge: 0.05 },
    { kind: 'minimum-distance' },
    { kind: 'minimum-distance', metric: 'euclidean' },
  ])('works with $kind', async (classifier) => {
    const { body } = await start(modeller, { ...ground.recipe, classifier }).expect(201);
    const other = await waitForRun(modeller, (body as Run).id);
    expect(other.job).toMatchObject({ state: 'finished', error: null });
    // Open water is apart from the others in every band, so any classifier finds its third of the scene.
    expect(other.areas?.[0]?.pixels).toBeGreaterThan(2900);
    expect(other.overallAccuracy).toBeGreaterThan(0.6);
  });

  it('leaves pixels unclassified whose class has too small a share, and says how many', async () => {
    const { body } = await start(modeller, { ...ground.recipe, minShare: 0.8 }).expect(201);
    const cautious = await waitForRun(modeller, (body as Run).id);
    expect(cautious.job).toMatchObject({ state: 'finished', error: null });
    const left = cautious.areas?.find(({ code }) => code === 0);
    expect(left).toMatchObject({ classId: null, name: 'Unclassified' });
    expect(left?.pixels).toBeGreaterThan(100);
    expect(cautious.notes.join(' ')).toContain(`${left?.pixels} pixels are left unclassified`);
    expect(cautious.areas?.reduce((sum, { pixels }) => sum + pixels, 0)).toBe(96 * 96);
    // No class gains a pixel, and where the votes are clear nothing changes.
    for (const [i, { code, pixels }] of (finished.areas ?? []).slice(0, 3).entries()) {
      expect(cautious.areas?.[i]?.code).toBe(code);
      expect(cautious.areas?.[i]?.pixels).toBeLessThanOrEqual(pixels);
    }
    await start(modeller, { ...ground.recipe, minShare: 1.2 }).expect(400);
  });

  it('fails with the name of the class whose covariance is singular, and not with a ridge', async () => {
    const other = await makeTeam(test.app);
    const doubled = await makeRunGround(test.app, other.project, { isFirstBandDoubled: true });
    const agent = await test.signedIn(other.modeller);
    const run = async (classifier: object) => {
      const recipe = { ...doubled.recipe, classifier: { kind: 'gaussian-maximum-likelihood', ...classifier } };
      const { body } = await agent.post(`/api/v1/projects/${other.project.id}/runs`).send({ recipe }).expect(201);
      return waitForRun(agent, (body as Run).id);
    };
    const failed = await run({});
    expect(failed.job.state).toBe('failed');
    expect(failed.job.error).toMatch(/Class “Open water” has a singular covariance.*set a ridge/);
    expect((await run({ ridge: 0.01 })).job).toMatchObject({ state: 'finished', error: null });
  });

  it('lists runs, newest first', async () => {
    const { body } = await modeller.get(`/api/v1/projects/${team.project.id}/runs`).expect(200);
    const numbers = (body.runs as Run[]).map(({ number }) => number);
    expect(numbers).toEqual([...numbers].sort((a, b) => b - a));
    expect(numbers.at(-1)).toBe(1);
  });
});

describe('downloads', () => {
  it('gives a GeoTIFF that GDAL reads with reference system, place, nodata, colours and names', async () => {
    const tif = await readBytes(modeller, `/api/v1/runs/${finished.id}/class-map.tif`);
    await inFolder(async (dir) => {
      await writeFile(join(dir, 'map.tif'), tif);
      const { stdout } = await run('gdalinfo', ['-json', join(dir, 'map.tif')]);
      const info = JSON.parse(stdout);
      expect(info.size).toEqual([96, 96]);
      expect(info.geoTransform).toEqual([500_000, 30, 0, 6_700_000, 0, -30]);
      expect(info.coordinateSystem.wkt).toContain('ID["EPSG",32628]');
      const [band] = info.bands;
      expect(band).toMatchObject({ type: 'Byte', noDataValue: 255, colorInterpretation: 'Palette' });
      expect(band.colorTable.entries[3]).toEqual([0x22, 0x66, 0xaa, 255]);
      expect(band.colorTable.entries[21]).toEqual([0xcc, 0xbb, 0x44, 255]);
      expect(band.metadata['']).toMatchObject({ CLASS_3: 'Open water', CLASS_7: 'Heath & moor', CLASS_21: '=Arable' });
      await run('gdal_translate', ['-q', '-of', 'ENVI', join(dir, 'map.tif'), join(dir, 'raw')]);
      const raw = await readFile(join(dir, 'raw'));
      expect(createHash('sha256').update(raw).digest('hex')).toBe(finished.classMapSha256);
      for (const { code, pixels } of finished.areas ?? []) {
        expect(raw.filter((value) => value === code)).toHaveLength(pixels);
      }
    });
  });

  it('names the file in plain letters', async () => {
    const { headers } = await modeller.get(`/api/v1/runs/${finished.id}/class-map.tif`).expect(200);
    expect(headers['content-disposition']).toBe('attachment; filename=run-1-first-try-class-map.tif');
    expect(headers['content-type']).toBe('image/tiff');
  });

  it('packs map, names, areas and cautions into a zip', async () => {
    const zip = await readBytes(modeller, `/api/v1/runs/${finished.id}/class-map.zip`);
    await inFolder(async (dir) => {
      await writeFile(join(dir, 'map.zip'), zip);
      await run('/usr/bin/python3', ['-m', 'zipfile', '-e', join(dir, 'map.zip'), join(dir, 'out')]);
      const { stdout } = await run('gdalinfo', ['-json', join(dir, 'out/class-map.tif')]);
      const categories = JSON.parse(stdout).bands[0].category as string[] | undefined;
      expect(await readFile(join(dir, 'out/class-map.tif.aux.xml'), 'utf8')).toContain('<Category>Heath &amp; moor');
      if (categories) expect(categories[21]).toBe('=Arable');
      const csv = (await readFile(join(dir, 'out/classes.csv'), 'utf8')).split('\n');
      expect(csv[0]).toBe('code,name,colour,pixels,area_ha');
      // A name that a spreadsheet would take as a formula is made harmless.
      expect(csv[3]).toContain("'=Arable");
      const readme = await readFile(join(dir, 'out/README.txt'), 'utf8');
      for (const caution of MAP_CAUTIONS) expect(readme).toContain(caution);
      expect(readme).toContain(finished.classMapSha256);
      expect(readme).toContain('"seed": 7');
    });
  });

  it('draws tiles in class colours and answers 304 to a browser that has them', async () => {
    const [west, south, east, north] = finished.bounds!;
    const z = 11;
    const x = Math.floor((((west + east) / 2 + 180) / 360) * 2 ** z);
    const lat = (((south + north) / 2) * Math.PI) / 180;
    const y = Math.floor(((1 - Math.asinh(Math.tan(lat)) / Math.PI) / 2) * 2 ** z);
    const path = `/api/v1/runs/${finished.id}/tiles/${z}/${x}/${y}.webp?v=${finished.classMapSha256}`;
    const tile = await readBytes(modeller, path);
    const { default: sharp } = await import('sharp');
    const { data } = await sharp(tile).ensureAlpha().raw().toBuffer({ resolveWithObject: true });
    const colours = new Set<string>();
    for (let i = 0; i < data.length; i += 4) if (data[i + 3]) colours.add(data.subarray(i, i + 3).toString('hex'));
    expect([...colours].sort()).toEqual(['2266aa', 'aa66cc', 'ccbb44']);
    const { headers } = await modeller.get(path).expect(200);
    expect(headers['cache-control']).toContain('immutable');
    await modeller.get(path).set('If-None-Match', headers['etag']!).expect(304);
    await modeller.get(`/api/v1/runs/${finished.id}/tiles/1/5/0.webp`).expect(404);
  });

  it('tells the class at a position, and nothing where nothing is mapped', async () => {
    const at = (column: number, row: number) => {
      const [lon, lat] = pixelRectangle(ground.scene, column, row, 1, 1).coordinates[0]![0]!;
      return `/api/v1/runs/${finished.id}/probe?lon=${lon}&lat=${lat}`;
    };
    const water = await modeller.get(at(12, 40)).expect(200);
    expect(water.body).toEqual({ code: 3, name: 'Open water' });
    expect((await modeller.get(at(2, 2)).expect(200)).body).toEqual({ code: null, name: null });
    const away = await modeller.get(`/api/v1/runs/${finished.id}/probe?lon=20&lat=50`).expect(200);
    expect(away.body).toEqual({ code: null, name: null });
    await modeller.get(`/api/v1/runs/${finished.id}/probe?lon=200&lat=50`).expect(400);
  });
});

describe('the check of a recipe', () => {
  const check = (recipe: unknown) =>
    modeller.post(`/api/v1/projects/${team.project.id}/runs/check`).send(recipe as object);

  it('shows how the samples would be split', async () => {
    const { body } = await check(ground.recipe).expect(200);
    expect(body.problems).toEqual([]);
    expect(body.perClass).toHaveLength(3);
    expect(body.perClass[0]).toMatchObject({ name: 'Open water', trainingPolygons: 5, heldOutPolygons: 3 });
  });

  it('refuses bands, classes and scenes of others, and a class with too few samples, each by name', async () => {
    const thin = await makeClass(test.app, team.project, { name: 'Bare rock', code: 50 });
    const recipe = {
      ...ground.recipe,
      bandIds: [...ground.recipe.bandIds, NOWHERE],
      classIds: [...ground.recipe.classIds, thin.id],
    };
    const refused = await start(modeller, recipe).expect(400);
    expect(refused.body).toMatchObject({ code: 'recipe-refused', errors: [{ path: 'recipe.bandIds' }] });

    const few = await start(modeller, { ...recipe, bandIds: ground.recipe.bandIds }).expect(400);
    expect(few.body.errors).toEqual([
      { path: 'recipe.classIds', message: expect.stringContaining('Bare rock has 0 usable samples') },
    ]);
    const nowhere = await start(modeller, { ...ground.recipe, sceneId: NOWHERE }).expect(400);
    expect(nowhere.body.errors[0].path).toBe('recipe.sceneId');
    const twice = await start(modeller, { ...ground.recipe, bandIds: Array(2).fill(ground.recipe.bandIds[0]) });
    expect(twice.status).toBe(400);
    const classifier = { ...ground.recipe.classifier, featuresPerTree: 9 };
    const greedy = await start(modeller, { ...ground.recipe, classifier }).expect(400);
    expect(greedy.body.errors[0].path).toBe('recipe.classifier.featuresPerTree');
  });

  it('refuses a body that is no recipe', async () => {
    const { body } = await start(modeller, { ...ground.recipe, heldOutShare: 1.5 }).expect(400);
    expect(body.errors[0].path).toBe('recipe.heldOutShare');
  });

  it('says which samples lie outside the scene or where it has no data, and warns of few polygons', async () => {
    const made = await makeTeam(test.app);
    const own = await makeRunGround(test.app, made.project, { polygonsPerClass: 3 });
    const away = await makeSample(test.app, own.scene, own.classes[0]!, { column: 500, row: 500 });
    const blank = await makeSample(test.app, own.scene, own.classes[1]!, { column: 1, row: 1 });
    const agent = await test.signedIn(made.modeller);
    const { body } = await agent.post(`/api/v1/projects/${made.project.id}/runs/check`).send(own.recipe).expect(200);
    const texts = (body.problems as { severity: string; text: string }[]).map(
      ({ severity, text }) => `${severity}: ${text}`,
    );
    expect(texts).toHaveLength(4);
    expect(texts[0]).toContain(`samples ${away.number}, ${blank.number}`);
    expect(texts.filter((text) => text.startsWith('warns') && text.includes('only 3 usable'))).toHaveLength(3);
    expect(body.perClass.map((row: { trainingPolygons: number }) => row.trainingPolygons)).toEqual([2, 2, 2]);
  });

  it('uses samples by their review state, and says how many it leaves out', async () => {
    const made = await makeTeam(test.app);
    const own = await makeRunGround(test.app, made.project);
    const agent = await test.signedIn(made.modeller);
    const ask = (recipe: object) => agent.post(`/api/v1/projects/${made.project.id}/runs/check`).send(recipe);
    const [first, second] = own.samples;
    await test.app.db.getRepository(Sample).update({ id: first?.id }, { state: 'returned' });
    await test.app.db.getRepository(Sample).update({ id: second?.id }, { state: 'accepted' });
    const polygons = (rows: { trainingPolygons: number; heldOutPolygons: number }[]) =>
      rows.reduce((sum, row) => sum + row.trainingPolygons + row.heldOutPolygons, 0);

    const usual = await ask({ ...own.recipe, sampleStates: undefined }).expect(200);
    expect(polygons(usual.body.perClass)).toBe(own.samples.length - 1);
    expect(usual.body.problems).toEqual([
      { severity: 'warns', text: 'Samples left out by their review state: 1 returned.' },
    ]);
    const every = await ask({ ...own.recipe, sampleStates: ['draft', 'accepted', 'returned'] }).expect(200);
    expect(polygons(every.body.perClass)).toBe(own.samples.length);
    expect(every.body.problems).toEqual([]);
    const accepted = await ask({ ...own.recipe, sampleStates: ['accepted'] }).expect(200);
    expect(polygons(accepted.body.perClass)).toBe(1);
    expect(accepted.body.problems.some(({ severity }: { severity: string }) => severity === 'stops')).toBe(true);
    await ask({ ...own.recipe, sampleStates: [] }).expect(400);
    await ask({ ...own.recipe, sampleStates: ['finished'] }).expect(400);
  });

  it('shows a recipe from before the choice of review states as it was: with every state', async () => {
    const old = { ...finished.recipe, sampleStates: undefined } as unknown as Run['recipe'];
    const runs = test.app.db.getRepository(RunEntity);
    await runs.update({ id: finished.id }, { recipe: JSON.parse(JSON.stringify(old)) as Run['recipe'] });
    const { body } = await modeller.get(`/api/v1/runs/${finished.id}`).expect(200);
    expect((body as Run).recipe.sampleStates).toEqual(['draft', 'submitted', 'accepted', 'returned']);
    await runs.update({ id: finished.id }, { recipe: finished.recipe });
  });

  it('maps and counts only what is inside the study area', async () => {
    const made = await makeTeam(test.app);
    const own = await makeRunGround(test.app, made.project);
    const studyArea = pixelRectangle(own.scene, 0, 0, 96, 50);
    await test.app.db.getRepository(Project).update({ id: made.project.id }, { studyArea });
    const agent = await test.signedIn(made.modeller);
    const { body } = await agent
      .post(`/api/v1/projects/${made.project.id}/runs`)
      .send({ recipe: own.recipe })
      .expect(201);
    const cut = await waitForRun(agent, (body as Run).id);
    expect(cut.job).toMatchObject({ state: 'finished', error: null });
    expect(cut.areas?.at(-1)).toMatchObject({ code: 255, pixels: 96 * 46 + 64 });
    expect(cut.notes.join(' ')).toContain('in the study area');
  });
});

describe('cancelling and deleting', () => {
  const slow = () => ({
    ...ground.recipe,
    classifier: { kind: 'random-forest', trees: 2000, maxDepth: 25, minLeaf: 1, featuresPerTree: 4 },
  });

  it('stops a working run within two seconds and leaves no file', async () => {
    const { body } = await start(modeller, slow()).expect(201);
    const { id } = body as Run;
    await waitForRun(modeller, id, ({ job }) => job.step === 'Training trees' && job.done > 0);
    await modeller.delete(`/api/v1/runs/${id}`).expect(409);
    const asked = Date.now();
    await modeller.post(`/api/v1/runs/${id}/cancel`).expect(200);
    const ended = await waitForRun(modeller, id);
    expect(Date.now() - asked).toBeLessThan(2000);
    expect(ended.job.state).toBe('cancelled');
    expect(await test.app.files.list(`runs/${id}/`)).toEqual([]);
    const again = await modeller.post(`/api/v1/runs/${id}/cancel`).expect(409);
    expect(again.body.code).toBe('run-ended');
    await modeller.get(`/api/v1/runs/${id}/class-map.tif`).expect(404);
    await modeller.get(`/api/v1/runs/${id}/accuracy`).expect(404);
    await modeller.get(`/api/v1/runs/${id}/tiles/0/0/0.webp`).expect(404);
  });

  it('takes a waiting run out of the queue', async () => {
    const first = (await start(modeller, slow()).expect(201)).body as Run;
    const second = (await start(modeller, ground.recipe).expect(201)).body as Run;
    const { body } = await modeller.post(`/api/v1/runs/${second.id}/cancel`).expect(200);
    expect((body as Run).job.state).toBe('cancelled');
    await modeller.post(`/api/v1/runs/${first.id}/cancel`).expect(200);
    expect((await waitForRun(modeller, first.id)).job.state).toBe('cancelled');
  });

  it('deletes an ended run with its files', async () => {
    const { body } = await start(modeller, ground.recipe).expect(201);
    const { id } = await waitForRun(modeller, (body as Run).id);
    expect(await test.app.files.has(`runs/${id}/class-map.tif`)).toBe(true);
    await modeller.delete(`/api/v1/runs/${id}`).expect(204);
    await modeller.get(`/api/v1/runs/${id}`).expect(404);
    expect(await test.app.files.list(`runs/${id}/`)).toEqual([]);
  });

  it('fails with a clear error when a band file cannot be read', async () => {
    const made = await makeTeam(test.app);
    const own = await makeRunGround(test.app, made.project);
    const agent = await test.signedIn(made.lead);
    await test.app.files.write(own.scene.bands[1]!.fileKey, Buffer.from('no raster'));
    const list = await test.app.files.list(`scenes/${own.scene.id}/`);
    expect(list).toHaveLength(4);
    const res = await agent.post(`/api/v1/projects/${made.project.id}/runs`).send({ recipe: own.recipe });
    expect(res.status).toBe(400);
    expect(res.body).toMatchObject({ code: 'recipe-refused' });
    expect(res.body.errors[0].message).toContain('Green');
  });
});

describe('who may do what', () => {
  const paths = () => ({
    read: [
      `/api/v1/projects/${team.project.id}/runs`,
      `/api/v1/runs/${finished.id}`,
      `/api/v1/runs/${finished.id}/class-map.tif`,
    ],
  });

  it('asks strangers to sign in', async () => {
    for (const path of paths().read) await test.stranger.get(path).expect(401);
    await test.stranger.post(`/api/v1/runs/${finished.id}/cancel`).expect(401);
    await test.stranger.delete(`/api/v1/runs/${finished.id}`).expect(401);
  });

  it('lets labellers and reviewers look but not run', async () => {
    for (const who of [team.labeller, team.reviewer]) {
      const agent = await test.signedIn(who);
      for (const path of paths().read) await agent.get(path).expect(200);
      await start(agent, ground.recipe).expect(403);
      await agent.post(`/api/v1/projects/${team.project.id}/runs/check`).send(ground.recipe).expect(403);
      await agent.post(`/api/v1/runs/${finished.id}/cancel`).expect(403);
      await agent.delete(`/api/v1/runs/${finished.id}`).expect(403);
    }
  });

  it('does not tell clients and outsiders that there is a run', async () => {
    for (const who of [team.client, team.outsider]) {
      const agent = await test.signedIn(who);
      for (const path of paths().read) await agent.get(path).expect(404);
      await agent.delete(`/api/v1/runs/${finished.id}`).expect(404);
    }
    await modeller.get(`/api/v1/runs/${NOWHERE}`).expect(404);
  });
});
