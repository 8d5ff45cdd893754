import { randomUUID } from 'node:crypto';
import { execFile, execFileSync } from 'node:child_process';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Job } from '../../server/entities/job.ts';
import { ReferenceAnswer } from '../../server/entities/reference-answer.ts';
import { ReferenceDesign } from '../../server/entities/reference-design.ts';
import { ReferencePoint } from '../../server/entities/reference-point.ts';
import { Run as RunEntity } from '../../server/entities/run.ts';
import type { User } from '../../server/entities/user.ts';
import { routes } from '../../server/routes/index.ts';
import type {
  Agreement,
  BlindPoint,
  Design,
  DesignList,
  DesignPlan,
  Disagreement,
  Estimates,
  ImportReport,
  MapComparison,
  NextPoint,
} from '../../shared/contracts/reference.ts';
import type { Overview } from '../../shared/contracts/project.ts';
import type { Run } from '../../shared/contracts/run.ts';
import { makeMembership, makeTeam, type Team } from '../factories/make-project.ts';
import { makeRunGround, type RunGround } from '../factories/make-run-ground.ts';
import { makeUser } from '../factories/make-user.ts';
import { readBytes } from '../factories/read-bytes.ts';
import { openTestApp, type Agent, type TestApp } from '../factories/test-app.ts';
import { waitForRun } from '../factories/wait-for-run.ts';

const SIDE = 96;
const NODATA = 255;
const NOWHERE = '00000000-0000-4000-8000-000000000000';
const API = '/api/v1';

let test: TestApp;
let team: Team;
let ground: RunGround;
let second: User;
let lead: Agent;
let modeller: Agent;
let reviewer: Agent;
let reviewer2: Agent;
let runId: string;
let projectPath: string;
/** Codes of the class map, row-major, as GDAL reads them from the download. */
let codes: Buffer;

async function readCodes(ofRun: string): Promise<Buffer> {
  const dir = await mkdtemp(join(tmpdir(), 'groundsel-designs-'));
  try {
    await writeFile(join(dir, 'map.tif'), await readBytes(modeller, `${API}/runs/${ofRun}/class-map.tif`));
    await promisify(execFile)('gdal_translate', ['-q', '-of', 'ENVI', join(dir, 'map.tif'), join(dir, 'raw')]);
    return await readFile(join(dir, 'raw'));
  } finally {
    await rm(dir, { recursive: true, force: true });
  }
}

const pointsOf = (designId: string) =>
  test.app.db.getRepository(ReferencePoint).find({ where: { designId }, order: { number: 'ASC' } });

const askFor = (total: number) => ({
  ...{ runId, target: { kind: 'total', total }, allocation: { kind: 'minimum', atLeast: 6 }, seed: 11 },
});

async function draw(body: object): Promise<Design> {
  return (await lead.post(`${projectPath}/designs`).send(body).expect(201)).body as Design;
}

/** The class on the ground: the test scene has three covers side by side. */
function truthAt({ pixelColumn }: ReferencePoint) {
  return ground.classes[Math.min(2, Math.floor((pixelColumn * 3) / SIDE))]!;
}

beforeAll(async () => {
  test = await openTestApp();
  team = await makeTeam(test.app, { targetOverallAccuracy: 0.5 });
  second = await makeUser(test.app);
  await makeMembership(test.app, team.project, second, 'reviewer');
  ground = await makeRunGround(test.app, team.project);
  projectPath = `${API}/projects/${team.project.id}`;
  lead = await test.signedIn(team.lead);
  modeller = await test.signedIn(team.modeller);
  reviewer = await test.signedIn(team.reviewer);
  reviewer2 = await test.signedIn(second);
  // Few trees on few pixels, so that the map makes mistakes.
  const recipe = {
    ...ground.recipe,
    maxPixelsPerClass: 40,
    classifier: { kind: 'random-forest', trees: 3, maxDepth: 4, minLeaf: 1, featuresPerTree: 1 },
  };
  const { body } = await modeller.post(`${projectPath}/runs`).send({ recipe }).expect(201);
  runId = (body as Run).id;
  expect((await waitForRun(modeller, runId)).job.state).toBe('finished');
  codes = await readCodes(runId);
}, 120_000);
afterAll(() => test.close());

describe('planning', () => {
  it('gives the strata of the map, and the least n whose expected standard error reaches the target', async () => {
    const { body } = await reviewer
      .post(`${projectPath}/designs/plan`)
      .send({
        ...{ runId, target: { kind: 'standard-error', standardError: 0.03 }, allocation: { kind: 'neyman' } },
        expected: ground.classes.map(({ id }, i) => ({ classId: id, users: [0.9, 0.7, 0.6][i] })),
      })
      .expect(200);
    const plan = body as DesignPlan;
    const counted = ground.classes.map(({ code }) => codes.filter((value) => value === code).length);
    expect(plan.strata.map(({ pixels }) => pixels)).toEqual(counted);
    const total = counted.reduce((sum, n) => sum + n, 0);
    plan.strata.forEach(({ share }, i) => expect(share).toBeCloseTo(counted[i]! / total, 9));
    // Olofsson et al. 2014, eq. 13, and eq. 5 for what the allocation gives.
    const users = [0.9, 0.7, 0.6];
    const spread = plan.strata.reduce((sum, { share }, i) => sum + share * Math.sqrt(users[i]! * (1 - users[i]!)), 0);
    const variance = plan.strata.reduce((sum, { share }, i) => sum + share * users[i]! * (1 - users[i]!), 0);
    expect(plan.nOfTarget).toBe(Math.ceil(spread ** 2 / (0.03 ** 2 + variance / total)));
    const error = Math.sqrt(
      plan.strata.reduce(
        (sum, { share, points }, i) => sum + (share ** 2 * users[i]! * (1 - users[i]!)) / (points - 1),
        0,
      ),
    );
    expect(plan.standardError).toBeCloseTo(error, 12);
    expect(error).toBeLessThanOrEqual(0.03);
    // Not a point more than needed, but for the rounding of the allocation.
    expect(plan.n - plan.nOfTarget).toBeLessThan(10);
    const errors = plan.curve.map(({ standardError }) => standardError ?? Infinity);
    expect(errors).toEqual(errors.toSorted((a, b) => b - a));
  });

  it('refuses a run of another project, a class that is not on the map and nonsense', async () => {
    const send = (body: object) => lead.post(`${projectPath}/designs/plan`).send(body);
    await send({ ...askFor(30), seed: undefined, runId: NOWHERE }).expect(400);
    const { seed: _seed, ...plan } = askFor(30);
    await send({ ...plan, expected: [{ classId: NOWHERE, users: 0.5 }] }).expect(400);
    await send({ ...plan, target: { kind: 'half-width', halfWidth: -1 } }).expect(400);
    await send(plan).expect(200);
  });
});

describe('drawing', () => {
  it('takes pixels of each stratum from the map without replacement, the same for the same seed', async () => {
    const design = await draw(askFor(60));
    const points = await pointsOf(design.id);
    expect(points).toHaveLength(design.n);
    for (const { pixelRow, pixelColumn, mappedCode } of points) {
      expect(codes[pixelRow * SIDE + pixelColumn]).toBe(mappedCode);
      expect(mappedCode).not.toBe(NODATA);
    }
    expect(new Set(points.map(({ pixelRow, pixelColumn }) => `${pixelRow}/${pixelColumn}`)).size).toBe(points.length);
    design.strata!.forEach((stratum, h) =>
      expect(points.filter((point) => point.stratum === h)).toHaveLength(stratum.points),
    );
    const again = await pointsOf((await draw(askFor(60))).id);
    const places = (rows: ReferencePoint[]) => rows.map((p) => [p.number, p.pixelRow, p.pixelColumn, p.mappedCode]);
    expect(places(again)).toEqual(places(points));
    const other = await pointsOf((await draw({ ...askFor(60), seed: 12 })).id);
    expect(places(other)).not.toEqual(places(points));
  });

  it('numbers points so that a number tells nothing of the stratum', async () => {
    const points = await pointsOf((await draw(askFor(60))).id);
    const changes = points.filter((point, i) => i > 0 && point.stratum !== points[i - 1]!.stratum).length;
    expect(changes).toBeGreaterThan(15);
    expect(points.map(({ number }) => number)).toEqual(points.map((_, i) => i + 1));
  });

  it('augments a draft to one that holds all its points', async () => {
    const small = await draw(askFor(40));
    const before = await pointsOf(small.id);
    const { target, allocation } = askFor(90);
    const { body } = await lead.post(`${API}/designs/${small.id}/augment`).send({ target, allocation }).expect(200);
    expect((body as Design).n).toBe(90);
    const after = new Set((await pointsOf(small.id)).map((p) => `${p.pixelRow}/${p.pixelColumn}`));
    expect(after.size).toBe(90);
    expect(before.every((p) => after.has(`${p.pixelRow}/${p.pixelColumn}`))).toBe(true);
    await lead.post(`${API}/designs/${small.id}/augment`).send({ target, allocation }).expect(400);
  });

  it('keeps a least distance and says what that does, or says that there is no room', async () => {
    const design = await draw({ ...askFor(40), minSpacingMeters: 150 });
    expect(design.spacingEffect).toContain('no longer a simple random sample');
    const points = await pointsOf(design.id);
    for (const [i, a] of points.entries()) {
      for (const b of points.slice(i + 1)) {
        const meters = 30 * Math.hypot(a.pixelRow - b.pixelRow, a.pixelColumn - b.pixelColumn);
        expect(meters).toBeGreaterThanOrEqual(150);
      }
    }
    const refused = await lead
      .post(`${projectPath}/designs`)
      .send({ ...askFor(60), minSpacingMeters: 2_000 })
      .expect(400);
    expect(refused.body).toMatchObject({ code: 'spacing-too-large' });
  });

  it('keeps the run that a design rests on', async () => {
    await draw(askFor(20));
    expect((await lead.delete(`${API}/runs/${runId}`).expect(409)).body).toMatchObject({ code: 'in-use' });
  });
});

/** Answers all points that wait for somebody; `say` gives the class of a point. */
async function interpret(
  agent: Agent,
  designId: string,
  say: (point: ReferencePoint) => { classId: string; alternateClassId?: string } | null,
): Promise<number[]> {
  const byNumber = new Map((await pointsOf(designId)).map((point) => [point.number, point]));
  const order: number[] = [];
  for (;;) {
    const { point } = (await agent.get(`${API}/designs/${designId}/next`).expect(200)).body as NextPoint;
    if (!point) return order;
    order.push(point.number);
    const answer = say(byNumber.get(point.number)!);
    if (answer)
      await agent
        .put(`${API}/points/${point.id}/answer`)
        .send({ ...answer, seconds: 4 })
        .expect(200);
    else return order;
  }
}

describe('the blind check', () => {
  let design: Design;
  let path: string;
  let points: ReferencePoint[];

  beforeAll(async () => {
    design = await draw(askFor(36));
    path = `${API}/designs/${design.id}`;
    points = await pointsOf(design.id);
  });

  it('takes no answer before the design is open, and no change of points afterwards', async () => {
    expect((await reviewer.get(`${path}/next`).expect(409)).body).toMatchObject({ code: 'not-open' });
    const opened = (await lead.post(`${path}/open`).send({}).expect(200)).body as Design;
    expect(opened.digest).toMatch(/^[0-9a-f]{64}$/);
    expect(opened.state).toBe('open');
    const frozen = { code: 'design-frozen' };
    const { target, allocation } = askFor(90);
    expect((await lead.post(`${path}/augment`).send({ target, allocation }).expect(409)).body).toMatchObject(frozen);
    expect((await lead.delete(path).expect(409)).body).toMatchObject(frozen);
    expect((await lead.post(`${path}/open`).send({}).expect(409)).body).toMatchObject(frozen);
    expect(await pointsOf(design.id)).toEqual(points);
  });

  it('withholds maps of the project from interpreters, and from nobody else', async () => {
    const withheld = { code: 'withheld-while-interpreting' };
    const [west, south, east, north] = (await lead.get(`${API}/runs/${runId}`).expect(200)).body.bounds as number[];
    const middle = `lon=${(west! + east!) / 2}&lat=${(south! + north!) / 2}`;
    for (const tail of [
      ...['tiles/4/7/4.webp', `probe?${middle}`, 'class-map.tif', 'class-map.zip', 'accuracy', 'accuracy.csv'],
      ...[`votes?${middle}`, 'layers/margin.tif', 'layers/confidence/tiles/4/7/4.webp'],
      `accuracy/cell?mapped=${ground.classes[0]!.id}&reference=${ground.classes[0]!.id}`,
    ]) {
      expect((await reviewer.get(`${API}/runs/${runId}/${tail}`).expect(403)).body, tail).toMatchObject(withheld);
      await modeller.get(`${API}/runs/${runId}/${tail}`).expect(200);
    }
    const { seed: _seed, ...plan } = askFor(30);
    expect((await reviewer.post(`${projectPath}/designs/plan`).send(plan).expect(403)).body).toMatchObject(withheld);
    await lead.post(`${projectPath}/designs/plan`).send(plan).expect(200);
    const seen = (await reviewer.get(`${API}/runs/${runId}`).expect(200)).body as Run;
    expect(seen).toMatchObject({ areas: null, overallAccuracy: null });
    expect(((await lead.get(`${API}/runs/${runId}`).expect(200)).body as Run).areas).not.toBeNull();
    expect((await reviewer.get(`${projectPath}/overview`).expect(200)).body).toMatchObject({
      figures: { bestRun: null },
    });
    const list = (await reviewer.get(`${projectPath}/designs`).expect(200)).body as DesignList;
    expect(list.mapsWithheld).toBe(true);
    expect(list.designs.every(({ strata, seed }) => strata === null && seed === null)).toBe(true);
    // Someone who leads and interprets is an interpreter.
    const both = await makeUser(test.app);
    await makeMembership(test.app, team.project, both, 'lead', 'reviewer');
    await (await test.signedIn(both)).get(`${API}/runs/${runId}/class-map.tif`).expect(403);
  });

  it('tells an interpreter the mapped class in the answer of no route', async () => {
    // Nothing a map says may come back, so the map is made to say something that is found nowhere else.
    const MARK = 7_654_321;
    const repository = test.app.db.getRepository(ReferencePoint);
    await repository.update({ designId: design.id }, { mappedCode: MARK });
    try {
      const point = points[0]!;
      const params: Record<string, string> = {
        ...{ projectId: team.project.id, runId, designId: design.id, number: String(point.number), pointId: point.id },
        ...{ sceneId: ground.scene.id, classId: ground.classes[0]!.id, sampleId: ground.samples[0]!.id },
        ...{ z: '4', x: '7', y: '4', memberId: NOWHERE, accountId: NOWHERE, secret: 'none' },
      };
      const reads = routes.filter(
        ({ method, path: at, id }) => method === 'get' && at.includes(':') && !id.startsWith('events'),
      );
      expect(reads.length).toBeGreaterThan(25);
      const answered: string[] = [];
      for (const { id, path: at } of reads) {
        const url = at.replace(/:(\w+)/g, (_all, name: string) => params[name] ?? `missing-${name}`);
        const query = id.endsWith('probe') ? `?lon=${point.lon}&lat=${point.lat}` : '';
        const { status, body, text } = await reviewer.get(`${API}${url}${query}`);
        if (status === 200) answered.push(id);
        const said = `${JSON.stringify(body)}${text ?? ''}`;
        expect(said, id).not.toContain(String(MARK));
        expect(said, id).not.toMatch(/mappedCode|mapped_code|"stratum"|drawOrder/);
      }
      expect(answered).toEqual(expect.arrayContaining(['designs.next', 'designs.point', 'designs.read', 'runs.read']));
      expect(answered.filter((id) => /tile|probe|class-map|accuracy|estimates|agreement|disagree/.test(id))).toEqual([
        ...['scenes.tile', 'scenes.probe'],
      ]);
      const sheet = await reviewer.get(`${path}/points.csv`).expect(200);
      expect(sheet.text.split('\n')[0]).toBe('\uFEFFnumber,lon,lat,class_code,alternate_code,confidence,note');
    } finally {
      for (const { id, mappedCode } of points) await repository.update({ id }, { mappedCode });
    }
  });

  it('asks two people in orders of their own, hides what the other said, and takes corrections and skips', async () => {
    const first = (await reviewer.get(`${path}/next`).expect(200)).body as NextPoint;
    expect(first.progress).toMatchObject({ answered: 0, skipped: 0, left: 36, total: 36, secondsPerPoint: null });
    const skipped = (await reviewer.post(`${API}/points/${first.point!.id}/skip`).send({}).expect(200))
      .body as NextPoint;
    expect(skipped.point!.number).not.toBe(first.point!.number);
    expect(skipped.progress).toMatchObject({ skipped: 1, left: 36 });
    const order = await interpret(reviewer, design.id, (point) => ({ classId: truthAt(point).id }));
    expect(order.at(-1)).toBe(first.point!.number);
    expect(new Set(order).size).toBe(36);
    const unseen = (await reviewer2.get(`${path}/points/${first.point!.number}`).expect(200)).body as BlindPoint;
    expect(unseen).toMatchObject({ answer: null, skipped: false, takesAnswer: true });
    const [lon, lat] = unseen.position;
    const [[sw]] = [unseen.outline.coordinates];
    expect(sw).toHaveLength(5);
    expect(unseen.bounds[0] < lon && lon < unseen.bounds[2] && unseen.bounds[1] < lat && lat < unseen.bounds[3]).toBe(
      true,
    );
    const otherOrder = await interpret(reviewer2, design.id, (point) => {
      const truth = truthAt(point);
      const other = ground.classes.find(({ id }) => id !== truth.id)!;
      return point.number % 6 === 0 ? { classId: other.id, alternateClassId: truth.id } : { classId: truth.id };
    });
    expect(otherOrder).not.toEqual(order);
    expect(otherOrder.toSorted((a, b) => a - b)).toEqual(order.toSorted((a, b) => a - b));
    const mine = (await reviewer.get(`${path}/points/6`).expect(200)).body as BlindPoint;
    expect(mine.answer!.classId).toBe(truthAt(points[5]!).id);
    expect(mine.progress).toMatchObject({ answered: 36, left: 0, secondsPerPoint: 4 });
    // Going back and correcting oneself is allowed while nobody can have seen the other's answer.
    const wrong = ground.classes.find(({ id }) => id !== mine.answer!.classId)!;
    await reviewer.put(`${API}/points/${mine.id}/answer`).send({ classId: wrong.id }).expect(200);
    await reviewer
      .put(`${API}/points/${mine.id}/answer`)
      .send({ classId: truthAt(points[5]!).id })
      .expect(200);
    expect((await reviewer.get(`${path}/next`).expect(200)).body).toMatchObject({ point: null });
  });

  it('refuses a third answer, an unknown class, the same class twice, and people without the role', async () => {
    const third = await makeUser(test.app);
    await makeMembership(test.app, team.project, third, 'reviewer');
    const agent = await test.signedIn(third);
    const at = `${API}/points/${points[0]!.id}/answer`;
    const classId = ground.classes[0]!.id;
    expect((await agent.put(at).send({ classId }).expect(409)).body).toMatchObject({ code: 'answer-refused' });
    expect((await agent.get(`${path}/next`).expect(200)).body).toMatchObject({ point: null });
    await reviewer.put(at).send({ classId: NOWHERE }).expect(400);
    await reviewer.put(at).send({ classId, alternateClassId: classId }).expect(400);
    await lead.put(at).send({ classId }).expect(403);
    await test.stranger.put(at).send({ classId }).expect(401);
    await (await test.signedIn(team.outsider)).put(at).send({ classId }).expect(404);
    await reviewer.get(`${path}/points/999`).expect(404);
  });

  it('compares answers only once interpretation has ended, and then takes no more', async () => {
    for (const tail of ['disagreements', 'agreement']) {
      expect((await reviewer.get(`${path}/${tail}`).expect(409)).body).toMatchObject({ code: 'still-interpreting' });
    }
    expect((await lead.get(`${path}/estimates`).expect(409)).body).toMatchObject({ code: 'not-closed' });
    await lead.post(`${path}/close`).send({}).expect(409);
    const ended = (await lead.post(`${path}/adjudicate`).send({}).expect(200)).body as Design;
    expect(ended.progress).toMatchObject({ complete: 36, settled: 30, disputed: 6 });
    const at = `${API}/points/${points[0]!.id}/answer`;
    expect((await reviewer.put(at).send({ classId: ground.classes[0]!.id }).expect(409)).body).toMatchObject({
      code: 'not-open',
    });
  });

  it('measures agreement of the two by hand-worked figures', async () => {
    const agreement = (await lead.get(`${path}/agreement`).expect(200)).body as Agreement;
    expect(agreement.nPoints).toBe(36);
    expect(agreement.raw.value).toBeCloseTo(30 / 36, 12);
    // Cohen 1960 from the cross-table.
    const table = agreement.matrix!;
    const n = 36;
    const rows = table.map((row) => row.reduce((sum, count) => sum + count, 0));
    const columns = table.map((_, j) => table.reduce((sum, row) => sum + row[j]!, 0));
    const observed = table.reduce((sum, row, k) => sum + row[k]!, 0) / n;
    const expected = rows.reduce((sum, count, k) => sum + (count * columns[k]!) / n ** 2, 0);
    expect(observed).toBeCloseTo(30 / 36, 12);
    const [pair] = agreement.cohen;
    expect(pair!.figure.value).toBeCloseTo((observed - expected) / (1 - expected), 12);
    expect(pair!.figure.low!).toBeLessThan(pair!.figure.value!);
    expect(pair!.figure.high!).toBeGreaterThan(pair!.figure.value!);
    // Fleiss 1971 with two answers is Scott's pi; Krippendorff's alpha corrects it for 2n values.
    const shares = rows.map((count, k) => (count + columns[k]!) / (2 * n));
    const chance = shares.reduce((sum, p) => sum + p * p, 0);
    const fleiss = (observed - chance) / (1 - chance);
    expect(agreement.fleiss.value).toBeCloseTo(fleiss, 12);
    expect(agreement.krippendorff.value).toBeCloseTo(1 - ((1 - fleiss) * (2 * n - 1)) / (2 * n), 12);
    // Of two answers each, a class is agreed on by twice its diagonal over both its margins.
    agreement.perClass.forEach(({ class: { id }, answers, figure }, k) => {
      expect(id).toBe(ground.classes[k]!.id);
      expect(answers).toBe(rows[k]! + columns[k]!);
      expect(figure.value).toBeCloseTo((2 * table[k]![k]!) / answers, 12);
      expect(figure.low!).toBeLessThanOrEqual(figure.value!);
    });
  });

  it('lists disagreements with both answers and no mapped class, and takes decisions on them only', async () => {
    const { body } = await reviewer.get(`${path}/disagreements`).expect(200);
    const { disagreements, undecided } = body as { disagreements: Disagreement[]; undecided: number };
    expect(disagreements.map(({ point }) => point.number)).toEqual([6, 12, 18, 24, 30, 36]);
    expect(undecided).toBe(6);
    expect(JSON.stringify(body)).not.toMatch(/mapped|stratum/);
    await lead.get(`${path}/disagreements`).expect(403);
    expect((await lead.post(`${path}/close`).send({}).expect(409)).body).toMatchObject({ code: 'unsettled-points' });
    for (const { point, answers } of disagreements) {
      expect(answers).toHaveLength(2);
      const truth = truthAt(points[point.number - 1]!);
      const decided = await reviewer
        .put(`${API}/points/${point.id}/decision`)
        .send({ classId: truth.id, note: 'seen on both dates' })
        .expect(200);
      expect((decided.body as Disagreement).decision).toMatchObject({ classId: truth.id, note: 'seen on both dates' });
    }
    const agreed = points.find(({ number }) => number % 6 !== 0)!;
    const refused = await reviewer
      .put(`${API}/points/${agreed.id}/decision`)
      .send({ classId: truthAt(agreed).id })
      .expect(409);
    expect(refused.body).toMatchObject({ code: 'not-disputed' });
    await reviewer.get(`${API}/runs/${runId}/class-map.tif`).expect(403);
  });

  it('estimates accuracy and area as worked by hand from the points', async () => {
    const closed = (await lead.post(`${path}/close`).send({}).expect(200)).body as Design;
    expect(closed.state).toBe('closed');
    await reviewer.get(`${API}/runs/${runId}/class-map.tif`).expect(200);
    const estimates = (await reviewer.get(`${path}/estimates`).expect(200)).body as Estimates;
    const n = ground.classes.length;
    const counts = Array.from({ length: n }, () => new Array<number>(n).fill(0));
    const placeOf = (id: string) => ground.classes.findIndex((landClass) => landClass.id === id);
    for (const point of points) {
      const mapped = ground.classes.findIndex(({ code }) => code === point.mappedCode);
      counts[mapped]![placeOf(truthAt(point).id)]!++;
    }
    expect(estimates.counts).toEqual(counts);
    const pixels = ground.classes.map(({ code }) => codes.filter((value) => value === code).length);
    const total = pixels.reduce((sum, count) => sum + count, 0);
    const weights = pixels.map((count) => count / total);
    const drawn = counts.map((row) => row.reduce((sum, count) => sum + count, 0));
    const users = counts.map((row, i) => row[i]! / drawn[i]!);
    // Olofsson et al. 2014, eq. 1 and 5.
    const overall = weights.reduce((sum, weight, i) => sum + weight * users[i]!, 0);
    const variance = weights.reduce(
      (sum, weight, i) => sum + (weight ** 2 * users[i]! * (1 - users[i]!)) / (drawn[i]! - 1),
      0,
    );
    // The map is wrong here and there, or this would prove little.
    expect(overall).toBeLessThan(1);
    expect(estimates.overall.value).toBeCloseTo(overall, 9);
    expect(estimates.overall.standardError).toBeCloseTo(Math.sqrt(variance), 9);
    estimates.perClass.forEach((row, k) => {
      const share = weights.reduce((sum, weight, i) => sum + (weight * counts[i]![k]!) / drawn[i]!, 0);
      const error = Math.sqrt(
        weights.reduce((sum, weight, i) => {
          const p = counts[i]![k]! / drawn[i]!;
          return sum + (weight ** 2 * p * (1 - p)) / (drawn[i]! - 1);
        }, 0),
      );
      expect(row.users.value).toBeCloseTo(users[k]!, 9);
      expect(row.producers.value).toBeCloseTo((weights[k]! * users[k]!) / share, 9);
      expect(row.areaHa.value).toBeCloseTo(share * total * 0.09, 6);
      expect(row.areaHa.standardError).toBeCloseTo(error * total * 0.09, 5);
      expect(row.mappedAreaHa).toBeCloseTo(pixels[k]! * 0.09, 6);
      expect(row.warning).toContain('Congalton');
    });
    expect(estimates.design).toMatchObject({ n: 36, used: 36, unsettled: 0, decided: 6, seed: 11 });
    expect(estimates.target!.overall).toBe(0.5);
    expect(estimates.overall.how.source).toContain('Olofsson');
  });

  it('writes estimates and points as CSV', async () => {
    const estimates = await lead.get(`${path}/estimates.csv`).expect(200);
    expect(estimates.headers['content-disposition']).toContain('estimates.csv');
    expect(estimates.text).toContain('overall accuracy');
    // A name that would start a formula in a spreadsheet comes with an apostrophe.
    expect(estimates.text).toContain("'=Arable");
    const { text } = await modeller.get(`${path}/points.csv`).expect(200);
    const lines = text.trim().split(/\r?\n/);
    expect(lines).toHaveLength(37);
    const head = lines[0]!.split(',');
    const row = lines[1]!.split(',');
    expect(row[head.indexOf('mapped_code')]).toBe(String(points[0]!.mappedCode));
    expect(row[head.indexOf('class_code')]).toBe(String(truthAt(points[0]!).code));
  });

  it('compares the map with another run on the same points', async () => {
    const { body } = await modeller
      .post(`${projectPath}/runs`)
      .send({ recipe: { ...ground.recipe, seed: 99 } })
      .expect(201);
    const other = (body as Run).id;
    expect((await waitForRun(modeller, other)).job.state).toBe('finished');
    const compared = (await lead.get(`${path}/compare?runId=${other}`).expect(200)).body as MapComparison;
    const otherCodes = await readCodes(other);
    const strata = design.strata!;
    const total = strata.reduce((sum, { pixels }) => sum + pixels, 0);
    const right = points.map((point) => {
      const truth = truthAt(point).code;
      const second = otherCodes[point.pixelRow * SIDE + point.pixelColumn] === truth;
      return { h: point.stratum, first: Number(point.mappedCode === truth), second: Number(second) };
    });
    let difference = 0;
    let variance = 0;
    strata.forEach(({ pixels }, h) => {
      const d = right.filter((unit) => unit.h === h).map(({ first, second: of }) => first - of);
      const mean = d.reduce((sum, value) => sum + value, 0) / d.length;
      const spread = d.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (d.length - 1);
      difference += (pixels / total) * mean;
      variance += ((pixels / total) ** 2 * spread) / d.length;
    });
    expect(compared.difference).toBeCloseTo(difference, 9);
    expect(compared.standardError).toBeCloseTo(Math.sqrt(variance), 9);
    expect(compared.onlyFirstRight).toBe(right.filter(({ first, second: of }) => first > of).length);
    expect(compared.onlySecondRight).toBe(right.filter(({ first, second: of }) => first < of).length);
    // The two maps differ, or this would prove little.
    expect(compared.onlyFirstRight + compared.onlySecondRight).toBeGreaterThan(0);
    expect(compared.mcNemar).toMatchObject({ quoted: 'exact' });
    await lead.get(`${path}/compare?runId=${runId}`).expect(400);
    await lead.get(`${path}/compare?runId=${NOWHERE}`).expect(400);
  });

  it('carries a closed design on: same points with their classes, and others after them', async () => {
    const { target, allocation } = askFor(50);
    const grown = (await lead.post(`${path}/augment`).send({ target, allocation }).expect(200)).body as Design;
    expect(grown).toMatchObject({ augmentsId: design.id, state: 'draft', n: 50 });
    expect(grown.id).not.toBe(design.id);
    const after = await pointsOf(grown.id);
    const place = (p: ReferencePoint) => [p.number, p.pixelRow, p.pixelColumn];
    expect(after.slice(0, 36).map(place)).toEqual(points.map(place));
    await lead.post(`${API}/designs/${grown.id}/open`).send({}).expect(200);
    const { progress } = (await reviewer.get(`${API}/designs/${grown.id}/next`).expect(200)).body as NextPoint;
    expect(progress).toMatchObject({ answered: 36, left: 14 });
    const carried = (await reviewer.get(`${API}/designs/${grown.id}/points/1`).expect(200)).body as BlindPoint;
    expect(carried.takesAnswer).toBe(false);
    // The closed design shows the same points, so it is withheld as well.
    for (const tail of [
      'estimates',
      'estimates.csv',
      'points.csv',
      'agreement',
      'disagreements',
      `compare?runId=${NOWHERE}`,
    ]) {
      await reviewer.get(`${path}/${tail}`).expect(403);
    }
    await lead.post(`${API}/designs/${grown.id}/adjudicate`).send({}).expect(200);
    await lead.post(`${API}/designs/${grown.id}/close`).send({ leaveUnsettled: true }).expect(200);
    const estimates = (await lead.get(`${API}/designs/${grown.id}/estimates`).expect(200)).body as Estimates;
    expect(estimates.design).toMatchObject({ n: 50, used: 36, unsettled: 14 });
    expect(estimates.cautions.join(' ')).toContain('14 of 50 points');
  });
});

describe('two people at once', () => {
  it('give a point no more answers than it wants', async () => {
    const design = await draw({ ...askFor(20), answersPerPoint: 1 });
    await lead.post(`${API}/designs/${design.id}/open`).send({}).expect(200);
    const classId = ground.classes[0]!.id;
    for (const { id } of (await pointsOf(design.id)).slice(0, 8)) {
      const sent = [reviewer, reviewer2].map((agent) => agent.put(`${API}/points/${id}/answer`).send({ classId }));
      const statuses = (await Promise.all(sent)).map(({ status }) => status);
      expect(statuses.toSorted((a, b) => a - b)).toEqual([200, 409]);
      expect(await test.app.db.getRepository(ReferenceAnswer).countBy({ pointId: id })).toBe(1);
    }
    const overview = (await reviewer.get(`${projectPath}/overview`).expect(200)).body as Overview;
    expect(overview.waiting).toContainEqual({
      text: `Interpret 12 points of reference design ${design.number}`,
      path: `accuracy/designs/${design.id}/check`,
    });
    await lead.post(`${API}/designs/${design.id}/adjudicate`).send({}).expect(200);
    const after = (await reviewer.get(`${projectPath}/overview`).expect(200)).body as Overview;
    expect(after.waiting).toContainEqual({
      text: `Decide 12 points of reference design ${design.number}`,
      path: `accuracy/designs/${design.id}/decide`,
    });
    const ofLead = (await lead.get(`${projectPath}/overview`).expect(200)).body as Overview;
    expect(ofLead.waiting.some(({ text }) => text.includes('reference design'))).toBe(false);
    await lead.post(`${API}/designs/${design.id}/close`).send({ leaveUnsettled: true }).expect(200);
  });
});

describe('import of answers', () => {
  it('takes rows by number or position, reports on every row, and changes nothing in a rehearsal', async () => {
    const design = await draw({ ...askFor(24), answersPerPoint: 1 });
    const path = `${API}/designs/${design.id}`;
    const points = await pointsOf(design.id);
    const csv = [
      'number;lon;lat;class_code;alternate_code;confidence;note',
      '1;;;3;;high;"first; with a ""quote"""',
      `;${points[1]!.lon};${points[1]!.lat};Heath & moor;3;;`,
      '1;;;7;;;',
      '99;;;3;;;',
      ';10;10;3;;;',
      '3;;;200;;;',
      '4;;;3;3;;',
      '5;;;3;;sure;',
      '6;;;;;;',
    ].join('\r\n');
    const send = (body: object) => reviewer.post(`${path}/import`).send(body);
    await send({ csv }).expect(409);
    await lead.post(`${path}/open`).send({}).expect(200);
    const answers = () =>
      test.app.db
        .getRepository(ReferenceAnswer)
        .find({ where: { point: { designId: design.id } }, relations: { point: true } });
    const rehearsal = (await send({ csv, dryRun: true }).expect(200)).body as ImportReport;
    expect(await answers()).toEqual([]);
    const report = (await send({ csv }).expect(200)).body as ImportReport;
    expect(rehearsal).toEqual({ ...report, dryRun: true });
    expect(report).toMatchObject({ taken: 2, replaced: 0, refused: 7 });
    expect(report.rows.map(({ line, number, outcome }) => [line, number, outcome])).toEqual([
      [2, 1, 'taken'],
      [3, 2, 'taken'],
      [4, 1, 'refused'],
      [5, null, 'refused'],
      [6, null, 'refused'],
      [7, null, 'refused'],
      [8, null, 'refused'],
      [9, null, 'refused'],
      [10, null, 'refused'],
    ]);
    const stored = (await answers()).toSorted((a, b) => a.point.number - b.point.number);
    expect(stored).toMatchObject([
      { classId: ground.classes[0]!.id, confidence: 'high', note: 'first; with a "quote"', source: 'import' },
      { classId: ground.classes[1]!.id, alternateClassId: ground.classes[0]!.id, confidence: 'medium' },
    ]);
    const again = (await send({ csv: 'number,class\n1,7\n' }).expect(200)).body as ImportReport;
    expect(again).toMatchObject({ taken: 0, replaced: 1, refused: 0 });
    for (const bad of ['name,code\n1,2\n', 'number\n1\n', 'number,class\n1,"3\n']) {
      expect((await send({ csv: bad }).expect(400)).body).toMatchObject({ code: 'file-refused' });
    }
    await lead.post(`${path}/import`).send({ csv }).expect(403);
    await lead.post(`${path}/adjudicate`).send({}).expect(200);
    await lead.post(`${path}/close`).send({ leaveUnsettled: true }).expect(200);
  });
});

describe('answers from a file of points', () => {
  it('takes each point into the pixel it falls in, whatever the reference system, and reports on the others', async () => {
    const design = await draw({ ...askFor(20), answersPerPoint: 1 });
    const path = `${API}/designs/${design.id}`;
    await lead.post(`${path}/open`).send({}).expect(200);
    const [first, second] = await pointsOf(design.id);
    const dir = await mkdtemp(join(tmpdir(), 'groundsel-answers-'));
    try {
      const feature = (lon: number, lat: number, properties: object) => ({
        ...{ type: 'Feature', properties, geometry: { type: 'Point', coordinates: [lon, lat] } },
      });
      const features = [
        feature(first!.lon, first!.lat, { class: 'Heath & moor', note: 'on foot' }),
        feature(second!.lon, second!.lat, { class: 'Lava', note: '' }),
        feature(10, 10, { class: 'Heath & moor', note: '' }),
      ];
      await writeFile(join(dir, 'field.geojson'), JSON.stringify({ type: 'FeatureCollection', features }));
      const [from, to] = [join(dir, 'field.geojson'), join(dir, 'field.gpkg')];
      execFileSync('ogr2ogr', ['-t_srs', 'EPSG:3857', '-f', 'GPKG', to, from]);
      const send = (dryRun: boolean) =>
        reviewer.post(`${path}/import-file`).field('dryRun', String(dryRun)).attach('files', to);
      const rehearsal = (await send(true).expect(200)).body as ImportReport;
      expect(rehearsal).toMatchObject({ dryRun: true, taken: 1, refused: 2 });
      const report = (await send(false).expect(200)).body as ImportReport;
      expect(report.rows.map(({ line, outcome, reason }) => [line, outcome, reason])).toEqual([
        [1, 'taken', null],
        [2, 'refused', 'There is no class Lava.'],
        [3, 'refused', 'No point of the design lies there.'],
      ]);
      const stored = await test.app.db.getRepository(ReferenceAnswer).findBy({ pointId: first!.id });
      expect(stored).toMatchObject([{ classId: ground.classes[1]!.id, note: 'on foot', source: 'import' }]);
      await writeFile(join(dir, 'noise.gpkg'), 'no GeoPackage');
      const noise = reviewer.post(`${path}/import-file`).attach('files', join(dir, 'noise.gpkg'));
      expect((await noise.expect(400)).body).toMatchObject({ code: 'file-refused' });
    } finally {
      await rm(dir, { recursive: true, force: true });
    }
    await lead.post(`${path}/adjudicate`).send({}).expect(200);
    await lead.post(`${path}/close`).send({ leaveUnsettled: true }).expect(200);
  });
});

/** Olofsson et al. 2014, Remote Sensing of Environment 148:42–57, tables 8 and 9; half-widths of their eq. 7 recomputed. */
const TABLE_8 = {
  pixels: [200_000, 150_000, 3_200_000, 6_450_000],
  counts: [
    [66, 0, 5, 4],
    [0, 55, 8, 12],
    [1, 0, 153, 11],
    [2, 1, 9, 313],
  ],
  users: [0.88, 0.733333, 0.927273, 0.963077],
  producers: [0.748661, 0.847156, 0.934509, 0.961609],
  producersHalf: [0.21331, 0.254408, 0.034324, 0.018362],
  areaHa: [21_157.76, 11_686.15, 285_769.93, 581_386.15],
  areaHalf: [6_157.63, 3_755.83, 15_509.84, 16_281.66],
};

interface Table {
  /** Mapped pixels by class, and how many are left unclassified. */
  pixels: number[];
  unclassified?: number;
  /** Rows are strata, the last one what is left unclassified. */
  counts: number[][];
}

/** A closed design with the counts of a table, on a run with its mapped pixels. */
async function makeTableDesign(table: Table, number: number): Promise<{ designId: string; ownRunId: string }> {
  const { db } = test.app;
  const run = await db.getRepository(RunEntity).findOneByOrFail({ id: runId });
  const job = await db.getRepository(Job).findOneByOrFail({ id: run.jobId });
  const [ownRunId, jobId, designId] = [randomUUID(), randomUUID(), randomUUID()];
  const classes = table.pixels.map((_, i) => ({
    ...{ id: randomUUID(), code: i + 1, name: `Class ${i + 1}`, colour: '#336699' },
  }));
  const left = table.unclassified ?? 0;
  const mapped = [
    ...classes.map(({ id, ...landClass }, i) => ({ ...landClass, classId: id, pixels: table.pixels[i]! })),
    ...(left > 0 ? [{ classId: null, code: 0, name: 'Unclassified', colour: '#808080', pixels: left }] : []),
  ];
  const byCode = (factor: number) => Object.fromEntries(mapped.map(({ code, pixels }) => [code, pixels * factor]));
  const result = { ...run.result!, pixelsByCode: byCode(1), areaHaByCode: byCode(0.09) };
  await db.getRepository(Job).insert({ ...job, id: jobId, runId: ownRunId });
  await db.getRepository(RunEntity).insert({ ...run, id: ownRunId, jobId, number, classes, result } as never);
  const total = mapped.reduce((sum, { pixels }) => sum + pixels, 0);
  const strata = mapped.map((stratum, h) => ({
    ...{ ...stratum, areaHa: stratum.pixels * 0.09, share: stratum.pixels / total },
    ...{ expectedUsers: null, expectedLow: null, expectedHigh: null },
    points: table.counts[h]!.reduce((sum, n) => sum + n, 0),
  }));
  await db.getRepository(ReferenceDesign).insert({
    ...{ id: designId, projectId: run.projectId, runId: ownRunId, number, name: '', state: 'closed', strata, classes },
    ...{ plan: {}, seed: 1, minSpacingMeters: 0, leftOutBySpacing: [], answersPerPoint: 1, digest: '0'.repeat(64) },
    ...{ augmentsId: null, createdById: null, openedAt: new Date(), closedAt: new Date() },
  } as never);
  const cells = table.counts.flatMap((row, i) =>
    row.flatMap((n, j) => Array.from({ length: n }, () => [i, j] as const)),
  );
  const points = cells.map(([stratum], k) => ({
    ...{ id: randomUUID(), designId, number: k + 1, stratum, drawOrder: k, pixelRow: 0, pixelColumn: k },
    ...{ lon: 0, lat: 0, mappedCode: mapped[stratum]!.code, decisionNote: '' },
  }));
  await db.getRepository(ReferencePoint).insert(points);
  await db.getRepository(ReferenceAnswer).insert(
    points.map(({ id }, k) => ({
      ...{ id: randomUUID(), pointId: id, userId: second.id, classId: classes[cells[k]![1]]!.id },
      ...{ alternateClassId: null, confidence: 'high' as const, note: '', source: 'image' as const, seconds: null },
      answeredAt: new Date(),
    })),
  );
  return { designId, ownRunId };
}

describe('estimates of the published example', () => {
  it('are those of Olofsson et al. 2014, tables 8 and 9, and not the unweighted ones', async () => {
    const { designId } = await makeTableDesign(TABLE_8, 900);
    const estimates = (await lead.get(`${API}/designs/${designId}/estimates`).expect(200)).body as Estimates;
    expect(estimates.counts).toEqual(TABLE_8.counts);
    expect(estimates.overall.value).toBeCloseTo(0.946512, 5);
    expect(estimates.overall.standardError! * 1.96).toBeCloseTo(0.018484, 4);
    // Must fail: weights dropped.
    expect(Math.abs(estimates.overall.value! - 587 / 640)).toBeGreaterThan(0.02);
    estimates.perClass.forEach((row, k) => {
      expect(row.users.value).toBeCloseTo(TABLE_8.users[k]!, 5);
      expect(row.producers.value).toBeCloseTo(TABLE_8.producers[k]!, 5);
      expect(row.producers.standardError! * 1.96).toBeCloseTo(TABLE_8.producersHalf[k]!, 3);
      expect(Math.abs(row.areaHa.value! - TABLE_8.areaHa[k]!)).toBeLessThan(1);
      expect(Math.abs(row.areaHa.standardError! * 1.96 - TABLE_8.areaHalf[k]!)).toBeLessThan(1.5);
      expect(row.mappedAreaHa).toBeCloseTo(TABLE_8.pixels[k]! * 0.09, 6);
    });
    const { quantityDisagreement, allocationDisagreement } = estimates;
    const sum = estimates.overall.value! + quantityDisagreement.value! + allocationDisagreement.value!;
    expect(sum).toBeCloseTo(1, 9);
    expect(estimates.kappa.caution).toContain('Foody');
  });
});

describe('what the map leaves unclassified', () => {
  it('is a stratum that is never right and whose area belongs to the classes found there', async () => {
    const table: Table = {
      pixels: [600, 300],
      unclassified: 100,
      counts: [
        [18, 2],
        [3, 7],
        [4, 1],
      ],
    };
    const { designId, ownRunId } = await makeTableDesign(table, 901);
    const estimates = (await lead.get(`${API}/designs/${designId}/estimates`).expect(200)).body as Estimates;
    expect(estimates.rows.map(({ name }) => name)).toEqual(['Class 1', 'Class 2', 'Unclassified']);
    expect(estimates.columns).toHaveLength(2);
    expect(estimates.counts).toEqual(table.counts);
    // 0.6 · 18/20 + 0.3 · 7/10 + 0.1 · 0
    expect(estimates.overall.value).toBeCloseTo(0.75, 12);
    // 0.6 · 18/20 + 0.3 · 3/10 + 0.1 · 4/5, of 90 ha
    expect(estimates.perClass[0]!.areaHa.value).toBeCloseTo(0.71 * 90, 9);
    expect(estimates.perClass[0]!.producers.value).toBeCloseTo(0.54 / 0.71, 12);
    expect(estimates.perClass[0]!.users.value).toBeCloseTo(0.9, 12);
    const { body } = await lead
      .post(`${projectPath}/designs/plan`)
      .send({ runId: ownRunId, target: { kind: 'total', total: 40 }, allocation: { kind: 'neyman' } })
      .expect(200);
    const plan = body as DesignPlan;
    // Nothing varies there, so Neyman gives it nothing; two points it gets all the same.
    expect(plan.strata.at(-1)).toMatchObject({ classId: null, name: 'Unclassified', points: 2, expectedUsers: null });
    expect(plan.n).toBe(42);
  });

  it('leaves a figure undefined that nothing is known of, and says why there is no estimate at all', async () => {
    const unseen = await makeTableDesign(
      {
        pixels: [600, 300],
        counts: [
          [20, 0],
          [10, 0],
        ],
      },
      902,
    );
    const estimates = (await lead.get(`${API}/designs/${unseen.designId}/estimates`).expect(200)).body as Estimates;
    expect(estimates.perClass[1]!.producers).toMatchObject({ value: null, standardError: null, low: null, high: null });
    expect(estimates.perClass[1]!.users.value).toBe(0);
    const empty = await makeTableDesign(
      {
        pixels: [600, 300],
        counts: [
          [20, 0],
          [0, 0],
        ],
      },
      903,
    );
    const none = (await lead.get(`${API}/designs/${empty.designId}/estimates`).expect(200)).body as Estimates;
    expect(none.overall.value).toBeNull();
    expect(none.proportions).toBeNull();
    expect(none.problem).toContain('Class 2');
    expect((await lead.get(`${API}/designs/${empty.designId}/estimates.csv`).expect(200)).text).toContain(none.problem);
  });
});

describe('a project with designs', () => {
  it('is deleted with all of them', async () => {
    await lead.delete(projectPath).send({ confirmName: team.project.name }).expect(204);
    expect(await test.app.db.getRepository(ReferenceDesign).countBy({ projectId: team.project.id })).toBe(0);
    expect(await test.app.db.getRepository(ReferencePoint).count()).toBe(0);
    expect(await test.app.db.getRepository(ReferenceAnswer).count()).toBe(0);
  });
});
