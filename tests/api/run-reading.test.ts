import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Run, RunVotes } from '../../shared/contracts/run.ts';
import type { RunComparison } from '../../shared/contracts/run-comparison.ts';
import { Run as RunEntity } from '../../server/entities/run.ts';
import { readLayerWindow } from '../../server/services/run-layers.ts';
import { makeTeam, type Team } from '../factories/make-project.ts';
import { makeRunGround, type RunGround } from '../factories/make-run-ground.ts';
import { readBytes } from '../factories/read-bytes.ts';
import { makeScene } from '../factories/make-scene.ts';
import { openTestApp, type Agent, type TestApp } from '../factories/test-app.ts';
import { waitForRun } from '../factories/wait-for-run.ts';

let test: TestApp;
let team: Team;
let ground: RunGround;
let modeller: Agent;
let first: Run;

async function map(recipe: unknown): Promise<Run> {
  const { body } = await modeller.post(`/api/v1/projects/${team.project.id}/runs`).send({ recipe }).expect(201);
  return waitForRun(modeller, (body as Run).id);
}

beforeAll(async () => {
  test = await openTestApp();
  team = await makeTeam(test.app);
  ground = await makeRunGround(test.app, team.project);
  modeller = await test.signedIn(team.modeller);
  first = await map(ground.recipe);
}, 60_000);
afterAll(() => test.close());

describe('how sure a map is', () => {
  it('has layers that agree with each other and with the map', async () => {
    expect(first.layers).toEqual(['confidence', 'margin']);
    const row = await test.app.db
      .getRepository(RunEntity)
      .findOneOrFail({ where: { id: first.id }, relations: { scene: true, job: true } });
    const window = { x: 0, y: 0, width: 96, height: 96 };
    const confidence = await readLayerWindow(test.app, row, 'confidence', window);
    const margin = await readLayerWindow(test.app, row, 'margin', window);
    const mapped = first.areas!.filter(({ classId }) => classId).reduce((sum, { pixels }) => sum + pixels, 0);
    expect(confidence.filter((percent) => percent <= 100)).toHaveLength(mapped);
    expect(margin.every((percent, i) => (percent === 255) === (confidence[i] === 255))).toBe(true);
    expect(margin.every((percent, i) => percent <= confidence[i]!)).toBe(true);
    // Two covers overlap, so the map is sure of some pixels only.
    expect(new Set(confidence).size).toBeGreaterThan(3);
  });

  it('tells the votes of a pixel, which are those of the map', async () => {
    const [west, south, east, north] = first.bounds!;
    const place = `lon=${(west + east) / 2}&lat=${(south + north) / 2}`;
    const { body } = await modeller.get(`/api/v1/runs/${first.id}/votes?${place}`).expect(200);
    const votes = body as RunVotes;
    expect(votes.kind).toBe('votes');
    expect(votes.shares.reduce((sum, { share }) => sum + share, 0)).toBeCloseTo(1, 5);
    expect(votes.margin).toBeCloseTo(votes.shares[0]!.share - votes.shares[1]!.share, 6);
    const [winner] = votes.shares.map(({ classId }) => first.classes.find(({ id }) => id === classId));
    expect(votes.code).toBe(winner?.code);
    const far = await modeller.get(`/api/v1/runs/${first.id}/votes?lon=0&lat=0`).expect(200);
    expect(far.body).toMatchObject({ code: null, shares: [], confidence: null });
  });

  it('gives the layers as tiles and as a GeoTIFF, and refuses one that is none', async () => {
    const tiff = await readBytes(modeller, `/api/v1/runs/${first.id}/layers/margin.tif`);
    expect(tiff.subarray(0, 2).toString()).toBe('II');
    await modeller.get(`/api/v1/runs/${first.id}/layers/confidence/tiles/4/7/4.webp`).expect(200);
    await modeller.get(`/api/v1/runs/${first.id}/layers/other.tif`).expect(404);
  });
});

describe('two runs compared', () => {
  let second: Run;
  beforeAll(async () => {
    second = await map({ ...ground.recipe, classifier: { kind: 'minimum-distance', metric: 'euclidean' } });
  }, 60_000);
  const compare = (agent: Agent, one: string, other: string) =>
    agent.get(`/api/v1/projects/${team.project.id}/run-comparison?first=${one}&second=${other}`);

  it('counts what became what, in sum the areas of either map', async () => {
    const { body } = await compare(modeller, first.id, second.id).expect(200);
    const { transitions, isOneScene, agreeingShare } = body as RunComparison;
    expect(isOneScene).toBe(true);
    for (const { classId, pixels, areaHa } of first.areas!.filter((area) => area.classId)) {
      const from = transitions.filter(({ fromClassId }) => fromClassId === classId);
      expect(from.reduce((sum, one) => sum + one.pixels, 0)).toBe(pixels);
      expect(from.reduce((sum, one) => sum + one.areaHa, 0)).toBeCloseTo(areaHa, 6);
    }
    for (const { classId, pixels } of second.areas!.filter((area) => area.classId)) {
      const to = transitions.filter(({ toClassId }) => toClassId === classId);
      expect(to.reduce((sum, one) => sum + one.pixels, 0)).toBe(pixels);
    }
    expect(transitions.some(({ fromClassId, toClassId }) => fromClassId !== toClassId)).toBe(true);
    expect(agreeingShare).toBeGreaterThan(0.5);
    expect(agreeingShare).toBeLessThan(1);
  });

  it('tests both on the samples they held out, whose counts are those of each run’s accuracy', async () => {
    const { body } = await compare(modeller, first.id, second.id).expect(200);
    const { heldOut, cautions } = body as RunComparison;
    const { byPixel, byPolygon, polygons } = heldOut!;
    expect(polygons).toBe(9);
    expect(byPixel.n).toBe(9 * 36);
    expect((byPixel.bothRight + byPixel.onlyFirstRight) / byPixel.n).toBeCloseTo(first.overallAccuracy!, 9);
    expect((byPixel.bothRight + byPixel.onlySecondRight) / byPixel.n).toBeCloseTo(second.overallAccuracy!, 9);
    const { onlyFirstRight: b, onlySecondRight: c } = byPixel;
    // McNemar 1947: (b − c)² / (b + c).
    expect(byPixel.chiSquare).toBeCloseTo((b - c) ** 2 / (b + c), 9);
    expect(byPolygon.n).toBe(9);
    expect(cautions.join(' ')).toMatch(/Olofsson et al\. 2014.*alike/);
  });

  it('refuses a run with itself, maps of different pixels, and those who may not read accuracy', async () => {
    await compare(modeller, first.id, first.id).expect(400);
    const spec = { width: 120, height: 96, bandNames: ['Red'], value: () => 1 };
    const elsewhere = await makeScene(test.app, team.project, {}, spec);
    const third = await map({ ...ground.recipe, seed: 2 });
    await test.app.db.getRepository(RunEntity).update({ id: third.id }, { sceneId: elsewhere.id });
    const { body } = await compare(modeller, first.id, third.id).expect(400);
    expect((body as { title: string }).title).toMatch(/different pixels/);
    await compare(await test.signedIn(team.labeller), first.id, second.id).expect(403);
    await compare(modeller, first.id, '00000000-0000-4000-8000-000000000000').expect(404);
  }, 60_000);
});
