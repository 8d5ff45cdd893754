import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { routes } from '../../server/routes/index.ts';
import type { Route } from '../../server/routes/route.ts';
import type { BlindPoint, Design, NextPoint } from '../../shared/contracts/reference.ts';
import type { Run } from '../../shared/contracts/run.ts';
import { makeMembership, makeTeam } from '../factories/make-project.ts';
import { makeRunGround, type RunGround } from '../factories/make-run-ground.ts';
import { makeUser } from '../factories/make-user.ts';
import { openTestApp, type Agent, type TestApp } from '../factories/test-app.ts';
import { waitForRun } from '../factories/wait-for-run.ts';

const API = '/api/v1';
const NOWHERE = '00000000-0000-4000-8000-000000000000';
const WITHHELD = { code: 'withheld-while-interpreting' };

/**
 * Routes of a run that somebody who interprets may use, and why they tell nothing of its map. Any other route of a run is
 * withheld with `hideWhileInterpreting`.
 */
const OPEN: Record<string, string> = {
  'runs.read': 'is answered without areas, accuracy and notes on the result',
  'runs.delete': 'answers nothing',
  'runs.cancel': 'the run has no map yet',
  'runs.retry': 'the run has no map',
  'runs.reproduce': 'compares digests of maps',
  'runs.reproductions': 'compares digests of maps',
};

/** Other words of an address or a name that smell of a map made by a run. */
const SUSPECT =
  /compar|margin|confidence|vote|post|vector|difference|change-map|importance|class-map|guid|place|suggest|cluster|cutoff|prediction/i;
/** Suspects that tell nothing of a map. */
const CLEARED: Record<string, string> = {};

let test: TestApp;
let ground: RunGround;
let lead: Agent;
/** Leads, models and reviews: only the blind check can keep a map from them. */
let everyone: Agent;
let run: Run;
let design: Design;
let point: BlindPoint;

const isOfRun = ({ path }: Route) => path.includes(':runId');
const isSuspect = ({ id, path }: Route) => isOfRun({ path } as Route) || SUSPECT.test(`${id} ${path}`);

/** Queries of routes that ask for some. */
function queryOf({ id }: Route): string {
  const [west, south, east, north] = run.bounds!;
  const [one] = ground.classes;
  if (/probe|votes/.test(id)) return `?lon=${(west + east) / 2}&lat=${(south + north) / 2}`;
  if (id === 'accuracy.cell') return `?mapped=${one!.id}&reference=${one!.id}`;
  if (id === 'designs.cell') return `?mapped=${one!.code}&reference=${one!.id}`;
  if (/compare|kappas/.test(id)) return `?runId=${run.id}`;
  return '';
}

function urlOf(route: Route): string {
  const params: Record<string, string> = {
    ...{ projectId: run.projectId, runId: run.id, sceneId: ground.scene.id, designId: design.id },
    ...{ z: '4', x: '7', y: '4', layer: 'confidence' },
  };
  return `${API}${route.path.replace(/:(\w+)/g, (_all, name: string) => params[name] ?? NOWHERE)}${queryOf(route)}`;
}

beforeAll(async () => {
  test = await openTestApp();
  const team = await makeTeam(test.app);
  ground = await makeRunGround(test.app, team.project);
  const person = await makeUser(test.app);
  await makeMembership(test.app, team.project, person, 'lead', 'modeller', 'reviewer');
  lead = await test.signedIn(team.lead);
  everyone = await test.signedIn(person);
  const path = `${API}/projects/${team.project.id}`;
  const recipe = { ...ground.recipe, maxPixelsPerClass: 40 };
  const started = (await everyone.post(`${path}/runs`).send({ recipe }).expect(201)).body as Run;
  run = await waitForRun(everyone, started.id);
  expect(run.job.state).toBe('finished');
  const drawn = { runId: run.id, target: { kind: 'total', total: 12 }, allocation: { kind: 'equal' }, seed: 3 };
  design = (await lead.post(`${path}/designs`).send(drawn).expect(201)).body as Design;
}, 120_000);
afterAll(() => test.close());

describe('what a run has made of the land', () => {
  /** Those that answered before the design was open. */
  const shown = new Set<string>();
  const reads = routes.filter((route) => route.method === 'get' && route.isHiddenWhileInterpreting && isOfRun(route));

  it('is withheld by every route of a run, but for those that tell nothing of its map', () => {
    const left = routes.filter((route) => isOfRun(route) && !route.isHiddenWhileInterpreting && !OPEN[route.id]);
    expect(left.map(({ id }) => id)).toEqual([]);
    const known = new Set(routes.map(({ id }) => id));
    expect(Object.keys(OPEN).filter((id) => !known.has(id))).toEqual([]);
  });

  it('is withheld by every other route whose name speaks of a map, its confidence or its change', () => {
    const left = routes.filter(
      (route) => isSuspect(route) && !route.isHiddenWhileInterpreting && !OPEN[route.id] && !CLEARED[route.id],
    );
    expect(left.map(({ id }) => id)).toEqual([]);
    expect(Object.keys(CLEARED).filter((id) => !routes.some((route) => route.id === id))).toEqual([]);
  });

  it('is shown to the same person while no design is open (control)', async () => {
    for (const route of reads) {
      const { status, body } = await everyone.get(urlOf(route));
      expect(body, route.id).not.toMatchObject(WITHHELD);
      if (status === 200) shown.add(route.id);
    }
    expect([...shown]).toEqual(expect.arrayContaining(['runs.tile', 'runs.probe', 'runs.class-map', 'accuracy.read']));
  });

  it('is refused by each of these routes once a design is open, whatever other role the person holds', async () => {
    await lead.post(`${API}/designs/${design.id}/open`).send({}).expect(200);
    ({ point } = (await everyone.get(`${API}/designs/${design.id}/next`).expect(200)).body as Required<NextPoint> & {
      point: BlindPoint;
    });
    for (const route of reads) {
      const { status, body } = await everyone.get(urlOf(route));
      // A query or a part of the address this walk does not know is refused before anything is read.
      if (shown.has(route.id)) expect(body, route.id).toMatchObject(WITHHELD);
      else expect([400, 403, 404], route.id).toContain(status);
    }
    expect(shown.size).toBeGreaterThan(5);
  });

  it('is in no answer of any route that reads', async () => {
    // Under the names a run gives them: a bare 5.76 may as well be part of the time of day.
    const figures = run.areas!.flatMap(({ areaHa, pixels }) => [`"areaHa":${areaHa}`, `"pixels":${pixels}`]);
    expect(figures.length).toBeGreaterThan(4);
    const before = JSON.stringify((await lead.get(`${API}/runs/${run.id}`).expect(200)).body);
    expect(figures.every((figure) => before.includes(figure))).toBe(true);
    const answered: string[] = [];
    for (const route of routes) {
      if (route.method !== 'get' || /^events|openapi/.test(route.id)) continue;
      const url = urlOf(route).replace(`/points/${NOWHERE}`, `/points/${point.number}`);
      const { status, body, text } = await everyone.get(url);
      const said = `${JSON.stringify(body)}${text ?? ''}`;
      if (status === 200) answered.push(route.id);
      for (const figure of figures) expect(said.includes(figure), `${route.id} says ${figure}`).toBe(false);
    }
    expect(answered).toEqual(expect.arrayContaining(['runs.list', 'runs.read', 'projects.overview', 'designs.point']));
  });

  it('is shown again once the design is closed', async () => {
    await lead.post(`${API}/designs/${design.id}/adjudicate`).send({}).expect(200);
    const disputed = routes.filter(({ id }) => id === 'runs.class-map' || id === 'accuracy.read');
    for (const route of disputed) expect((await everyone.get(urlOf(route))).body, route.id).toMatchObject(WITHHELD);
    await lead.post(`${API}/designs/${design.id}/close`).send({ leaveUnsettled: true }).expect(200);
    for (const route of disputed) await everyone.get(urlOf(route)).expect(200);
  });
});
