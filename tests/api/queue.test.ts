import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Job } from '../../server/entities/job.ts';
import { Band } from '../../server/entities/band.ts';
import { Run as RunRow } from '../../server/entities/run.ts';
import type { JobLog, Queue } from '../../shared/contracts/queue.ts';
import type { Reproduction } from '../../shared/contracts/reproduction.ts';
import type { Run } from '../../shared/contracts/run.ts';
import { makeTeam, type Team } from '../factories/make-project.ts';
import { makeRunGround, type RunGround } from '../factories/make-run-ground.ts';
import { makeUser } from '../factories/make-user.ts';
import { openTestApp, type Agent, type TestApp } from '../factories/test-app.ts';
import { waitForRun } from '../factories/wait-for-run.ts';

let test: TestApp;
let team: Team;
let ground: RunGround;
let modeller: Agent;
let otherTeam: Team;
let otherGround: RunGround;
let otherModeller: Agent;
let admin: Agent;

beforeAll(async () => {
  test = await openTestApp();
  team = await makeTeam(test.app);
  ground = await makeRunGround(test.app, team.project);
  modeller = await test.signedIn(team.modeller);
  otherTeam = await makeTeam(test.app);
  otherGround = await makeRunGround(test.app, otherTeam.project);
  otherModeller = await test.signedIn(otherTeam.modeller);
  admin = await test.signedIn(await makeUser(test.app, { siteAdmin: true }));
}, 60_000);
afterAll(() => test.close());

async function start(recipe: object = ground.recipe, name = '', agent = modeller, owner = team): Promise<Run> {
  const path = `/api/v1/projects/${owner.project.id}/runs`;
  const { body } = await agent.post(path).send({ name, recipe }).expect(201);
  return body as Run;
}
/** Long enough to be found at work. */
const slow = () => ({ ...ground.recipe, classifier: { kind: 'random-forest', trees: 2000, featuresPerTree: 4 } });

async function readQueue(agent = modeller, owner = team): Promise<Queue> {
  return (await agent.get(`/api/v1/projects/${owner.project.id}/queue`).expect(200)).body as Queue;
}
const startedAt = (run: Run) => Date.parse(run.job.startedAt!);
const isWorking = ({ job }: Run) => job.step === 'Training trees' && job.done > 0;

describe('the queue', () => {
  it('takes turns between projects, and goes by priority within one', async () => {
    const blocker = await start(slow());
    await waitForRun(modeller, blocker.id, isWorking);
    const quick = { ...ground.recipe, classifier: { kind: 'minimum-distance' } };
    const runs = [await start(quick, 'one'), await start(quick, 'two'), await start(quick, 'three')] as const;
    const foreign = await start(
      { ...otherGround.recipe, classifier: { kind: 'minimum-distance' } },
      'secret name',
      otherModeller,
      otherTeam,
    );
    const { body } = await modeller.put(`/api/v1/jobs/${runs[2].job.id}/priority`).send({ priority: 'high' });
    expect(body).toMatchObject({ state: 'queued', priority: 'high' });

    const queue = await readQueue();
    expect(queue.entries.map(({ title, position }) => [title, position])).toEqual([
      [`Run ${blocker.number}`, null],
      ['Work of another project', 1],
      [`Run ${runs[2].number} (three)`, 2],
      [`Run ${runs[0].number} (one)`, 3],
      [`Run ${runs[1].number} (two)`, 4],
    ]);
    expect(queue.abilities).toEqual({ prioritise: true, cancel: true });
    expect(JSON.stringify(queue)).not.toContain('secret name');
    expect(JSON.stringify(queue)).not.toContain(foreign.job.id);
    const labeller = await test.signedIn(team.labeller);
    expect((await readQueue(labeller)).abilities).toEqual({ prioritise: false, cancel: false });

    await modeller.post(`/api/v1/runs/${blocker.id}/cancel`).expect(200);
    const ended = await Promise.all(runs.map(({ id }) => waitForRun(modeller, id)));
    const other = await waitForRun(otherModeller, foreign.id);
    const order = [other, ended[2]!, ended[0]!, ended[1]!];
    expect(order.map(({ job }) => job.state)).toEqual(['finished', 'finished', 'finished', 'finished']);
    expect(order.map(startedAt)).toEqual(order.map(startedAt).sort((a, b) => a - b));
    const late = await modeller.put(`/api/v1/jobs/${runs[0].job.id}/priority`).send({ priority: 'low' }).expect(409);
    expect(late.body.code).toBe('not-waiting');
    await modeller.put(`/api/v1/jobs/${runs[0].job.id}/priority`).send({ priority: 'urgent' }).expect(400);
  }, 60_000);

  it('is put in another order by a site administrator, who sees whose work it is', async () => {
    const blocker = await start(slow());
    await waitForRun(modeller, blocker.id, isWorking);
    const quick = { ...ground.recipe, classifier: { kind: 'minimum-distance' } };
    const [first, second] = [await start(quick), await start(quick)];
    const { body } = await admin
      .put('/api/v1/site/queue/order')
      .send({ jobIds: [second.job.id] })
      .expect(200);
    const waiting = (body as Queue).entries.filter(({ state }) => state === 'queued');
    expect(waiting.map(({ jobId, isPlaced }) => [jobId, isPlaced])).toEqual([
      [second.job.id, true],
      [first.job.id, false],
    ]);
    expect(waiting[0]!.projectName).toBe(team.project.name);
    await modeller.get('/api/v1/site/queue').expect(404);
    await modeller.post(`/api/v1/jobs/${blocker.job.id}/cancel`).expect(200);
    const [one, two] = [await waitForRun(modeller, first.id), await waitForRun(modeller, second.id)];
    expect(startedAt(two)).toBeLessThan(startedAt(one));
    const ended = await modeller.post(`/api/v1/jobs/${blocker.job.id}/cancel`).expect(409);
    expect(ended.body.code).toBe('job-ended');
  }, 60_000);

  it('reaches the worker within a second when work is cancelled, also from another process', async () => {
    const run = await start(slow());
    await waitForRun(modeller, run.id, isWorking);
    const asked = Date.now();
    // What another server process does for somebody who cancels.
    await test.app.db.getRepository(Job).update({ id: run.job.id }, { cancelAsked: true });
    const ended = await waitForRun(modeller, run.id);
    expect(ended.job.state).toBe('cancelled');
    expect(Date.now() - asked).toBeLessThan(1000);
  });
});

describe('the log of a run', () => {
  it('tells its steps, counts and durations in words, and can be downloaded', async () => {
    const run = await start(ground.recipe, 'logged');
    await waitForRun(modeller, run.id);
    const { body } = await modeller.get(`/api/v1/jobs/${run.job.id}/log`).expect(200);
    const texts = (body as JobLog).entries.map(({ text }) => text);
    expect(texts[0]).toBe('Taken up.');
    expect(texts.join('\n')).toMatch(/Training trees: 15 of 15 in \d+\.\d s\./);
    expect(texts.join('\n')).toMatch(/360 training pixels of 15 polygons\./);
    expect(texts.join('\n')).toMatch(/Mapping strips: 1 of 1 in/);
    expect(texts.at(-1)).toMatch(/^Finished after \d+\.\d s\.$/);
    const times = (body as JobLog).entries.map(({ at }) => at);
    expect(times).toEqual([...times].sort());
    const text = await modeller.get(`/api/v1/jobs/${run.job.id}/log.txt`).expect(200);
    expect(text.headers['content-disposition']).toContain('log.txt');
    expect(text.text.split('\n').filter(Boolean)).toHaveLength(texts.length);
    await otherModeller.get(`/api/v1/jobs/${run.job.id}/log`).expect(404);
  });

  it('says in plain words why a run failed', async () => {
    const run = await start({ ...ground.recipe, bandIds: ground.recipe.bandIds.slice(0, 1) });
    await waitForRun(modeller, run.id);
    await test.app.db.getRepository(RunRow).update({ id: run.id }, { inputSha256: '0'.repeat(64), result: null });
    await test.app.db.getRepository(Job).update({ id: run.job.id }, { state: 'failed' });
    await modeller.post(`/api/v1/runs/${run.id}/retry`).send({}).expect(200);
    const failed = await waitForRun(modeller, run.id);
    expect(failed.job.state).toBe('failed');
    const { body } = await modeller.get(`/api/v1/jobs/${run.job.id}/log`).expect(200);
    const last = (body as JobLog).entries.at(-1)!;
    expect(last.level).toBe('error');
    expect(last.text).toMatch(/^Failed after .*: The scene’s bands are not those the run was started with\./);
  });
});

describe('trying a run again', () => {
  it('takes a cancelled run up anew, to the same bytes', async () => {
    const whole = await waitForRun(modeller, (await start()).id);
    const run = await start({ ...ground.recipe, classifier: { ...ground.recipe.classifier, trees: 15 } });
    await modeller.post(`/api/v1/runs/${run.id}/cancel`);
    const cancelled = await waitForRun(modeller, run.id);
    if (cancelled.job.state === 'cancelled') {
      expect(cancelled.abilities.retry).toBe(true);
      await modeller.post(`/api/v1/runs/${run.id}/retry`).send({}).expect(200);
    }
    const again = await waitForRun(modeller, run.id);
    expect(again.job).toMatchObject({ state: 'finished', error: null });
    expect(again.classMapSha256).toBe(whole.classMapSha256);
    const refused = await modeller.post(`/api/v1/runs/${run.id}/retry`).send({}).expect(409);
    expect(refused.body.code).toBe('not-retryable');
  });

  it('goes on from the parts a failed run has left, and without them when told to', async () => {
    const run = await start(ground.recipe);
    const whole = await waitForRun(modeller, run.id);
    const runs = test.app.db.getRepository(RunRow);
    const jobs = test.app.db.getRepository(Job);
    const fail = async () => {
      await runs.update({ id: run.id }, { result: null });
      await jobs.update({ id: run.job.id }, { state: 'failed', error: 'the disk was full' });
    };
    await fail();
    // As a failed attempt leaves it: the model stands, the strips do not.
    const model = await test.app.files.read(`runs/${run.id}/model.bin`);
    await test.app.files.write(
      `runs/${run.id}/training.json`,
      Buffer.from(JSON.stringify({ trainingPixels: 4321, notes: ['left by the first attempt'] })),
    );
    await modeller.post(`/api/v1/runs/${run.id}/retry`).send({}).expect(200);
    const resumed = await waitForRun(modeller, run.id);
    // Nothing was read or trained again.
    expect(resumed.trainingPixels).toBe(4321);
    expect(resumed.classMapSha256).toBe(whole.classMapSha256);
    await fail();
    await test.app.files.write(`runs/${run.id}/model.bin`, Buffer.from('damaged'));
    await modeller.post(`/api/v1/runs/${run.id}/retry`).send({}).expect(200);
    expect((await waitForRun(modeller, run.id)).job.state).toBe('failed');
    await modeller.post(`/api/v1/runs/${run.id}/retry`).send({ anew: true }).expect(200);
    const anew = await waitForRun(modeller, run.id);
    expect(anew).toMatchObject({ trainingPixels: 360, classMapSha256: whole.classMapSha256 });
    expect(await test.app.files.read(`runs/${run.id}/model.bin`)).toEqual(model);
  });
});

describe('reproducing a run', () => {
  async function reproduce(runId: string): Promise<Reproduction> {
    const asked = await modeller.post(`/api/v1/runs/${runId}/reproductions`).expect(201);
    const until = Date.now() + 30_000;
    for (;;) {
      const { body } = await modeller.get(`/api/v1/runs/${runId}/reproductions`).expect(200);
      const row = (body.reproductions as Reproduction[]).find(({ id }) => id === asked.body.id)!;
      if (row.job && !['queued', 'running'].includes(row.job.state)) return row;
      if (Date.now() > until) throw new Error(`the reproduction is still ${row.job?.state}`);
      await new Promise((resolve) => setTimeout(resolve, 50));
    }
  }

  it('finds the same bytes, and says who asked, when and how long it took', async () => {
    const run = await waitForRun(modeller, (await start()).id);
    const row = await reproduce(run.id);
    expect(row).toMatchObject({
      verdict: 'same',
      missing: [],
      threads: 2,
      askedBy: { id: team.modeller.id },
      job: { state: 'finished', error: null },
    });
    expect(row.checks).toEqual([
      {
        what: 'Class map of the classifier',
        expectedSha256: run.classMapSha256,
        foundSha256: run.classMapSha256,
      },
    ]);
    expect(row.seconds).toBeGreaterThan(0);
    expect(await test.app.files.list(`runs/${row.id}/`)).toEqual([]);
    // The run itself is as it was.
    const after = await waitForRun(modeller, run.id);
    expect(after.job.id).toBe(run.job.id);
    expect(after.classMapSha256).toBe(run.classMapSha256);
  });

  it('finds a map that differs', async () => {
    const run = await waitForRun(modeller, (await start()).id);
    const runs = test.app.db.getRepository(RunRow);
    const { recipe } = await runs.findOneByOrFail({ id: run.id });
    await runs.update({ id: run.id }, { recipe: { ...recipe, seed: recipe.seed + 1 } });
    expect(await reproduce(run.id)).toMatchObject({ verdict: 'different' });
  });

  it('names the input that is gone or changed', async () => {
    const run = await waitForRun(modeller, (await start()).id);
    const bands = test.app.db.getRepository(Band);
    const band = await bands.findOneByOrFail({ id: ground.recipe.bandIds[1]! });
    await bands.update({ id: band.id }, { sha256: 'f'.repeat(64) });
    const row = await reproduce(run.id);
    await bands.update({ id: band.id }, { sha256: band.sha256 });
    expect(row).toMatchObject({ verdict: 'impossible', checks: [], job: { state: 'finished' } });
    expect(row.missing).toEqual([
      `The file of band ${band.name} is not the one that was taken in: its SHA-256 differs.`,
    ]);
  });

  it('is refused for a run that is not finished, and to those who start no runs', async () => {
    const run = await start(slow());
    const { body } = await modeller.post(`/api/v1/runs/${run.id}/reproductions`).expect(409);
    expect(body.code).toBe('not-finished');
    await modeller.post(`/api/v1/runs/${run.id}/cancel`).expect(200);
    const reviewer = await test.signedIn(team.reviewer);
    await reviewer.post(`/api/v1/runs/${run.id}/reproductions`).expect(403);
  });
});
