import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Membership } from '../../server/entities/membership.ts';
import { Project } from '../../server/entities/project.ts';
import { User } from '../../server/entities/user.ts';
import { makeClass } from '../factories/make-class.ts';
import { makeMembership, makeProject, makeTeam, type Team } from '../factories/make-project.ts';
import { pixelRectangle } from '../factories/make-sample.ts';
import { makeScene } from '../factories/make-scene.ts';
import { makeUser } from '../factories/make-user.ts';
import { openTestApp, type Agent, type TestApp } from '../factories/test-app.ts';

let test: TestApp;
let team: Team;
let lead: Agent;

beforeAll(async () => {
  test = await openTestApp();
});
afterAll(() => test.close());
beforeEach(async () => {
  team = await makeTeam(test.app);
  lead = await test.signedIn(team.lead);
});

type Answer = { status: number };
const statusesOf = (answers: Answer[]) => answers.map(({ status }) => status).sort();

describe('at the same moment', () => {
  it('a person is added once', async () => {
    const body = { email: 'newcomer@vennory.example', roles: ['labeller'] };
    const answers = await Promise.all(
      Array.from({ length: 5 }, () => lead.post(`/api/v1/projects/${team.project.id}/members`).send(body)),
    );
    expect(statusesOf(answers)).toEqual([201, 409, 409, 409, 409]);
    expect(await test.app.db.getRepository(User).countBy({ email: body.email })).toBe(1);
  });

  it('an account is made once', async () => {
    const admin = await test.signedIn(await makeUser(test.app, { siteAdmin: true }));
    const body = { email: 'new-account@vennory.example', name: 'New' };
    const answers = await Promise.all(Array.from({ length: 4 }, () => admin.post('/api/v1/site/accounts').send(body)));
    expect(statusesOf(answers)).toEqual([201, 409, 409, 409]);
  });

  it('two leads who remove each other leave one', async () => {
    const project = await makeProject(test.app);
    const people = [await makeUser(test.app), await makeUser(test.app)] as const;
    for (const person of people) await makeMembership(test.app, project, person, 'lead');
    const agents = [await test.signedIn(people[0]), await test.signedIn(people[1])] as const;
    const memberships = test.app.db.getRepository(Membership);
    const idOf = async (user: User) =>
      (await memberships.findOneByOrFail({ projectId: project.id, userId: user.id })).id;
    const [first, second] = [await idOf(people[0]), await idOf(people[1])];
    const answers = await Promise.all([
      agents[0].delete(`/api/v1/projects/${project.id}/members/${second}`),
      agents[1].delete(`/api/v1/projects/${project.id}/members/${first}`),
    ]);
    expect(await memberships.countBy({ projectId: project.id })).toBe(1);
    // The later one is told that a lead must stay, or finds to be out already.
    expect([
      [204, 404],
      [204, 409],
    ]).toContainEqual(statusesOf(answers));
  });

  it.each(['scene', 'project'] as const)(
    'samples are drawn and their %s is deleted, and either is told what came of it',
    async (what) => {
      for (let round = 0; round < 3; round++) {
        const project = await makeProject(test.app);
        await makeMembership(test.app, project, team.lead, 'lead');
        const scene = await makeScene(test.app, project);
        const landClass = await makeClass(test.app, project);
        const draw = (place: number) =>
          lead.post(`/api/v1/projects/${project.id}/samples`).send({
            ...{ id: randomUUID(), sceneId: scene.id, classId: landClass.id },
            geometry: pixelRectangle(scene, 2 + place * 5, 4, 3, 3),
          });
        const remove =
          what === 'scene'
            ? lead.delete(`/api/v1/scenes/${scene.id}`)
            : lead.delete(`/api/v1/projects/${project.id}`).send({ confirmName: project.name });
        const answers = await Promise.all([...[0, 1, 2, 3, 4, 5].map(draw), remove]);
        const removed = answers.at(-1)?.status;
        expect([204, 409]).toContain(removed);
        for (const { status } of answers.slice(0, -1)) expect([201, 400, 404, 409]).toContain(status);
        if (what === 'scene' && removed === 204) expect(answers.some(({ status }) => status === 201)).toBe(false);
      }
    },
  );

  it('two transactions that wait for each other both come through', async () => {
    const [a, b] = [await makeProject(test.app), await makeProject(test.app)];
    const tries = { first: 0, second: 0 };
    const rename = (who: 'first' | 'second', ids: [string, string]) =>
      test.app.db.transaction(async (manager) => {
        tries[who]++;
        await manager.increment(Project, { id: ids[0] }, 'lastSampleNumber', 1);
        // Both hold their first row before either asks for its second.
        await expect.poll(() => Math.min(tries.first, tries.second), { interval: 5 }).toBeGreaterThan(0);
        await manager.query('SELECT SLEEP(0.1)');
        await manager.increment(Project, { id: ids[1] }, 'lastSampleNumber', 1);
      });
    await Promise.all([rename('first', [a.id, b.id]), rename('second', [b.id, a.id])]);
    expect(tries.first + tries.second).toBeGreaterThan(2);
    for (const { id } of [a, b]) {
      expect((await test.app.db.getRepository(Project).findOneByOrFail({ id })).lastSampleNumber).toBe(2);
    }
  });
});
