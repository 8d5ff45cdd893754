import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Job } from '../../server/entities/job.ts';
import type { ComputeTask } from '../../server/jobs/compute/tasks.ts';
import type { NamedRecipe, RecipeDiff } from '../../shared/contracts/named-recipe.ts';
import type { Run } from '../../shared/contracts/run.ts';
import type { Tuning } from '../../shared/contracts/tuning.ts';
import { makeTeam, type Team } from '../factories/make-project.ts';
import { makeRunGround, type RunGround } from '../factories/make-run-ground.ts';
import { openTestApp, type Agent, type TestApp } from '../factories/test-app.ts';
import { waitForRun } from '../factories/wait-for-run.ts';

let test: TestApp;
let team: Team;
let ground: RunGround;
let modeller: Agent;
let outsider: Agent;
const path = (rest: string) => `/api/v1/projects/${team.project.id}/${rest}`;

beforeAll(async () => {
  test = await openTestApp();
  team = await makeTeam(test.app);
  ground = await makeRunGround(test.app, team.project);
  modeller = await test.signedIn(team.modeller);
  outsider = await test.signedIn((await makeTeam(test.app)).lead);
}, 60_000);
afterAll(() => test.close());

async function keep(name: string, recipe: object = ground.recipe): Promise<NamedRecipe> {
  return (await modeller.post(path('recipes')).send({ name, recipe }).expect(201)).body as NamedRecipe;
}

describe('named recipes', () => {
  it('are kept, listed by name, renamed and deleted', async () => {
    const second = await keep('Second');
    const first = await keep('First');
    const listed = await modeller.get(path('recipes')).expect(200);
    expect((listed.body.recipes as NamedRecipe[]).map(({ name }) => name)).toEqual(['First', 'Second']);
    const renamed = await modeller
      .patch(`/api/v1/recipes/${first.id}`)
      .send({ version: first.version, name: 'Third', note: 'for spring' })
      .expect(200);
    expect(renamed.body).toMatchObject({ name: 'Third', note: 'for spring', version: first.version + 1 });
    const stale = await modeller
      .patch(`/api/v1/recipes/${first.id}`)
      .send({ version: first.version, name: 'Fourth' })
      .expect(409);
    expect(stale.body.code).toBe('stale-version');
    await modeller.delete(`/api/v1/recipes/${second.id}`).expect(204);
    await modeller.delete(`/api/v1/recipes/${second.id}`).expect(404);
    await outsider.delete(`/api/v1/recipes/${first.id}`).expect(404);
  });

  it('have names of their own, and a recipe that is one', async () => {
    await keep('Taken');
    const { body } = await modeller.post(path('recipes')).send({ name: 'Taken', recipe: ground.recipe }).expect(409);
    expect(body).toMatchObject({ code: 'name-taken', found: 'Taken' });
    await modeller.post(path('recipes')).send({ name: 'Empty', recipe: {} }).expect(400);
    await modeller.post(path('recipes')).send({ name: ' ', recipe: ground.recipe }).expect(400);
  });

  it('are compared with each other and with runs, in words', async () => {
    const kept = await keep('Fewer bands', {
      ...ground.recipe,
      bandIds: ground.recipe.bandIds.slice(0, 2),
      classifier: { ...ground.recipe.classifier, trees: 30 },
    });
    const { body: run } = await modeller.post(path('runs')).send({ recipe: ground.recipe }).expect(201);
    await waitForRun(modeller, (run as Run).id);
    const query = `left=run:${(run as Run).id}&right=recipe:${kept.id}`;
    const diff = (await modeller.get(path(`recipe-diff?${query}`)).expect(200)).body as RecipeDiff;
    expect(diff.left.title).toBe(`Run ${(run as Run).number}`);
    expect(diff.right.title).toBe('Fewer bands');
    expect(diff.differences).toEqual([
      { path: 'bandIds', label: 'Bands', left: 'Blue, Green, Red, Near infrared', right: 'Blue, Green' },
      { path: 'classifier.trees', label: 'Trees', left: '15', right: '30' },
    ]);
    await modeller.get(path('recipe-diff?left=run:nonsense&right=recipe:nonsense')).expect(400);
    const nowhere = '00000000-0000-4000-8000-000000000000';
    await modeller.get(path(`recipe-diff?left=run:${nowhere}&right=recipe:${kept.id}`)).expect(404);
  });
});

describe('tuning', () => {
  const ranges = [
    { parameter: 'trees', values: [1, 10] },
    { parameter: 'minLeaf', values: [1, 30] },
  ];
  const plan = { folds: 3, blockMeters: 300, seed: 2, ranges };

  async function waitForTuning(id: string): Promise<Tuning> {
    const until = Date.now() + 40_000;
    for (;;) {
      const { body } = await modeller.get(`/api/v1/tunings/${id}`).expect(200);
      const tuning = body as Tuning;
      if (!['queued', 'running'].includes(tuning.job!.state)) return tuning;
      if (Date.now() > until) throw new Error(`the tuning is still ${tuning.job!.state}`);
      await new Promise((resolve) => setTimeout(resolve, 60));
    }
  }

  async function tune(change: object = {}): Promise<Tuning> {
    const { body } = await modeller
      .post(path('tunings'))
      .send({ recipe: ground.recipe, plan: { ...plan, ...change } })
      .expect(201);
    return waitForTuning((body as Tuning).id);
  }

  it('tries every combination in every fold, names the best, and gives the same figures again', async () => {
    const tuning = await tune();
    expect(tuning.job).toMatchObject({ state: 'finished', error: null });
    expect(tuning.trials.map(({ values }) => values)).toEqual([
      [1, 1],
      [1, 30],
      [10, 1],
      [10, 30],
    ]);
    for (const trial of tuning.trials) {
      expect(trial.error).toBeNull();
      expect(trial.foldAccuracies).toHaveLength(3);
      const mean = trial.foldAccuracies.reduce<number>((sum, value) => sum + value! / 3, 0);
      expect(trial.meanAccuracy).toBeCloseTo(mean, 12);
      expect(trial.spread).toBeGreaterThanOrEqual(0);
      expect(trial.meanAccuracy).toBeGreaterThan(0.5);
    }
    const best = tuning.trials.find(({ number }) => number === tuning.bestTrial)!;
    expect(best.meanAccuracy).toBe(Math.max(...tuning.trials.map(({ meanAccuracy }) => meanAccuracy!)));
    const again = await tune();
    const figures = ({ trials }: Tuning) => trials.map(({ foldAccuracies }) => foldAccuracies);
    expect(figures(again)).toEqual(figures(tuning));
  }, 60_000);

  it('never learns from a held-out sample nor is judged by one', async () => {
    const { compute } = test.app.workers;
    const run = compute.run.bind(compute);
    const seen: Extract<ComputeTask, { kind: 'read-training' }>[] = [];
    compute.run = (task, options) => {
      if (task.kind === 'read-training') seen.push(task);
      return run(task, options);
    };
    try {
      await tune();
    } finally {
      compute.run = run;
    }
    const { body } = await modeller.post(path('runs')).send({ recipe: ground.recipe }).expect(201);
    const { RunSample } = await import('../../server/entities/run-sample.ts');
    const rows = await test.app.db.getRepository(RunSample).findBy({ runId: (body as Run).id });
    await waitForRun(modeller, (body as Run).id);
    const heldOut = new Set(rows.filter(({ part }) => part === 'held-out').map(({ sampleId }) => sampleId));
    const training = new Set(rows.filter(({ part }) => part === 'training').map(({ sampleId }) => sampleId));
    expect(heldOut.size).toBe(9);
    expect(seen).toHaveLength(3);
    const learned = seen.flatMap((task) => task.training.map(({ id }) => id));
    // Each training sample in one fold, and nothing else.
    expect(learned.sort()).toEqual([...training].sort());
    // Pixels of held-out samples are left out of every fold, also where a training sample overlaps them.
    for (const task of seen) {
      expect(task.heldOut.map(({ id }) => id)).toEqual(expect.arrayContaining([...heldOut]));
    }
  }, 60_000);

  it('is refused in words where the search makes no sense', async () => {
    const refuse = async (change: object) => {
      const { body } = await modeller
        .post(path('tunings'))
        .send({ recipe: ground.recipe, plan: { ...plan, ...change } })
        .expect(400);
      return body as { code: string; found: string };
    };
    expect(await refuse({ ranges: [{ parameter: 'neighbours', values: [3] }] })).toMatchObject({
      code: 'plan-refused',
      found: 'The classifier has no setting “neighbours”.',
    });
    expect((await refuse({ blockMeters: 100_000 })).found).toMatch(/blocks; 3 folds need at least 3/);
    expect((await refuse({ ranges: [] })).code).toBe('invalid-input');
  });

  it('keeps what was tried when it is cancelled, and is deleted when it has ended', async () => {
    const slow = [{ parameter: 'trees', values: [1, 1500, 1600, 1700, 1800, 1900] }];
    const { body } = await modeller
      .post(path('tunings'))
      .send({ recipe: ground.recipe, plan: { ...plan, ranges: slow } })
      .expect(201);
    const asked = body as Tuning;
    const jobs = test.app.db.getRepository(Job);
    const until = Date.now() + 20_000;
    while ((await jobs.findOneByOrFail({ id: asked.job!.id })).step !== 'Trying settings') {
      if (Date.now() > until) throw new Error('the tuning did not begin');
      await new Promise((resolve) => setTimeout(resolve, 30));
    }
    await modeller.delete(`/api/v1/tunings/${asked.id}`).expect(409);
    await modeller.post(`/api/v1/jobs/${asked.job!.id}/cancel`).expect(200);
    const ended = await waitForTuning(asked.id);
    expect(ended.job!.state).toBe('cancelled');
    expect(ended.trials.length).toBeLessThan(6);
    await modeller.delete(`/api/v1/tunings/${asked.id}`).expect(204);
    await modeller.get(`/api/v1/tunings/${asked.id}`).expect(404);
  }, 60_000);
});
