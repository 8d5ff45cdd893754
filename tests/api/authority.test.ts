import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Job } from '../../server/entities/job.ts';
import { Membership } from '../../server/entities/membership.ts';
import { ReferenceDesign } from '../../server/entities/reference-design.ts';
import { ReferencePoint } from '../../server/entities/reference-point.ts';
import { Run } from '../../server/entities/run.ts';
import { SampleRemark } from '../../server/entities/sample-remark.ts';
import { Sample } from '../../server/entities/sample.ts';
import { Tuning } from '../../server/entities/tuning.ts';
import type { User } from '../../server/entities/user.ts';
import { ZoneLayer } from '../../server/entities/zone-layer.ts';
import { routes } from '../../server/routes/index.ts';
import type { Route } from '../../server/routes/route.ts';
import { createDesign } from '../../server/services/designs.ts';
import { createNamedRecipe } from '../../server/services/named-recipes.ts';
import { findProject } from '../../server/services/projects.ts';
import { previewPostProcessing } from '../../server/services/post-processing.ts';
import { findRun, startRun } from '../../server/services/runs.ts';
import { makeBlock } from '../factories/make-block.ts';
import { makeMembership, makeTeam, type Team } from '../factories/make-project.ts';
import { makeRunGround } from '../factories/make-run-ground.ts';
import { makeUser, PASSWORD } from '../factories/make-user.ts';
import { openTestApp, type TestApp } from '../factories/test-app.ts';
import { waitForRun } from '../factories/wait-for-run.ts';

/** Who asks. The labeller drew the sample at hand, the other labeller did not; the admin is a member of nothing. */
const ACTORS = [
  'signed out',
  'outsider',
  'admin',
  'client',
  'labeller',
  'otherLabeller',
  'modeller',
  'reviewer',
  'lead',
] as const;
type Actor = (typeof ACTORS)[number];
type Outcome = 'in' | 401 | 403 | 404;
type Row = Record<Actor, Outcome>;

function row(signedOut: Outcome, strangers: Outcome, members: Partial<Row>): Row {
  const none = { 'signed out': signedOut, outsider: strangers, admin: strangers, client: strangers };
  return {
    ...none,
    labeller: strangers,
    otherLabeller: strangers,
    modeller: strangers,
    reviewer: strangers,
    lead: strangers,
    ...members,
  };
}
const forTeam = (outcome: Outcome): Partial<Row> => ({
  ...{ labeller: outcome, otherLabeller: outcome, modeller: outcome, reviewer: outcome, lead: outcome },
});

const PUBLIC = row('in', 'in', {});
/** Open to all, and there is nothing behind a made-up link. */
const PUBLIC_LINK = row(404, 404, {});
const ACCOUNT = row(401, 'in', {});
const SITE_ADMIN = row(401, 404, { admin: 'in' });
const MEMBERS = row(401, 404, { ...forTeam('in'), client: 'in' });
const LEAD_KNOWN_TO_CLIENT = row(401, 404, { ...forTeam(403), client: 403, lead: 'in' });
const TEAM = row(401, 404, forTeam('in'));
const LEAD = row(401, 404, { ...forTeam(403), lead: 'in' });
const LEAD_MODELLER = row(401, 404, { ...forTeam(403), lead: 'in', modeller: 'in' });
const DRAWS = row(401, 404, { ...forTeam(403), lead: 'in', labeller: 'in', otherLabeller: 'in' });
const MAKER_OR_LEAD = row(401, 404, { ...forTeam(403), lead: 'in', labeller: 'in' });
const ACCURACY = row(401, 404, { ...forTeam('in'), labeller: 403, otherLabeller: 403 });

const LEAD_REVIEWER = row(401, 404, { ...forTeam(403), lead: 'in', reviewer: 'in' });
const REVIEWER = row(401, 404, { ...forTeam(403), reviewer: 'in' });

/** A row for every route. A route that is added without one fails the test below. */
const TABLE: Record<string, Row> = {
  'session.read': PUBLIC,
  'session.create': PUBLIC,
  'session.delete': ACCOUNT,
  'session.devices': ACCOUNT,
  'session.delete-all': ACCOUNT,
  'account.change': ACCOUNT,
  'account.change-password': ACCOUNT,
  'account.forgot-password': PUBLIC,
  'welcome.read': PUBLIC_LINK,
  'welcome.accept': row(400 as Outcome, 400 as Outcome, {}),
  'site.accounts.list': SITE_ADMIN,
  'site.accounts.create': SITE_ADMIN,
  'site.accounts.update': SITE_ADMIN,
  'site.accounts.link': SITE_ADMIN,
  'site.storage.read': SITE_ADMIN,
  'projects.list': ACCOUNT,
  'projects.create': ACCOUNT,
  'projects.read': MEMBERS,
  'projects.update': LEAD_KNOWN_TO_CLIENT,
  'projects.delete': LEAD_KNOWN_TO_CLIENT,
  'projects.overview': TEAM,
  'projects.set-study-area': LEAD,
  'members.list': TEAM,
  'members.add': LEAD,
  'members.update': LEAD,
  'members.remove': LEAD,
  'scenes.list': TEAM,
  'scenes.create': LEAD_MODELLER,
  'scenes.read': TEAM,
  'scenes.update': LEAD_MODELLER,
  'scenes.delete': LEAD_MODELLER,
  'scenes.cancel': LEAD_MODELLER,
  'scenes.tile': TEAM,
  'scenes.probe': TEAM,
  'classes.list': TEAM,
  'classes.create': LEAD,
  'classes.order': LEAD,
  'classes.update': LEAD,
  'classes.delete': LEAD,
  'samples.list': TEAM,
  'samples.create': DRAWS,
  'samples.measure': TEAM,
  'samples.grow': DRAWS,
  'samples.judge': TEAM,
  'signatures.read': TEAM,
  'samples.read': TEAM,
  'samples.update': MAKER_OR_LEAD,
  'samples.delete': MAKER_OR_LEAD,
  'samples.restore': MAKER_OR_LEAD,
  'samples.history': TEAM,
  'samples.submit': DRAWS,
  'samples.review': LEAD,
  'samples.thread': TEAM,
  'samples.remark': TEAM,
  'remarks.resolve': MAKER_OR_LEAD,
  'blocks.list': TEAM,
  'blocks.cut': LEAD,
  'blocks.draw': LEAD,
  'blocks.assign': LEAD,
  'blocks.update': LEAD,
  'blocks.delete': LEAD,
  'blocks.move': DRAWS,
  'blocks.agreement': TEAM,
  'blocks.settle': LEAD,
  'presence.list': TEAM,
  'presence.say': TEAM,
  'presence.leave': TEAM,
  'runs.list': TEAM,
  'runs.start': LEAD_MODELLER,
  'runs.check': LEAD_MODELLER,
  'runs.read': TEAM,
  'runs.delete': LEAD_MODELLER,
  'runs.cancel': LEAD_MODELLER,
  'runs.retry': LEAD_MODELLER,
  'runs.reproduce': LEAD_MODELLER,
  'runs.reproductions': TEAM,
  'jobs.queue': TEAM,
  'jobs.prioritise': LEAD_MODELLER,
  'jobs.log': TEAM,
  'jobs.log-text': TEAM,
  'jobs.cancel': LEAD_MODELLER,
  'jobs.site-queue': SITE_ADMIN,
  'jobs.order-site-queue': SITE_ADMIN,
  'recipes.list': TEAM,
  'recipes.create': LEAD_MODELLER,
  'recipes.update': LEAD_MODELLER,
  'recipes.delete': LEAD_MODELLER,
  'recipes.diff': TEAM,
  'tunings.list': LEAD_MODELLER,
  'tunings.start': LEAD_MODELLER,
  'tunings.read': LEAD_MODELLER,
  'tunings.delete': LEAD_MODELLER,
  'runs.compare': ACCURACY,
  'post-processing.read': TEAM,
  'post-processing.change': LEAD_MODELLER,
  'post-processing.preview': LEAD_MODELLER,
  'post-processing.preview-tile': LEAD_MODELLER,
  'runs.tile': TEAM,
  'runs.probe': TEAM,
  'runs.votes': TEAM,
  'runs.layer-tile': TEAM,
  'runs.layer': TEAM,
  'runs.class-map': TEAM,
  'runs.class-map-package': TEAM,
  'accuracy.read': ACCURACY,
  'accuracy.csv': ACCURACY,
  'accuracy.cell': ACCURACY,
  'designs.plan': LEAD_REVIEWER,
  'designs.create': LEAD_REVIEWER,
  'designs.augment': LEAD_REVIEWER,
  'designs.list': ACCURACY,
  'designs.read': ACCURACY,
  'designs.delete': LEAD_REVIEWER,
  'designs.open': LEAD_REVIEWER,
  'designs.adjudicate': LEAD_REVIEWER,
  'designs.close': LEAD_REVIEWER,
  'designs.next': REVIEWER,
  'designs.point': REVIEWER,
  'designs.import': REVIEWER,
  'designs.import-file': REVIEWER,
  'designs.disagreements': REVIEWER,
  'reference-points.answer': REVIEWER,
  'reference-points.skip': REVIEWER,
  'reference-points.decide': REVIEWER,
  'designs.estimates': ACCURACY,
  'designs.estimates-csv': ACCURACY,
  'designs.agreement': ACCURACY,
  'designs.cell': ACCURACY,
  'designs.compare-kappas': ACCURACY,
  'designs.sheet': ACCURACY,
  'designs.zones': ACCURACY,
  'zone-layers.list': ACCURACY,
  'zone-layers.add': LEAD_REVIEWER,
  'zone-layers.delete': LEAD_REVIEWER,
  'designs.compare': ACCURACY,
  'designs.points-csv': ACCURACY,
  'events.stream': TEAM,
  'openapi.read': PUBLIC,
};

let test: TestApp;
let team: Team;
let admin: User;
let params: Record<string, string>;
let runId = '';
const cookies = new Map<Actor, string>();

function userOf(actor: Exclude<Actor, 'signed out'>): User {
  return actor === 'admin' ? admin : team[actor];
}

async function signIn(actor: Actor): Promise<string> {
  if (actor === 'signed out') return '';
  const answer = await fetch(`${test.url}/api/v1/session`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json' },
    body: JSON.stringify({ email: userOf(actor).email, password: PASSWORD }),
  });
  expect(answer.status, `signing in as ${actor}`).toBe(200);
  return answer.headers.getSetCookie()[0]?.split(';')[0] ?? '';
}

beforeAll(async () => {
  test = await openTestApp();
  team = await makeTeam(test.app);
  admin = await makeUser(test.app, { siteAdmin: true });
  const ground = await makeRunGround(test.app, team.project);
  const sample = ground.samples[0]!;
  await test.app.db.getRepository(Sample).update({ id: sample.id }, { createdById: team.labeller.id });
  const project = (await findProject(test.app, team.project.id))!;
  const run = await startRun(test.app, project, team.modeller.id, { name: '', note: '', recipe: ground.recipe });
  runId = run.id;
  expect((await waitForRun(await test.signedIn(team.lead), run.id)).job.state).toBe('finished');
  // Closed, so that no map is withheld from the reviewer.
  const design = await createDesign(test.app, project.id, team.lead.id, {
    ...{ runId, strata: 'map-classes', expected: [], expectedOtherwise: 0.8, name: '', minSpacingMeters: 0 },
    ...{ target: { kind: 'total', total: 6 }, allocation: { kind: 'equal' }, answersPerPoint: 2 },
  });
  await test.app.db
    .getRepository(ReferenceDesign)
    .update({ id: design.id }, { state: 'closed', digest: '0'.repeat(64), closedAt: new Date() });
  const point = await test.app.db.getRepository(ReferencePoint).findOneByOrFail({ designId: design.id, number: 1 });
  const member = await test.app.db.getRepository(Membership).findOneByOrFail({ userId: team.reviewer.id });
  params = {
    ...{ projectId: project.id, sceneId: ground.scene.id, classId: ground.classes[0]!.id, sampleId: sample.id, runId },
    ...{ memberId: member.id, accountId: (await makeUser(test.app)).id, secret: 'no-such-secret-anywhere-at-all' },
    ...{ jobId: run.jobId, recipeId: await makeSpareRecipe(), tuningId: await makeSpareTuning() },
    previewId: (
      await previewPostProcessing(test.app, (await findRun(test.app, runId))!, [], new AbortController().signal)
    ).previewId,
    ...{ layer: 'confidence', z: '4', x: '7', y: '4', designId: design.id, pointId: point.id, number: '1' },
    ...{ remarkId: await makeSpareRemark(sample.id), blockId: await makeSpareBlock() },
  };
  for (const actor of ACTORS) cookies.set(actor, await signIn(actor));
}, 120_000);
afterAll(() => test.close());

async function makeSpareRecipe(): Promise<string> {
  const { recipe } = await test.app.db.getRepository(Run).findOneByOrFail({ id: runId });
  const input = { name: randomUUID(), note: '', recipe };
  return (await createNamedRecipe(test.app, team.project.id, team.lead.id, input)).id;
}

async function makeSpareRemark(sampleId: string): Promise<string> {
  const remarks = test.app.db.getRepository(SampleRemark);
  const none = { byId: null, resolvedAt: null, resolvedById: null };
  return (await remarks.save(remarks.create({ sampleId, kind: 'comment', text: 'Is it?', ...none }))).id;
}

/** Far from every sample. */
async function makeSpareBlock(): Promise<string> {
  const corners = [
    [100, 10],
    [100, 11],
    [101, 11],
    [100, 10],
  ] as [number, number][];
  return (await makeBlock(test.app, team.project, { type: 'Polygon', coordinates: [corners] }, [])).id;
}

/** A search that ended before it found anything. */
async function makeSpareTuning(): Promise<string> {
  const { recipe, classes } = await test.app.db.getRepository(Run).findOneByOrFail({ id: runId });
  const id = randomUUID();
  const plan = { method: 'grid', nTrials: 2, folds: 2, blockMeters: 100, seed: 1 } as const;
  await test.app.db.getRepository(Tuning).insert({
    ...{
      id,
      projectId: team.project.id,
      name: '',
      recipe,
      plan: { ...plan, ranges: [{ parameter: 'trees', values: [10] }] },
      classes,
      studyArea: null,
    },
    ...{ samples: [], notes: [], trials: [], jobId: null, startedById: null },
  });
  return id;
}

/** A finished run that may be deleted. */
async function makeSpareRun(): Promise<string> {
  const runs = test.app.db.getRepository(Run);
  const run = await runs.findOneByOrFail({ id: runId });
  const jobs = test.app.db.getRepository(Job);
  const job = await jobs.findOneByOrFail({ id: run.jobId });
  const [id, jobId] = [randomUUID(), randomUUID()];
  await jobs.insert({ ...job, id: jobId, runId: id });
  await runs.insert({ ...run, id, jobId, number: Math.floor(Math.random() * 1e6) + 1000, result: null } as never);
  return id;
}

async function makeSpareMember(): Promise<string> {
  const user = await makeUser(test.app);
  await makeMembership(test.app, team.project, user, 'labeller');
  return (await test.app.db.getRepository(Membership).findOneByOrFail({ userId: user.id })).id;
}

async function makeSpareLayer(): Promise<string> {
  const layers = test.app.db.getRepository(ZoneLayer);
  const made = layers.create({ projectId: team.project.id, name: 'Parishes', zones: [], createdById: null });
  return (await layers.save(made)).id;
}

/** What a route acts on where an allowed request would use it up. */
const SPARE: Record<string, () => Promise<Record<string, string>>> = {
  'runs.delete': async () => ({ runId: await makeSpareRun() }),
  'recipes.delete': async () => ({ recipeId: await makeSpareRecipe() }),
  'tunings.delete': async () => ({ tuningId: await makeSpareTuning() }),
  'blocks.delete': async () => ({ blockId: await makeSpareBlock() }),
  'members.remove': async () => ({ memberId: await makeSpareMember() }),
  'zone-layers.delete': async () => ({ layerId: await makeSpareLayer() }),
};
/** Queries that make a read complete; bodies stay empty, so that writes end at validation, after authority was decided. */
const QUERY: Record<string, () => string> = {
  'scenes.probe': () => '?lon=-15&lat=60',
  'designs.compare': () => `?runId=${runId}`,
  'designs.compare-kappas': () => `?designId=${runId}`,
  'designs.zones': () => `?layerId=${runId}`,
  'designs.cell': () => `?mapped=1&reference=${params['classId']}`,
  'recipes.diff': () => `?left=run:${runId}&right=run:${runId}`,
  'runs.probe': () => '?lon=-15&lat=60',
  'runs.compare': () => `?first=${runId}&second=${runId}`,
  'runs.votes': () => '?lon=-15&lat=60',
  'accuracy.cell': () => `?mapped=${params['classId']}&reference=${params['classId']}`,
};

async function ask(route: Route, actor: Actor): Promise<number> {
  const own = { ...params, ...(await SPARE[route.id]?.()) };
  const path = route.path.replace(/:(\w+)/g, (_all, name: string) => own[name] ?? `missing-${name}`);
  const cookie = route.id.startsWith('session.delete') ? await signIn(actor) : (cookies.get(actor) ?? '');
  const abort = new AbortController();
  const answer = await fetch(`${test.url}/api/v1${path}${QUERY[route.id]?.() ?? ''}`, {
    method: route.method.toUpperCase(),
    headers: { cookie, ...(route.method === 'get' || route.multipart ? {} : { 'Content-Type': 'application/json' }) },
    ...(route.method === 'get' || route.multipart ? {} : { body: '{}' }),
    signal: abort.signal,
  });
  abort.abort();
  return answer.status;
}

/** Signing out everywhere ends the sessions that the other rows use, so it comes last. */
const inOrder = routes.toSorted(
  (a, b) => Number(a.id.startsWith('session.delete')) - Number(b.id.startsWith('session.delete')),
);

function fits(outcome: Outcome, status: number): boolean {
  if (outcome !== 'in') return status === outcome;
  return status < 500 && ![401, 403, 404].includes(status);
}

describe('authority', () => {
  it('has a row for every route, and no row without one', () => {
    expect(Object.keys(TABLE).sort()).toEqual(routes.map(({ id }) => id).sort());
  });

  it.each(inOrder.map((route) => [route.id, route] as const))(
    'of %s is what the table says for everyone',
    async (id, route) => {
      const expected = TABLE[id];
      const wrong: string[] = [];
      for (const actor of ACTORS) {
        const status = await ask(route, actor);
        if (!expected || !fits(expected[actor], status))
          wrong.push(`${actor}: got ${status}, wanted ${expected?.[actor]}`);
      }
      expect(wrong).toEqual([]);
    },
  );

  it('hides what belongs to another project behind the same answer as what never was', async () => {
    const other = await makeTeam(test.app);
    const stranger = await test.signedIn(other.lead);
    for (const path of [
      `/scenes/${params['sceneId']}`,
      `/samples/${params['sampleId']}`,
      `/runs/${runId}`,
      `/runs/${runId}/accuracy`,
      `/designs/${params['designId']}`,
      `/designs/${params['designId']}/estimates`,
    ]) {
      const hidden = await stranger.get(`/api/v1${path}`).expect(404);
      const never = await stranger.get(`/api/v1${path.replace(/[0-9a-f-]{36}/, randomUUID())}`).expect(404);
      expect(hidden.body).toEqual(never.body);
    }
  });
});
