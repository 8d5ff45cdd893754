import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Block } from '../../server/entities/block.ts';
import type { LandClass } from '../../server/entities/land-class.ts';
import { Sample } from '../../server/entities/sample.ts';
import type { Scene } from '../../server/entities/scene.ts';
import { placeSamples } from '../../server/services/place-samples.ts';
import { send } from '../factories/expect-authority.ts';
import { makeBlock } from '../factories/make-block.ts';
import { makeClass } from '../factories/make-class.ts';
import { makeTeam, type Team } from '../factories/make-project.ts';
import { makeSample, pixelRectangle } from '../factories/make-sample.ts';
import { makeScene } from '../factories/make-scene.ts';
import { openTestApp, type TestApp } from '../factories/test-app.ts';

let test: TestApp;
let team: Team;
let scene: Scene;
let moor: LandClass;
let arable: LandClass;
let project: string;

beforeAll(async () => {
  test = await openTestApp();
  team = await makeTeam(test.app);
  scene = await makeScene(test.app, team.project);
  moor = await makeClass(test.app, team.project, { name: 'Moor' });
  arable = await makeClass(test.app, team.project, { name: 'Arable' });
  project = `/projects/${team.project.id}`;
});
afterAll(() => test.close());
beforeEach(async () => {
  await test.app.db.getRepository(Sample).delete({ projectId: team.project.id });
  await test.app.db.getRepository(Block).delete({ projectId: team.project.id });
});

const post = (path: string, body: object, user: { email: string }) => send(test, user, { method: 'post', path, body });
const get = (path: string, user: { email: string }) => send(test, user, { method: 'get', path });
const draw = (by = team.labeller, column = 4, row = 4, landClass = moor) =>
  makeSample(test.app, scene, landClass, { column, row }, { createdById: by.id });
const seen = ({ id, version }: { id: string; version: number }) => ({ id, version });
const submit = (samples: Sample[], user = team.labeller) =>
  post(`${project}/samples/submit`, { act: 'submit', samples: samples.map(seen) }, user);
const review = (act: string, samples: { id: string; version: number }[], comment = '') =>
  post(`${project}/samples/review`, { act, samples: samples.map(seen), comment }, team.lead);
const stateOf = async ({ id }: Sample) => (await test.app.db.getRepository(Sample).findOneByOrFail({ id })).state;

describe('review of samples', () => {
  it('goes from draft over submitted to accepted', async () => {
    const sample = await draw();
    expect((await submit([sample])).body.samples[0]).toMatchObject({ state: 'submitted', version: 1 });
    const accepted = await review('accept', [sample]);
    expect([accepted.status, accepted.body.refused]).toEqual([200, []]);
    expect(await stateOf(sample)).toBe('accepted');
  });

  it('returns with a comment, which the labeller answers, resolves and submits again', async () => {
    const sample = await draw();
    await submit([sample]);
    expect((await review('return', [sample])).status).toBe(400);
    await review('return', [sample], 'Too near the edge.');
    const thread = await get(`/samples/${sample.id}/remarks`, team.labeller);
    expect(thread.body.remarks.map(({ kind, text }: { kind: string; text: string }) => [kind, text])).toEqual([
      ['submitted', ''],
      ['returned', 'Too near the edge.'],
    ]);
    await post(`/samples/${sample.id}/remarks`, { text: 'Moved it.' }, team.labeller);
    const remarkId = thread.body.remarks[1].id as string;
    const resolved = await send(test, team.labeller, {
      ...{ method: 'patch', path: `/remarks/${remarkId}`, body: { resolved: true } },
    });
    expect(resolved.body.remarks[1].resolvedBy.id).toBe(team.labeller.id);
    expect((await get(`/samples/${sample.id}`, team.lead)).body).toMatchObject({ state: 'returned', openRemarks: 1 });
    await submit([sample]);
    expect(await stateOf(sample)).toBe('submitted');
  });

  it('names what was changed, is in another state or is not one’s own, and moves the rest', async () => {
    const [fine, changed, others, accepted] = [
      await draw(),
      await draw(),
      await draw(team.otherLabeller),
      await draw(),
    ];
    await submit([accepted]);
    await review('accept', [accepted]);
    const answer = await post(
      `${project}/samples/submit`,
      {
        act: 'submit',
        samples: [fine, { ...changed, version: 7 }, others, accepted, { id: randomUUID(), version: 1 }].map(seen),
      },
      team.labeller,
    );
    expect(answer.body.samples.map(({ id }: Sample) => id)).toEqual([fine.id]);
    expect(answer.body.refused.map(({ reason }: { reason: string }) => reason)).toEqual([
      'changed',
      'not-yours',
      'state',
      'gone',
    ]);
  });

  it('makes an accepted sample submitted again when it is changed, and says so in its thread', async () => {
    const sample = await draw();
    await submit([sample]);
    await review('accept', [sample]);
    const body = { version: 1, note: 'Burnt in May' };
    const changed = await send(test, team.labeller, { method: 'patch', path: `/samples/${sample.id}`, body });
    expect(changed.body).toMatchObject({ state: 'submitted', version: 2 });
    const { body: thread } = await get(`/samples/${sample.id}/remarks`, team.lead);
    expect(thread.remarks.at(-1).kind).toBe('changed-after-acceptance');
  });

  it('decides two reviews of one sample at once one after the other: one is accepted, one refused', async () => {
    const sample = await draw();
    await submit([sample]);
    const answers = await Promise.all([review('accept', [sample]), review('accept', [sample])]);
    const moved = answers.map(({ body }) => body.samples.length as number).sort();
    expect(moved).toEqual([0, 1]);
  });
});

describe('a block labelled independently', () => {
  const together = async () => {
    const block = await makeBlock(test.app, team.project, pixelRectangle(scene, 0, 0, 20, 20), [
      team.labeller,
      team.otherLabeller,
    ]);
    const mine = await draw(team.labeller, 4, 4, moor);
    const theirs = await draw(team.otherLabeller, 5, 4, arable);
    await placeSamples(test.app.db.manager, team.project.id);
    return { block, mine, theirs };
  };
  const listed = async (user: { email: string }) =>
    ((await get(`${project}/samples`, user)).body.samples as Sample[]).map(({ id }) => id);
  const finish = (block: Block, user: { email: string }) => post(`/blocks/${block.id}/state`, { to: 'done' }, user);

  it('withholds each other’s samples from the two until both are done, everywhere', async () => {
    const { block, mine, theirs } = await together();
    expect(await listed(team.labeller)).toEqual([mine.id]);
    expect(await listed(team.otherLabeller)).toEqual([theirs.id]);
    expect((await listed(team.lead)).length).toBe(2);
    for (const path of ['', '/history', '/remarks'])
      expect((await get(`/samples/${theirs.id}${path}`, team.labeller)).status, path).toBe(404);
    await finish(block, team.labeller);
    expect(await listed(team.labeller)).toEqual([mine.id]);
    await finish(block, team.otherLabeller);
    expect((await listed(team.labeller)).length).toBe(2);
    // What was seen cannot be unseen: only the lead opens the block again.
    expect((await post(`/blocks/${block.id}/state`, { to: 'in-work' }, team.labeller)).status).toBe(409);
  });

  it('measures agreement over the pixels both cover, and the lead settles what differs', async () => {
    const { block, mine, theirs } = await together();
    expect((await get(`/blocks/${block.id}/agreement`, team.lead)).status).toBe(409);
    await finish(block, team.labeller);
    await finish(block, team.otherLabeller);
    const { body } = await get(`/blocks/${block.id}/agreement`, team.lead);
    // 3 × 3 pixels each, one column apart: 2 × 3 in common, none of the same class.
    expect(body).toMatchObject({
      pixelsOfBoth: 6,
      pixelsOfFirstOnly: 3,
      pixelsOfSecondOnly: 3,
      agreeing: 0,
      rawAgreement: 0,
    });
    const settled = await post(`/blocks/${block.id}/settle`, { keep: seen(mine), drop: seen(theirs) }, team.lead);
    expect(settled.status).toBe(204);
    expect(await listed(team.lead)).toEqual([mine.id]);
    expect(await stateOf(mine)).toBe('accepted');
  });
});

describe('blocks', () => {
  it('are cut from the scene where there is no study area, and not over those there are', async () => {
    const cut = await post(`${project}/blocks/grid`, { sizeMeters: 1000 }, team.lead);
    expect(cut.status).toBe(201);
    expect(cut.body.blocks.length).toBeGreaterThan(1);
    expect(cut.body.blocks[0]).toMatchObject({ name: 'A1', state: 'open' });
    const again = await post(`${project}/blocks/grid`, { sizeMeters: 1000 }, team.lead);
    expect([again.status, again.body.code]).toEqual([409, 'has-blocks']);
  });

  it('refuses a drawn block that overlaps another, and a labeller without the role', async () => {
    const block = await makeBlock(test.app, team.project, pixelRectangle(scene, 0, 0, 10, 10), []);
    const geometry = pixelRectangle(scene, 5, 5, 10, 10);
    expect((await post(`${project}/blocks`, { name: 'New', geometry }, team.lead)).status).toBe(400);
    const assign = { blockIds: [block.id], userIds: [team.reviewer.id] };
    expect((await post(`${project}/blocks/assign`, assign, team.lead)).status).toBe(400);
  });

  it('are done by whoever works in them, and checked by the lead only then', async () => {
    const block = await makeBlock(test.app, team.project, pixelRectangle(scene, 0, 0, 10, 10), [team.labeller]);
    const move = (to: string, user: { email: string }) => post(`/blocks/${block.id}/state`, { to }, user);
    expect((await move('checked', team.lead)).status).toBe(409);
    expect((await move('done', team.otherLabeller)).status).toBe(403);
    expect((await move('done', team.labeller)).body.blocks[0].state).toBe('done');
    expect((await move('checked', team.lead)).body.blocks[0].state).toBe('checked');
    expect((await move('in-work', team.labeller)).status).toBe(409);
  });
});

describe('presence', () => {
  it('tells who changes which sample, and forgets a desk that was left', async () => {
    const sample = await draw();
    const deskId = randomUUID();
    await post(`${project}/presence`, { deskId, editingSampleId: sample.id }, team.labeller);
    const here = (await get(`${project}/presence`, team.lead)).body.people;
    expect(here).toMatchObject([{ person: { id: team.labeller.id }, editingSampleId: sample.id }]);
    await send(test, team.labeller, { method: 'delete', path: `${project}/presence`, body: { deskId } });
    expect((await get(`${project}/presence`, team.lead)).body.people).toEqual([]);
  });
});
