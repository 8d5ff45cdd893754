import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { LandClass } from '../../server/entities/land-class.ts';
import type { Scene } from '../../server/entities/scene.ts';
import { grownRegionSchema } from '../../shared/contracts/sample.ts';
import { drawingJudgementSchema, signatureSetSchema } from '../../shared/contracts/signature.ts';
import { send } from '../factories/expect-authority.ts';
import { makeTeam, type Team } from '../factories/make-project.ts';
import { makeRunGround, type RunGround } from '../factories/make-run-ground.ts';
import { makeSample, pixelRectangle } from '../factories/make-sample.ts';
import { makeScene } from '../factories/make-scene.ts';
import { openTestApp, type TestApp } from '../factories/test-app.ts';
import { waitForRun } from '../factories/wait-for-run.ts';
import { startRun } from '../../server/services/runs.ts';

let test: TestApp;
let team: Team;
let ground: RunGround;
let scene: Scene;
let water: LandClass;
let heath: LandClass;

beforeAll(async () => {
  test = await openTestApp();
  team = await makeTeam(test.app);
  ground = await makeRunGround(test.app, team.project);
  scene = ground.scene;
  [water, heath] = ground.classes as [LandClass, LandClass];
});
afterAll(() => test.close());

const base = () => `/projects/${team.project.id}`;

async function readSignatures(query = '') {
  const answer = await send(test, team.labeller, { method: 'get', path: `${base()}/signatures/${scene.id}${query}` });
  expect(answer.status).toBe(200);
  return signatureSetSchema.parse(answer.body);
}

async function judge(place: [number, number, number, number], classId: string, sampleId?: string) {
  const geometry = pixelRectangle(scene, ...place);
  const body = { sceneId: scene.id, classId, geometry, ...(sampleId ? { sampleId } : {}) };
  const answer = await send(test, team.labeller, { method: 'post', path: `${base()}/samples/judge`, body });
  expect(answer.status).toBe(200);
  return drawingJudgementSchema.parse(answer.body);
}

describe('signatures of the classes', () => {
  it('counts samples and pixels, and has a mean near the cover’s own value', async () => {
    const { classes, nSamples, features, points, histograms } = await readSignatures();
    expect(nSamples).toBe(24);
    expect(classes.map(({ nPixels }) => nPixels)).toEqual([8 * 36 - 30, 8 * 36, 8 * 36]);
    // The scene's corner is without data: 30 pixels of the first sample.
    const { scale, offset } = scene.bands[0]!;
    // The made covers: 600 and up to 419 of speckle in the first band.
    expect(classes[0]!.mean[0]).toBeGreaterThan(600 * scale + offset);
    expect(classes[0]!.mean[0]).toBeLessThan(1020 * scale + offset);
    expect(features.filter(({ kind }) => kind === 'band')).toHaveLength(4);
    expect(points.values).toHaveLength(features.length);
    expect(points.classIndex).toHaveLength(points.values[0]!.length);
    const binned = histograms[0]!.counts.flat().reduce((sum, count) => sum + count, 0);
    expect(binned).toBe(24 * 36 - 30);
  });

  it('finds the pair that overlaps and says what would help', async () => {
    const { pairs, risks, classes } = await readSignatures();
    expect(pairs).toHaveLength(3);
    const worst = pairs[risks[0]!.pair]!;
    expect([classes[worst.first]!.name, classes[worst.second]!.name]).toEqual(['Heath & moor', '=Arable']);
    expect(worst.jeffriesMatusita! ** 2).toBeCloseTo(worst.jeffriesMatusitaSquared!, 9);
    expect(worst.errorBound).toBeCloseTo(Math.exp(-worst.bhattacharyya!) / 2, 12);
    expect(risks[0]!.advice).toContain('tells them apart best');
  });

  it('compares over the bands asked for, and refuses others', async () => {
    const all = await readSignatures();
    const one = await readSignatures('?bands=2');
    expect(one.bands).toEqual([2]);
    expect(one.pairs[0]!.bhattacharyya).toBeLessThan(all.pairs[0]!.bhattacharyya!);
    const refused = await send(test, team.labeller, {
      method: 'get',
      path: `${base()}/signatures/${scene.id}?bands=9`,
    });
    expect(refused.status).toBe(400);
    expect(refused.body.wanted).toContain('1, 2, 3, 4');
  });

  it('says what a class without samples lacks, and leaves out what lies outside the scene', async () => {
    const other = await makeTeam(test.app);
    const small = await makeRunGround(test.app, other.project, { polygonsPerClass: 1 });
    const elsewhere = await makeScene(test.app, other.project, {}, { width: 20, height: 20, originX: 700_000 });
    const path = `/projects/${other.project.id}/signatures`;
    const here = await send(test, other.lead, { method: 'get', path: `${path}/${small.scene.id}` });
    expect(signatureSetSchema.parse(here.body).classes[0]!.remarks.join(' ')).toContain('Few samples: 1 of 10');
    const there = signatureSetSchema.parse(
      (await send(test, other.lead, { method: 'get', path: `${path}/${elsewhere.id}` })).body,
    );
    expect(there.nSamples).toBe(0);
    expect(there.nOutside).toBe(3);
    expect(there.classes[0]!.mean[0]).toBeNull();
    expect(there.pairs[0]!.reason).toContain('has 0 pixels');
  });

  it('refuses a scene of another project', async () => {
    const other = await makeTeam(test.app);
    const path = `/projects/${other.project.id}/signatures/${scene.id}`;
    expect((await send(test, other.lead, { method: 'get', path })).status).toBe(400);
  });
});

describe('judging a drawing', () => {
  it('finds a drawing of the right cover usual and one of another cover unusual', async () => {
    const usual = await judge([20, 40, 5, 5], water.id);
    expect(usual.typicality!.pValue).toBeGreaterThan(0.01);
    expect(usual.rivals[0]).toMatchObject({ classId: water.id, isOwn: true, nSamples: 8 });
    const wrong = await judge([40, 43, 5, 5], water.id);
    expect(wrong.typicality!.pValue).toBeLessThan(0.01);
    expect(wrong.warnings.join(' ')).toContain('than Open water');
  });

  it('does not hold a sample against itself', async () => {
    const sample = ground.samples[0]!;
    const { column, row } = ground.places.get(sample.id)!;
    const whole = await judge([column, row, 6, 6], water.id);
    const itself = await judge([column, row, 6, 6], water.id, sample.id);
    expect(whole.typicality!.nSamples).toBe(8);
    expect(itself.typicality!.nSamples).toBe(7);
    expect(itself.typicality!.distance).toBeGreaterThan(whole.typicality!.distance);
  });

  it('warns of a sample that holds two covers', async () => {
    const { mixing, warnings } = await judge([29, 40, 6, 6], water.id);
    expect(mixing!.isMixed).toBe(true);
    expect(warnings.join(' ')).toContain('two covers');
  });

  it('counts the pixels shared with samples of another class', async () => {
    const sample = await makeSample(test.app, scene, heath, { column: 50, row: 86, width: 4, height: 4 });
    const { overlaps } = await judge([52, 88, 6, 6], water.id);
    expect(overlaps).toEqual([{ sampleId: sample.id, number: sample.number, classId: heath.id, pixels: 4 }]);
    expect((await judge([52, 88, 6, 6], heath.id)).overlaps).toEqual([]);
  });

  it('tells how near a held-out sample of the latest run is', async () => {
    expect((await judge([20, 40, 5, 5], water.id)).heldOut).toBeNull();
    const run = await startRun(test.app, team.project, team.lead.id, { name: '', note: '', recipe: ground.recipe });
    await waitForRun(await test.signedIn(team.lead), run.id);
    const heldOut = await test.app.db.query(
      `SELECT sampleId, sampleNumber FROM run_samples WHERE runId = ? AND part = 'held-out' ORDER BY sampleNumber LIMIT 1`,
      [run.id],
    );
    const { column, row } = ground.places.get(heldOut[0].sampleId)!;
    const near = await judge([column + 8, row, 3, 3], water.id);
    expect(near.heldOut).toEqual({
      ...{ runNumber: run.number, sampleNumber: heldOut[0].sampleNumber, isItself: false },
      distanceMeters: 3 * Math.abs(scene.pixelWidth!),
    });
    expect((await judge([column, row, 6, 6], water.id, heldOut[0].sampleId)).heldOut).toMatchObject({ isItself: true });
  });

  it('answers a drawing without pixels, and refuses a class of another project', async () => {
    const nothing = await judge([2, 2, 3, 3], water.id);
    expect(nothing.noTypicality).toContain('no pixel with data');
    const body = { sceneId: scene.id, classId: team.project.id, geometry: pixelRectangle(scene, 20, 20, 3, 3) };
    const answer = await send(test, team.labeller, { method: 'post', path: `${base()}/samples/judge`, body });
    expect(answer.status).toBe(400);
  });
});

describe('growing from a pixel', () => {
  const grow = async (column: number, row: number, distance: number) => {
    const [ring] = pixelRectangle(scene, column, row, 1, 1).coordinates;
    const [lon, lat] = [(ring![0]![0] + ring![2]![0]) / 2, (ring![0]![1] + ring![2]![1]) / 2];
    const body = { sceneId: scene.id, lon, lat, distance };
    const answer = await send(test, team.labeller, { method: 'post', path: `${base()}/samples/grow`, body });
    expect(answer.status).toBe(200);
    return grownRegionSchema.parse(answer.body);
  };

  it('gives an outline that can be stored as a sample and holds just the pixels counted', async () => {
    const { geometry, pixelCount } = await grow(20, 60, 0.6);
    expect(pixelCount).toBeGreaterThan(50);
    const body = { sceneId: scene.id, geometry };
    const measured = await send(test, team.labeller, { method: 'post', path: `${base()}/samples/measure`, body });
    expect(measured.body).toMatchObject({ refusal: null, pixelCount });
  });

  it('grows with the distance, and stays in its cover at a small one', async () => {
    const [small, large] = [await grow(20, 60, 0.3), await grow(20, 60, 0.9)];
    expect(small.pixelCount).toBeLessThan(large.pixelCount);
    // The first cover ends at column 32, and its neighbour is far off in value.
    const east = Math.max(...large.geometry!.coordinates[0]!.map(([lon]) => lon));
    expect(east).toBeLessThan(pixelRectangle(scene, 33, 60, 1, 1).coordinates[0]![2]![0]);
  });

  it('says why there is nothing to grow', async () => {
    expect(await grow(3, 3, 1)).toMatchObject({ geometry: null, remark: expect.stringContaining('no data') as string });
    const body = { sceneId: scene.id, lon: 100, lat: 10, distance: 1 };
    const outside = await send(test, team.labeller, { method: 'post', path: `${base()}/samples/grow`, body });
    expect(outside.body.remark).toContain('outside the scene');
    const wrong = { ...body, distance: -1 };
    expect(
      (await send(test, team.labeller, { method: 'post', path: `${base()}/samples/grow`, body: wrong })).status,
    ).toBe(400);
  });
});
