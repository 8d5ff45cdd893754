import { execFile } from 'node:child_process';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Run as RunEntity } from '../../server/entities/run.ts';
import { RunSample } from '../../server/entities/run-sample.ts';
import { Sample } from '../../server/entities/sample.ts';
import { MAP_CAUTIONS, PURPOSIVE_CAUTION } from '../../shared/constants/cautions.ts';
import type { Accuracy, CellSamples } from '../../shared/contracts/accuracy.ts';
import type { Run } from '../../shared/contracts/run.ts';
import { makeTeam, type Team } from '../factories/make-project.ts';
import { makeRunGround, type RunGround } from '../factories/make-run-ground.ts';
import { readBytes } from '../factories/read-bytes.ts';
import { openTestApp, type Agent, type TestApp } from '../factories/test-app.ts';
import { waitForRun } from '../factories/wait-for-run.ts';

const SIDE = 96;
const NOWHERE = '00000000-0000-4000-8000-000000000000';

let test: TestApp;
let team: Team;
let ground: RunGround;
let reviewer: Agent;
let runId: string;
let overallOfRun: number | null;
/** Codes of the class map, row-major, as GDAL reads them from the download. */
let codes: Buffer;
/** Held-out samples with the codes of their 36 pixels. */
let heldOut: { id: string; reference: number; mapped: number[] }[];

async function readCodes(agent: Agent): Promise<Buffer> {
  const dir = await mkdtemp(join(tmpdir(), 'groundsel-accuracy-'));
  try {
    await writeFile(join(dir, 'map.tif'), await readBytes(agent, `/api/v1/runs/${runId}/class-map.tif`));
    await promisify(execFile)('gdal_translate', ['-q', '-of', 'ENVI', join(dir, 'map.tif'), join(dir, 'raw')]);
    return await readFile(join(dir, 'raw'));
  } finally {
    await rm(dir, { recursive: true, force: true });
  }
}

async function read(unit: string): Promise<Accuracy> {
  return (await reviewer.get(`/api/v1/runs/${runId}/accuracy?unit=${unit}`).expect(200)).body as Accuracy;
}

/** Rows mapped, columns reference. */
function recount(pairs: { mapped: number; reference: number }[]): number[][] {
  const n = ground.classes.length;
  const matrix = Array.from({ length: n }, () => Array.from({ length: n }, () => 0));
  for (const { mapped, reference } of pairs) matrix[mapped]![reference]!++;
  return matrix;
}

const sum = (values: number[]) => values.reduce((total, value) => total + value, 0);
const placeOf = (code: number) => ground.classes.findIndex((landClass) => landClass.code === code);

beforeAll(async () => {
  test = await openTestApp();
  team = await makeTeam(test.app);
  ground = await makeRunGround(test.app, team.project);
  reviewer = await test.signedIn(team.reviewer);
  const modeller = await test.signedIn(team.modeller);
  // Few trees on few pixels, so that there are mistakes to count.
  const recipe = {
    ...ground.recipe,
    maxPixelsPerClass: 40,
    classifier: { kind: 'random-forest', trees: 3, maxDepth: 4, minLeaf: 1, featuresPerTree: 1 },
  };
  const { body } = await modeller.post(`/api/v1/projects/${team.project.id}/runs`).send({ recipe }).expect(201);
  runId = (body as Run).id;
  const ended = await waitForRun(modeller, runId);
  expect(ended.job).toMatchObject({ state: 'finished', error: null });
  overallOfRun = ended.overallAccuracy;
  codes = await readCodes(modeller);
  const rows = await test.app.db.getRepository(RunSample).findBy({ runId, part: 'held-out' });
  heldOut = rows.map(({ sampleId, classId }) => {
    const { column, row } = ground.places.get(sampleId)!;
    const mapped: number[] = [];
    for (let y = row; y < row + 6; y++)
      for (let x = column; x < column + 6; x++) mapped.push(placeOf(codes[y * SIDE + x]!));
    return { id: sampleId, reference: ground.classes.findIndex(({ id }) => id === classId), mapped };
  });
});

afterAll(() => test.close());

/** Wilson 1927, score interval of a share of n trials. */
function wilson(p: number, n: number): { low: number; high: number } {
  const z2 = 1.959964 ** 2;
  const half = Math.sqrt(z2 * ((p * (1 - p)) / n + z2 / (4 * n * n)));
  return { low: (p + z2 / (2 * n) - half) / (1 + z2 / n), high: (p + z2 / (2 * n) + half) / (1 + z2 / n) };
}

describe('accuracy by pixel', () => {
  it('equals a recount of the downloaded map in the held-out polygons', async () => {
    const accuracy = await read('pixel');
    const pairs = heldOut.flatMap(({ reference, mapped }) =>
      mapped.filter((index) => index >= 0).map((index) => ({ mapped: index, reference })),
    );
    const unmapped = ground.classes.map((_, i) =>
      sum(heldOut.filter(({ reference }) => reference === i).map(({ mapped }) => mapped.filter((m) => m < 0).length)),
    );
    const matrix = recount(pairs);
    expect(accuracy.matrix).toEqual(matrix);
    expect(accuracy.total).toBe(9 * 36 - sum(unmapped));
    expect(accuracy.polygonCount).toBe(9);
    expect(accuracy.unmapped).toEqual(unmapped);
    const right = sum(matrix.map((row, i) => row[i]!));
    // The test ground is made to be mapped with mistakes, or this would prove little.
    expect(right).toBeLessThan(accuracy.total);
    expect(accuracy.overall.value).toBeCloseTo(right / accuracy.total, 12);
    expect(overallOfRun).toBeCloseTo(right / accuracy.total, 12);
    accuracy.perClass.forEach((row, i) => {
      const mapped = sum(matrix[i]!);
      const reference = sum(matrix.map((cells) => cells[i]!));
      expect(row).toMatchObject({ mappedCount: mapped, referenceCount: reference, correctCount: matrix[i]![i]! });
      expect(row.users.value).toBeCloseTo(matrix[i]![i]! / mapped, 12);
      expect(row.producers.value).toBeCloseTo(matrix[i]![i]! / reference, 12);
      expect(row.f1).toBeCloseTo((2 * matrix[i]![i]!) / (mapped + reference), 12);
      expect(row.heldOutPolygons).toBe(3);
    });
  });

  it('takes the interval of user’s accuracy from the spread between polygons', async () => {
    const { overall, perClass, matrix } = await read('pixel');
    expect(overall.method).toMatch(/polygons taken as clusters.*bootstrap/);
    // Ratio R = Σy/Σx over the k polygons with pixels mapped as the class; variance k/(k − 1) · Σ(y − Rx)² / (Σx)²; the
    // half-width is t · S, t(0.975; k − 1) from a table of Student's t; never narrower than Wilson's of the pixels.
    const tOf = [NaN, 12.7062, 4.302653, 3.182446, 2.776445, 2.570582, 2.446912, 2.364624, 2.306004];
    let nChecked = 0;
    perClass.forEach(({ users }, c) => {
      const sizes = heldOut.map(({ mapped }) => mapped.filter((index) => index === c).length);
      const hits = heldOut.map(({ reference }, i) => (reference === c ? sizes[i]! : 0));
      const k = sizes.filter((size) => size > 0).length;
      const ratio = matrix[c]![c]! / sum(sizes);
      const squares = sum(hits.map((y, i) => (y - ratio * sizes[i]!) ** 2));
      if (k < 2 || squares === 0) return;
      const half = (tOf[k - 1]! * Math.sqrt((k / (k - 1)) * squares)) / sum(sizes);
      const ofPixels = wilson(ratio, sum(sizes));
      expect(users.low).toBeCloseTo(Math.min(ofPixels.low, Math.max(0, ratio - half)), 5);
      expect(users.high).toBeCloseTo(Math.max(ofPixels.high, Math.min(1, ratio + half)), 5);
      nChecked++;
    });
    expect(nChecked).toBeGreaterThan(0);
  });

  it('takes the interval of overall and producer’s accuracy from drawing polygons again, no narrower than pixels would give', async () => {
    const { overall, perClass, total } = await read('pixel');
    const ofPixels = wilson(overall.value!, total);
    expect(overall.low).toBeLessThanOrEqual(ofPixels.low + 1e-9);
    expect(overall.high).toBeGreaterThanOrEqual(ofPixels.high - 1e-9);
    for (const { producers } of perClass) {
      expect(producers.low).toBeLessThanOrEqual(producers.value!);
      expect(producers.high).toBeGreaterThanOrEqual(producers.value!);
      expect(producers.high! - producers.low!).toBeGreaterThan(0);
    }
    // The same polygons give the same interval, here and on the card of the run.
    expect((await read('pixel')).overall).toEqual(overall);
  });

  it('gives kappa with a standard error and an interval that take polygons, not pixels, as drawn', async () => {
    const { kappa, matrix, total, quantityDisagreement, allocationDisagreement, overall } = await read('pixel');
    const po = sum(matrix.map((row, i) => row[i]!)) / total;
    const pe = sum(matrix.map((row, i) => sum(row) * sum(matrix.map((cells) => cells[i]!)))) / total ** 2;
    expect(kappa.value).toBeCloseTo((po - pe) / (1 - pe), 12);
    // Cohen's simple standard error for independent pixels; the large-sample one is near it.
    expect(kappa.standardError).toBeGreaterThan((0.9 * Math.sqrt((po * (1 - po)) / total)) / (1 - pe));
    expect(kappa.low).toBeLessThan(kappa.value!);
    expect(kappa.high).toBeGreaterThan(kappa.value!);
    expect(kappa.caution).toMatch(/not independent/);
    expect(overall.value! + quantityDisagreement! + allocationDisagreement!).toBeCloseTo(1, 12);
  });
});

describe('accuracy by polygon', () => {
  it('counts each polygon once, by the class most of its pixels have', async () => {
    const accuracy = await read('polygon');
    const pairs = heldOut.map(({ reference, mapped }) => {
      const counts = ground.classes.map((_, i) => mapped.filter((index) => index === i).length);
      const most = Math.max(...counts);
      const leaders = counts.flatMap((n, i) => (n === most ? [i] : []));
      // A tie never counts in favour of the map.
      return { mapped: leaders.length === 1 ? leaders[0]! : leaders.find((i) => i !== reference)!, reference };
    });
    expect(accuracy.matrix).toEqual(recount(pairs));
    expect(accuracy.total).toBe(9);
    expect(accuracy.overall.method).toMatch(/Wilson/);
    expect(accuracy.overall.low).toBeLessThan(accuracy.overall.value!);
  });

  it('warns of few units and says what the figures are not', async () => {
    const { perClass, cautions } = await read('polygon');
    for (const { warning } of perClass) {
      expect(warning).toMatch(/Congalton 1991/);
      expect(warning).toMatch(/3 held-out polygons; fewer than 5/);
    }
    expect(cautions).toEqual([PURPOSIVE_CAUTION, ...MAP_CAUTIONS]);
  });
});

describe('the samples behind a cell', () => {
  it('are the held-out samples with such pixels, most pixels first', async () => {
    for (const [mapped, mappedClass] of ground.classes.entries()) {
      for (const [reference, referenceClass] of ground.classes.entries()) {
        const query = `unit=pixel&mapped=${mappedClass.id}&reference=${referenceClass.id}`;
        const { body } = await reviewer.get(`/api/v1/runs/${runId}/accuracy/cell?${query}`).expect(200);
        const { samples } = body as CellSamples;
        const expected = heldOut
          .filter((sample) => sample.reference === reference)
          .map((sample) => ({ id: sample.id, pixels: sample.mapped.filter((index) => index === mapped).length }))
          .filter(({ pixels }) => pixels > 0);
        expect(new Map(samples.map(({ sampleId, pixels }) => [sampleId, pixels]))).toEqual(
          new Map(expected.map(({ id, pixels }) => [id, pixels])),
        );
        const order = samples.map(({ pixels }) => pixels);
        expect(order).toEqual([...order].sort((a, b) => b - a));
        for (const { pixelsOfSample, stillThere } of samples)
          expect({ pixelsOfSample, stillThere }).toEqual({ pixelsOfSample: 36, stillThere: true });
      }
    }
  });

  it('are still named when a sample has been deleted since', async () => {
    const [gone] = heldOut;
    await test.app.db.getRepository(Sample).update({ id: gone!.id }, { deletedAt: new Date() });
    const { id } = ground.classes[gone!.reference]!;
    const mapped = ground.classes[gone!.mapped[0]!]!.id;
    const path = `/api/v1/runs/${runId}/accuracy/cell?mapped=${mapped}&reference=${id}`;
    const { samples } = (await reviewer.get(path).expect(200)).body as CellSamples;
    expect(samples.find(({ sampleId }) => sampleId === gone!.id)?.stillThere).toBe(false);
    expect(samples.length).toBeGreaterThanOrEqual(1);
  });

  it('refuse a class that is not the run’s', async () => {
    const path = `/api/v1/runs/${runId}/accuracy/cell?mapped=${NOWHERE}&reference=${ground.classes[0]!.id}`;
    const { body } = await reviewer.get(path).expect(400);
    expect(body.errors[0].path).toBe('mapped');
    await reviewer.get(`/api/v1/runs/${runId}/accuracy/cell`).expect(400);
  });
});

describe('the CSV', () => {
  it('holds the matrix, the figures and how they came about, and no formula', async () => {
    await test.app.db.getRepository(RunEntity).update({ id: runId }, { name: 'Spring,=1+1, "=2+2"; @sum' });
    const res = await reviewer.get(`/api/v1/runs/${runId}/accuracy.csv?unit=pixel`).expect(200);
    await test.app.db.getRepository(RunEntity).update({ id: runId }, { name: '' });
    expect(res.headers['content-disposition']).toBe(
      'attachment; filename=run-1-spring-1-1-2-2-sum-accuracy-by-pixel.csv',
    );
    const lines = res.text.replace('\uFEFF', '').split('\n');
    const { matrix, overall } = await read('pixel');
    const header = lines.findIndex((line) => line.startsWith('mapped'));
    expect(lines[header]).toBe("mapped \\ reference,Open water,Heath & moor,'=Arable,total");
    expect(lines[header + 1]).toBe(`Open water,${matrix[0]!.join(',')},${sum(matrix[0]!)}`);
    expect(lines.find((line) => line.startsWith('overall accuracy'))).toContain(String(overall.value));
    expect(lines).toContain(`# ${PURPOSIVE_CAUTION}`);
    expect(lines.some((line) => line.startsWith('# How: Pixels of the held-out polygons'))).toBe(true);
    for (const line of lines) expect(line).not.toMatch(/^[=+@]|[,;]\s*"?[=+@]/);
  });
});

describe('who may read accuracy', () => {
  const paths = () =>
    ['accuracy', 'accuracy.csv', `accuracy/cell?mapped=${NOWHERE}&reference=${NOWHERE}`].map(
      (end) => `/api/v1/runs/${runId}/${end}`,
    );

  it.each(['labeller', 'otherLabeller'] as const)('not a %s', async (role) => {
    const agent = await test.signedIn(team[role]);
    for (const path of paths()) await agent.get(path).expect(403);
  });

  it.each(['client', 'outsider'] as const)('not a %s, who is not told either', async (role) => {
    const agent = await test.signedIn(team[role]);
    for (const path of paths()) await agent.get(path).expect(404);
  });

  it('nobody who is not signed in', async () => {
    for (const path of paths()) await test.stranger.get(path).expect(401);
  });

  it('and only by pixel or polygon', async () => {
    await reviewer.get(`/api/v1/runs/${runId}/accuracy?unit=hectare`).expect(400);
  });
});
