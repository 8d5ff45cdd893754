import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Run, RunVotes } from '../../shared/contracts/run.ts';
import { Run as RunEntity } from '../../server/entities/run.ts';
import { readLayerWindow } from '../../server/services/run-layers.ts';
import { makeTeam, type Team } from '../factories/make-project.ts';
import { makeRunGround, type RunGround } from '../factories/make-run-ground.ts';
import { readBytes } from '../factories/read-bytes.ts';
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
    await modeller.get(`/api/v1/runs/${first.id}/layers/other.tif`).expect(400);
  });
});
