import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { PostProcessingPreview, RunPostProcessing } from '../../shared/contracts/post-processing.ts';
import type { Run } from '../../shared/contracts/run.ts';
import { ReferenceDesign } from '../../server/entities/reference-design.ts';
import { createDesign } from '../../server/services/designs.ts';
import { makeTeam, type Team } from '../factories/make-project.ts';
import { makeRunGround, type RunGround } from '../factories/make-run-ground.ts';
import { openTestApp, type Agent, type TestApp } from '../factories/test-app.ts';
import { waitForRun } from '../factories/wait-for-run.ts';

let test: TestApp;
let team: Team;
let ground: RunGround;
let lead: Agent;
let runId = '';

beforeAll(async () => {
  test = await openTestApp();
  team = await makeTeam(test.app);
  ground = await makeRunGround(test.app, team.project);
  lead = await test.signedIn(team.lead);
  runId = await startRun(ground.recipe);
}, 90_000);
afterAll(() => test.close());

async function startRun(recipe: object): Promise<string> {
  const { body } = await lead.post(`/api/v1/projects/${team.project.id}/runs`).send({ recipe }).expect(201);
  const run = await waitForRun(lead, (body as Run).id);
  expect(run.job).toMatchObject({ state: 'finished', error: null });
  return run.id;
}

const majority = (windowPixels = 3) => ({ id: randomUUID(), kind: 'majority', windowPixels });
const sieve = (minAreaHa: number) => ({ id: randomUUID(), kind: 'sieve', minAreaHa, neighbours: 4 });

async function read(id = runId): Promise<RunPostProcessing> {
  return (await lead.get(`/api/v1/runs/${id}/post-processing`).expect(200)).body as RunPostProcessing;
}
async function readRun(id = runId): Promise<Run> {
  return (await lead.get(`/api/v1/runs/${id}`).expect(200)).body as Run;
}

async function apply(steps: object[], id = runId): Promise<RunPostProcessing> {
  const { revisions } = await read(id);
  const basedOn = revisions[0]?.number ?? 0;
  await lead.post(`/api/v1/runs/${id}/post-processing`).send({ steps, basedOn }).expect(201);
  for (let i = 0; i < 300; i++) {
    const now = await read(id);
    const job = now.revisions[0]?.job;
    if (job && job.state !== 'queued' && job.state !== 'running') {
      expect(job).toMatchObject({ state: 'finished', error: null });
      return now;
    }
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error('the steps were not applied in time');
}

describe('post-processing of a run', () => {
  it('applies a list to the classifier’s map, and gives that map back when the list is empty', async () => {
    const before = await readRun();
    const tile = `/api/v1/runs/${runId}/tiles/4/7/4.webp`;
    const tagBefore = (await lead.get(tile).expect(200)).headers['etag'];
    const after = await apply([sieve(0.5), majority(5)]);
    expect(after.applied).toBe(1);
    expect(after.revisions[0]?.madeBy?.id).toBe(team.lead.id);
    const [first] = after.revisions[0]!.effects;
    expect(first!.changedPixels).toBeGreaterThan(0);
    expect(first!.nMerged).toBeGreaterThan(0);
    const changed = await readRun();
    expect(changed.classMapSha256).not.toBe(before.classMapSha256);
    expect(changed.notes.join(' ')).toContain('judged on the map after');
    expect(after.before?.overallAccuracy).toBe(before.overallAccuracy);
    expect(after.after?.overallAccuracy).toBe(changed.overallAccuracy);
    const total = (run: Run) => run.areas!.reduce((sum, { pixels }) => sum + pixels, 0);
    expect(total(changed)).toBe(total(before));
    const nodata = (run: Run) => run.areas!.find(({ code }) => code === 255)?.pixels;
    expect(nodata(changed)).toBe(nodata(before));
    expect((await lead.get(tile).expect(200)).headers['etag']).not.toBe(tagBefore);
    const accuracy = await lead.get(`/api/v1/runs/${runId}/accuracy`).expect(200);
    expect((accuracy.body as { overall: unknown }).overall).toBeDefined();

    await apply([]);
    const back = await readRun();
    expect(back.classMapSha256).toBe(before.classMapSha256);
    expect(back.areas).toEqual(before.areas);
    expect(back.overallAccuracy).toBe(before.overallAccuracy);
  });

  it('previews a list without changing the map', async () => {
    const before = await readRun();
    const steps = [sieve(1)];
    const path = `/api/v1/runs/${runId}/post-processing`;
    const { body } = await lead.post(`${path}/preview`).send({ steps }).expect(200);
    const preview = body as PostProcessingPreview;
    expect(preview.effects[0]!.changedPixels).toBeGreaterThan(0);
    await lead.get(`${path}/previews/${preview.previewId}/tiles/4/7/4.webp`).expect(200);
    await lead.get(`${path}/previews/${'0'.repeat(32)}/tiles/4/7/4.webp`).expect(404);
    expect((await readRun()).classMapSha256).toBe(before.classMapSha256);
    const applied = await apply(steps);
    expect(applied.areas).toEqual(preview.areas);
    expect(applied.revisions[0]!.effects).toEqual(preview.effects);
  });

  it('signs edits by hand, keeps the signature, and tells of them in the package', async () => {
    const [west, south, east, north] = ground.scene.bounds!;
    const ring = [
      [west, south],
      [east, south],
      [east, north],
      [west, north],
      [west, south],
    ];
    const edit = {
      ...{ id: randomUUID(), kind: 'reclass', polygon: { type: 'Polygon', coordinates: [ring] } },
      ...{ from: ground.classes[1]!.id, to: ground.classes[0]!.id, reason: 'Cloud shadow taken for heath' },
    };
    const first = await apply([edit]);
    const signed = first.revisions[0]!.steps[0]!;
    expect(signed).toMatchObject({ by: team.lead.name, reason: 'Cloud shadow taken for heath' });
    expect(first.areas.find(({ code }) => code === ground.classes[1]!.code)!.afterHa).toBe(0);
    const second = await apply([{ ...signed, by: 'Somebody Else' }, majority(5)]);
    expect(second.revisions[0]!.steps[0]).toEqual(signed);
    const zip = await lead
      .get(`/api/v1/runs/${runId}/class-map.zip`)
      .buffer(true)
      .parse((res, done) => {
        const parts: Buffer[] = [];
        res.on('data', (part: Buffer) => parts.push(part));
        res.on('end', () => done(null, Buffer.concat(parts)));
      })
      .expect(200);
    expect((zip.body as Buffer).length).toBeGreaterThan(500);
  });

  it('refuses what does not fit, saying where', async () => {
    const path = `/api/v1/runs/${runId}/post-processing`;
    const basedOn = (await read()).revisions[0]!.number;
    for (const step of [
      { ...majority(4) },
      { ...sieve(0) },
      { id: randomUUID(), kind: 'recode', pairs: [{ from: randomUUID(), to: 'nodata' }] },
      { id: randomUUID(), kind: 'fill', mask: { kind: 'study-area' }, where: 'outside', to: 'nodata' },
      { id: randomUUID(), kind: 'fill', mask: { kind: 'zones', layerId: randomUUID() }, where: 'inside', to: 'nodata' },
    ]) {
      await lead
        .post(path)
        .send({ steps: [step], basedOn })
        .expect(400);
      await lead
        .post(`${path}/preview`)
        .send({ steps: [step] })
        .expect(400);
    }
    expect((await read()).revisions[0]!.number).toBe(basedOn);
    const conflict = await lead
      .post(path)
      .send({ steps: [], basedOn: basedOn - 1 })
      .expect(409);
    expect((conflict.body as { code: string }).code).toBe('changed-in-between');
    const reviewer = await test.signedIn(team.reviewer);
    await reviewer.post(path).send({ steps: [], basedOn }).expect(403);
    await lead.get(`/api/v1/runs/${randomUUID()}/post-processing`).expect(404);
  });

  it('applies the list of a recipe as part of the run, so that the same recipe gives the same map', async () => {
    const postProcessing = [majority(), sieve(0.5)];
    const [one, two] = [
      await startRun({ ...ground.recipe, postProcessing }),
      await startRun({ ...ground.recipe, postProcessing }),
    ];
    expect((await readRun(one)).classMapSha256).toBe((await readRun(two)).classMapSha256);
    const list = await read(one);
    expect(list).toMatchObject({ applied: 1, revisions: [{ job: null, isApplied: true }] });
  });

  it('keeps the map as it is while a reference design rests on it', async () => {
    const design = await createDesign(test.app, team.project.id, team.lead.id, {
      ...{ runId, strata: 'map-classes', expected: [], expectedOtherwise: 0.8, name: '', minSpacingMeters: 0 },
      ...{ target: { kind: 'total', total: 6 }, allocation: { kind: 'equal' }, answersPerPoint: 2 },
    });
    const list = await read();
    expect(list.abilities.change).toBe(false);
    expect(list.refusal).toContain('design');
    const basedOn = list.revisions[0]!.number;
    const answer = await lead.post(`/api/v1/runs/${runId}/post-processing`).send({ steps: [], basedOn }).expect(409);
    expect((answer.body as { code: string }).code).toBe('map-judged');
    await test.app.db.getRepository(ReferenceDesign).delete({ id: design.id });
    expect((await read()).refusal).toBeNull();
  });
});
