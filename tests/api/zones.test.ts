import { execFileSync } from 'node:child_process';
import { createWriteStream } from 'node:fs';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import { fromFile } from 'geotiff';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import yazl from 'yazl';
import { ReferenceDesign } from '../../server/entities/reference-design.ts';
import { ReferencePoint } from '../../server/entities/reference-point.ts';
import {
  kappaComparisonSchema,
  type Design,
  type DesignPlan,
  type Estimates,
} from '../../shared/contracts/reference.ts';
import type { Run } from '../../shared/contracts/run.ts';
import { zoneEstimatesSchema, zoneLayerSchema, type ZoneLayer } from '../../shared/contracts/zone.ts';
import { makeTeam, type Team } from '../factories/make-project.ts';
import { makeRunGround, type RunGround } from '../factories/make-run-ground.ts';
import { pixelPolygon } from '../factories/make-sample.ts';
import { openTestApp, type Agent, type TestApp } from '../factories/test-app.ts';
import { waitForRun } from '../factories/wait-for-run.ts';

const SIDE = 96;
const API = '/api/v1';
let test: TestApp;
let team: Team;
let ground: RunGround;
let lead: Agent;
let reviewer: Agent;
let dir = '';
let projectPath = '';
const runIds: string[] = [];
let maps: Uint8Array[] = [];

/** Two zones side by side: columns 0–39 and 40–79; the last sixteen columns lie in none. */
function makeZones(): string {
  const zone = (name: string, west: number, east: number) => ({
    type: 'Feature',
    properties: { code: west, parish: name },
    geometry: pixelPolygon(ground.scene, [
      [west, 0],
      [west, SIDE],
      [east, SIDE],
      [east, 0],
    ]),
  });
  return JSON.stringify({ type: 'FeatureCollection', features: [zone('West', 0, 40), zone('Middle', 40, 80)] });
}

async function readCodes(runId: string): Promise<Uint8Array> {
  const { body } = await lead.get(`${API}/runs/${runId}/class-map.tif`).buffer(true).responseType('blob').expect(200);
  const path = join(dir, `${runId}.tif`);
  await writeFile(path, body as Buffer);
  const [band] = (await (await (await fromFile(path)).getImage()).readRasters()) as unknown as [Uint8Array];
  return band;
}

async function zip(names: readonly string[], path: string): Promise<void> {
  const file = new yazl.ZipFile();
  for (const name of names) file.addFile(join(dir, name), `folder/${name}`);
  file.end();
  await pipeline(file.outputStream, createWriteStream(path));
}

const send = (name: string, fields: Record<string, string> = {}) => {
  let post = lead.post(`${projectPath}/zone-layers`);
  for (const [key, value] of Object.entries(fields)) post = post.field(key, value);
  return post.attach('files', join(dir, name));
};

beforeAll(async () => {
  dir = await mkdtemp(join(tmpdir(), 'groundsel-zones-'));
  test = await openTestApp();
  team = await makeTeam(test.app);
  ground = await makeRunGround(test.app, team.project);
  projectPath = `${API}/projects/${team.project.id}`;
  lead = await test.signedIn(team.lead);
  reviewer = await test.signedIn(team.reviewer);
  const modeller = await test.signedIn(team.modeller);
  for (const trees of [1, 9]) {
    const recipe = {
      ...{ ...ground.recipe, maxPixelsPerClass: 40 },
      classifier: { kind: 'random-forest', trees, maxDepth: 4, minLeaf: 1, featuresPerTree: 1 },
    };
    const { body } = await modeller.post(`${projectPath}/runs`).send({ recipe }).expect(201);
    runIds.push((body as Run).id);
    expect((await waitForRun(modeller, (body as Run).id)).job.state).toBe('finished');
  }
  maps = [await readCodes(runIds[0]!), await readCodes(runIds[1]!)];
  await writeFile(join(dir, 'zones.geojson'), makeZones());
  const convert = (format: string, to: string) =>
    execFileSync('ogr2ogr', ['-f', format, join(dir, to), join(dir, 'zones.geojson')]);
  convert('GPKG', 'zones.gpkg');
  convert('KML', 'zones.kml');
  execFileSync('ogr2ogr', ['-t_srs', 'EPSG:3857', join(dir, 'zones.shp'), join(dir, 'zones.geojson')]);
  await zip(['zones.shp', 'zones.shx', 'zones.dbf', 'zones.prj'], join(dir, 'zones.zip'));
}, 120_000);
afterAll(async () => {
  await test.close();
  await rm(dir, { recursive: true, force: true });
});

describe('zone layers', () => {
  it.each(['zones.geojson', 'zones.gpkg', 'zones.zip'])(
    'are read from %s, whatever its reference system',
    async (file) => {
      const layer = zoneLayerSchema.parse((await send(file).expect(201)).body);
      expect(layer.name).toBe('zones');
      expect(layer.zones.map(({ name }) => name)).toEqual(['West', 'Middle']);
      // 40 × 96 pixels each; the scene's projection keeps areas to a part in a thousand.
      const pixelHa = (ground.scene.pixelWidth! * ground.scene.pixelHeight!) / 10_000;
      for (const { areaHa } of layer.zones) expect(areaHa / (40 * SIDE * pixelHa)).toBeCloseTo(1, 2);
      await lead.delete(`${API}/zone-layers/${layer.id}`).expect(204);
    },
  );

  it('take names from the field asked for, or number what has none', async () => {
    const layer = zoneLayerSchema.parse(
      (await send('zones.gpkg', { name: 'By code', nameField: 'code' }).expect(201)).body,
    );
    expect(layer.zones.map(({ name }) => name)).toEqual(['0', '40']);
    const kml = zoneLayerSchema.parse((await send('zones.kml').expect(201)).body);
    expect(kml.zones).toHaveLength(2);
    for (const { id } of [layer, kml]) await lead.delete(`${API}/zone-layers/${id}`).expect(204);
  });

  it('refuse what are no zones, and say what was found', async () => {
    const write = (name: string, text: string) => writeFile(join(dir, name), text);
    await write('points.geojson', '{"type":"Feature","properties":{},"geometry":{"type":"Point","coordinates":[1,2]}}');
    await write('noise.gpkg', 'this is no GeoPackage');
    await write('none.geojson', '{"type":"FeatureCollection","features":[]}');
    await zip(['zones.dbf'], join(dir, 'no-shape.zip'));
    await writeFile(join(dir, 'cut.zip'), (await readFile(join(dir, 'zones.zip'))).subarray(0, 300));
    for (const [name, found] of [
      ['points.geojson', 'Point'],
      ['noise.gpkg', 'cannot read'],
      ['none.geojson', 'no '],
      ['no-shape.zip', 'no .shp'],
      ['cut.zip', 'damaged'],
    ] as const) {
      const { body } = await send(name).expect(400);
      expect(body).toMatchObject({ code: 'file-refused' });
      expect((body as { found: string }).found).toContain(found);
    }
    const { body } = await send('zones.gpkg', { nameField: 'nowhere' }).expect(400);
    expect((body as { wanted: string }).wanted).toContain('parish');
    expect((await lead.get(`${projectPath}/zone-layers`).expect(200)).body.layers).toEqual([]);
  });
});

describe('a design drawn from zones', () => {
  let layer: ZoneLayer;
  let design: Design;
  const plan = () => ({
    ...{ runId: runIds[1], strata: { kind: 'zones', layerId: layer.id } },
    ...{ target: { kind: 'total', total: 90 }, allocation: { kind: 'proportional' }, seed: 3, answersPerPoint: 1 },
  });

  beforeAll(async () => {
    layer = (await send('zones.geojson').expect(201)).body as ZoneLayer;
  });

  it('has the zones and what lies outside them as strata, pixel for pixel', async () => {
    const { seed: _seed, answersPerPoint: _answers, ...asked } = plan();
    const { strata } = (await lead.post(`${projectPath}/designs/plan`).send(asked).expect(200)).body as DesignPlan;
    const count = (from: number, to: number) =>
      maps[1]!.filter((code, i) => code !== 255 && i % SIDE >= from && i % SIDE < to).length;
    expect(strata.map(({ name, pixels }) => [name, pixels])).toEqual([
      ['West', count(0, 40)],
      ['Middle', count(40, 80)],
      ['Outside the zones', count(80, SIDE)],
    ]);
  });

  it('estimates the map from strata that are not its classes, zone by zone as well', async () => {
    design = (await lead.post(`${projectPath}/designs`).send(plan()).expect(201)).body as Design;
    await lead.post(`${API}/designs/${design.id}/open`).expect(200);
    const points = await test.app.db.getRepository(ReferencePoint).findBy({ designId: design.id });
    for (const { pixelRow, pixelColumn, mappedCode } of points) {
      expect(mappedCode).toBe(maps[1]![pixelRow * SIDE + pixelColumn]);
    }
    const truthAt = ({ pixelColumn }: ReferencePoint) =>
      ground.classes[Math.min(2, Math.floor((pixelColumn * 3) / SIDE))]!;
    for (const point of points) {
      await reviewer
        .put(`${API}/points/${point.id}/answer`)
        .send({ classId: truthAt(point).id })
        .expect(200);
    }
    await lead.post(`${API}/designs/${design.id}/adjudicate`).send({}).expect(200);
    await lead.post(`${API}/designs/${design.id}/close`).send({}).expect(200);
    const estimates = (await lead.get(`${API}/designs/${design.id}/estimates`).expect(200)).body as Estimates;
    // By hand: the weighted mean of the strata's shares of right points, and its standard error (Cochran 1977, eq. 5.1 and 5.7).
    let overall = 0;
    let variance = 0;
    estimates.design.strata.forEach(({ weight, used }, h) => {
      const own = points.filter(({ stratum }) => stratum === h);
      const right = own.filter((point) => truthAt(point).code === point.mappedCode).length / used;
      overall += weight * right;
      variance += (weight ** 2 * right * (1 - right)) / (used - 1);
    });
    expect(estimates.overall.value).toBeCloseTo(overall, 12);
    expect(estimates.overall.standardError).toBeCloseTo(Math.sqrt(variance), 12);
    const areas = estimates.perClass.reduce((sum, { mappedAreaHa }) => sum + mappedAreaHa, 0);
    expect(areas).toBeCloseTo(estimates.design.totalAreaHa, 6);

    const { body } = await lead.get(`${API}/designs/${design.id}/zones?layerId=${layer.id}`).expect(200);
    const { zones } = zoneEstimatesSchema.parse(body);
    zones.forEach(({ overall: inZone, points: n }, h) => {
      const own = points.filter(({ stratum }) => stratum === h);
      // Here each zone is a stratum, so its estimate is the plain share of right points.
      expect(n).toBe(own.length);
      const right = own.filter((point) => truthAt(point).code === point.mappedCode).length;
      expect(inZone.value).toBeCloseTo(right / own.length, 12);
    });
  });

  it('keeps its strata when the layer is deleted, but tells that it is gone', async () => {
    await lead.delete(`${API}/zone-layers/${layer.id}`).expect(204);
    await lead.get(`${API}/designs/${design.id}/estimates`).expect(200);
    await lead.get(`${API}/designs/${design.id}/zones?layerId=${layer.id}`).expect(400);
    const plan = { ...design, id: undefined };
    expect(plan.strataKind).toEqual({ kind: 'zones', layerId: layer.id });
  });
});

describe('a design drawn from the change between two maps', () => {
  it('has as strata what stays and what changes', async () => {
    const asked = {
      ...{ runId: runIds[1], strata: { kind: 'from-to', runId: runIds[0] } },
      ...{ target: { kind: 'total', total: 60 }, allocation: { kind: 'equal' } },
    };
    const { strata } = (await lead.post(`${projectPath}/designs/plan`).send(asked).expect(200)).body as DesignPlan;
    const [before, after] = maps as [Uint8Array, Uint8Array];
    const total = before.filter((code, i) => code !== 255 && after[i] !== 255).length;
    expect(strata.reduce((sum, { pixels }) => sum + pixels, 0)).toBe(total);
    for (const { code, name } of ground.classes) {
      const stays = before.filter((value, i) => value === code && after[i] === code).length;
      expect(strata.find((stratum) => stratum.name === `${name}, both times`)?.pixels).toBe(stays);
    }
    const design = (
      await lead
        .post(`${projectPath}/designs`)
        .send({ ...asked, seed: 5 })
        .expect(201)
    ).body as Design;
    const { strata: drawn } = await test.app.db.getRepository(ReferenceDesign).findOneByOrFail({ id: design.id });
    for (const point of await test.app.db.getRepository(ReferencePoint).findBy({ designId: design.id })) {
      const at = point.pixelRow * SIDE + point.pixelColumn;
      const pair = before[at]! * 256 + after[at]!;
      expect(point.mappedCode).toBe(after[at]);
      expect([pair, 65_534]).toContain(drawn[point.stratum]!.code);
    }
    await lead.delete(`${API}/designs/${design.id}`).expect(204);
  });

  it('refuses the same run twice', async () => {
    const asked = {
      ...{ runId: runIds[0], strata: { kind: 'from-to', runId: runIds[0] } },
      ...{ target: { kind: 'total', total: 60 }, allocation: { kind: 'equal' } },
    };
    await lead.post(`${projectPath}/designs/plan`).send(asked).expect(400);
  });
});

describe('kappas of two maps judged by independent designs', () => {
  async function judge(runId: string, seed: number): Promise<string> {
    const asked = {
      ...{ runId, target: { kind: 'total', total: 30 }, allocation: { kind: 'equal' }, seed, answersPerPoint: 1 },
    };
    const { id } = (await lead.post(`${projectPath}/designs`).send(asked).expect(201)).body as Design;
    await lead.post(`${API}/designs/${id}/open`).expect(200);
    for (const point of await test.app.db.getRepository(ReferencePoint).findBy({ designId: id })) {
      const truth = ground.classes[Math.min(2, Math.floor((point.pixelColumn * 3) / SIDE))]!;
      await reviewer.put(`${API}/points/${point.id}/answer`).send({ classId: truth.id }).expect(200);
    }
    await lead.post(`${API}/designs/${id}/adjudicate`).send({}).expect(200);
    await lead.post(`${API}/designs/${id}/close`).send({}).expect(200);
    return id;
  }

  it('differ by z = (K₁ − K₂) / √(S₁² + S₂²), and only where the designs share no points', async () => {
    const [one, two] = [await judge(runIds[0]!, 21), await judge(runIds[1]!, 22)];
    const { body } = await lead.get(`${API}/designs/${one}/kappas?designId=${two}`).expect(200);
    const { first, second, z } = kappaComparisonSchema.parse(body);
    const spread = Math.hypot(first.standardError, second.standardError);
    expect(z).toBeCloseTo((first.kappa - second.kappa) / spread, 12);
    await lead.get(`${API}/designs/${one}/kappas?designId=${one}`).expect(400);
    const same = await judge(runIds[0]!, 22);
    await lead.get(`${API}/designs/${two}/kappas?designId=${same}`).expect(400);
  });
});
