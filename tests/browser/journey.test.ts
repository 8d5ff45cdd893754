import AxeBuilder from '@axe-core/playwright';
import { execFileSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import type { Accuracy } from '../../shared/contracts/accuracy.ts';
import type { Run } from '../../shared/contracts/run.ts';
import type { Scene } from '../../shared/contracts/scene.ts';
import { makeRaster, threeCovers } from '../factories/make-raster.ts';
import { findOnScreen } from './map-places.ts';
import { openProduct, type Product } from './open-product.ts';

/** A class, and where on the scene its samples are drawn: shares of the width from the west and of the height from the north. */
interface Cover {
  name: string;
  spots: [u: number, v: number][];
}
interface Journey {
  file: string;
  crs: string;
  size: [width: number, height: number];
  covers: Cover[];
  /** Overall accuracy that the covers, drawn where they are, must reach. */
  atLeast: number;
}

const realScene = join(import.meta.dirname, '../../../shared/data/coast-6band.tif');
const ADMIN = 'first.admin@vennory.example';
const PASSWORD = 'a password for the journey';
/** Half the side of a drawn square on the screen, pixels. */
const REACH = 13;

let product: Product;
let page: Page;
let dir: string;
const faults: string[] = [];

beforeAll(async () => {
  dir = await mkdtemp(join(tmpdir(), 'groundsel-journey-'));
  product = await openProduct({ GROUNDSEL_DEMO: 'off', GROUNDSEL_ADMIN_EMAIL: ADMIN });
  const context = await product.browser.newContext({ viewport: { width: 1440, height: 900 }, acceptDownloads: true });
  page = await context.newPage();
  page.setDefaultTimeout(20_000);
  page.on('pageerror', (error) => faults.push(String(error)));
  page.on('request', (request) => {
    if (!request.url().startsWith(product.url) && !/^(data|blob):/.test(request.url()))
      faults.push(`asked ${request.url()}`);
  });
});
afterEach(async ({ task }) => {
  // A picture of what went wrong, for whoever asks for it.
  const shots = process.env['GROUNDSEL_TEST_SHOTS'];
  if (shots && task.result?.state === 'fail')
    await page.screenshot({ path: join(shots, `${task.name.slice(0, 40)}.png`) });
});
afterAll(async () => {
  await product.close();
  await rm(dir, { recursive: true, force: true });
});

async function expectAccessible(what: string): Promise<void> {
  // Contrast is judged against what stands still.
  await page.waitForTimeout(300);
  const { violations } = await new AxeBuilder({ page })
    .withTags(['wcag2a', 'wcag2aa', 'wcag21aa', 'wcag22aa'])
    .analyze();
  expect(
    violations.map(({ id, nodes }) => `${what}: ${id}: ${nodes.map(({ target }) => target.join(' ')).join(', ')}`),
  ).toEqual([]);
}

async function getJson<T>(path: string): Promise<T> {
  const answer = await page.request.get(`${product.url}/api/v1${path}`);
  expect(answer.ok(), path).toBe(true);
  return (await answer.json()) as T;
}

async function goTo(stage: string): Promise<void> {
  await page
    .getByRole('navigation')
    .getByRole('link', { name: new RegExp(`^${stage}`) })
    .first()
    .click();
}

async function createProject(name: string): Promise<string> {
  await page.goto(`${product.url}/projects`);
  await page
    .getByRole('button', { name: /new project|create/i })
    .or(page.getByRole('link', { name: /new project/i }))
    .first()
    .click();
  const dialog = page.getByRole('dialog');
  await dialog.getByLabel('Name').fill(name);
  await dialog.getByRole('button', { name: /create/i }).click();
  await page.waitForURL(/\/projects\/[0-9a-f-]{36}/);
  return /projects\/([0-9a-f-]{36})/.exec(page.url())?.[1] ?? '';
}

async function uploadScene(projectId: string, file: string): Promise<Scene> {
  await goTo('Scenes');
  await page.getByRole('button', { name: 'Upload a scene' }).first().click();
  const dialog = page.getByRole('dialog');
  await dialog.locator('input[type=file]').setInputFiles(file);
  await expectAccessible('upload dialog');
  await dialog.getByRole('button', { name: /^Upload 1 file/ }).click();
  await page
    .getByText(/^(Ready|Check band roles)$/)
    .first()
    .waitFor({ timeout: 90_000 });
  const { scenes } = await getJson<{ scenes: Scene[] }>(`/projects/${projectId}/scenes`);
  expect(scenes).toHaveLength(1);
  return scenes[0]!;
}

async function addClasses(covers: readonly Cover[]): Promise<void> {
  await goTo('Classes');
  await page
    .getByRole('button', { name: /add (the first |a )?class/i })
    .first()
    .click();
  const dialog = page.getByRole('dialog');
  for (const { name } of covers) {
    await dialog.getByLabel('Name').fill(name);
    await dialog.getByRole('button', { name: /^Add/ }).click();
    await dialog.getByText(new RegExp(`Added .*${name}`)).waitFor();
  }
  await dialog.getByRole('button', { name: 'Done' }).click();
}

async function drawSamples(projectId: string, scene: Scene, covers: readonly Cover[]): Promise<void> {
  await goTo('Samples');
  await page.locator('img.leaflet-tile-loaded[src*="/tiles/"]').first().waitFor();
  await page.waitForTimeout(800);
  const [west, south, east, north] = scene.bounds!;
  let drawn = 0;
  for (const [place, { spots }] of covers.entries()) {
    for (const [u, v] of spots) {
      await page.keyboard.press(String(place + 1));
      await page.keyboard.press('p');
      const { x, y } = await findOnScreen(page, west + u * (east - west), north - v * (north - south));
      for (const [dx, dy] of [
        [-REACH, -REACH],
        [REACH, -REACH],
        [REACH, REACH],
        [-REACH, REACH],
      ] as const) {
        await page.mouse.move(x + dx, y + dy);
        await page.mouse.click(x + dx, y + dy);
      }
      await page.keyboard.press('Enter');
      const save = page.getByRole('button', { name: /^Save sample/ });
      await save.waitFor();
      if (drawn === 0) await expectAccessible('sampling desk with a drawing');
      await page.waitForFunction(() =>
        [...document.querySelectorAll('button')].some(
          (button) => /^Save sample/.test(button.textContent ?? '') && !button.disabled,
        ),
      );
      await page.keyboard.press('Enter');
      drawn++;
      await save.waitFor({ state: 'detached' });
      await page.keyboard.press('Escape');
      await page.waitForTimeout(250);
    }
  }
  const { samples } = await getJson<{ samples: { pixelCount: number }[] }>(`/projects/${projectId}/samples`);
  expect(samples).toHaveLength(drawn);
  expect(Math.min(...samples.map(({ pixelCount }) => pixelCount))).toBeGreaterThan(3);
}

async function startRun(projectId: string): Promise<Run> {
  await goTo('Runs');
  await page
    .getByRole('link', { name: /new run|first run/i })
    .or(page.getByRole('button', { name: /new run|first run/i }))
    .first()
    .click();
  await page.getByText('What this comes to').waitFor();
  // The page scrolls inside its frame; the frame itself never scrolls away.
  expect(await page.evaluate(() => document.documentElement.scrollHeight)).toBe(900);
  await page.getByRole('button', { name: 'Start run' }).click();
  await page.waitForURL(/\/runs\/[0-9a-f-]{36}/);
  await page.getByRole('link', { name: 'Read accuracy' }).waitFor({ timeout: 120_000 });
  const { runs } = await getJson<{ runs: Run[] }>(`/projects/${projectId}/runs`);
  expect(runs[0]?.job.state).toBe('finished');
  return runs[0]!;
}

async function readAccuracy(run: Run, atLeast: number): Promise<void> {
  await page.locator(`img.leaflet-tile-loaded[src*="/runs/${run.id}/tiles/"]`).first().waitFor();
  await expectAccessible('run page');
  await page.getByRole('link', { name: 'Read accuracy' }).click();
  const matrix = page
    .getByRole('table', { name: /confusion matrix/i })
    .or(page.getByRole('grid', { name: /confusion matrix/i }))
    .first();
  await matrix.waitFor();
  await page.getByText(/Rows: mapped class. Columns: reference class/).waitFor();
  const accuracy = await getJson<Accuracy>(`/runs/${run.id}/accuracy?unit=pixel`);
  expect(accuracy.overall.value).toBeGreaterThanOrEqual(atLeast);
  for (const row of accuracy.matrix)
    for (const count of row) await matrix.getByText(String(count), { exact: true }).first().waitFor();
  await page.getByText(/kappa/i).first().waitFor();
  await expectAccessible('accuracy page');
}

interface GdalInfo {
  size: [number, number];
  geoTransform: number[];
  coordinateSystem: { wkt: string };
  bands: {
    type: string;
    noDataValue: number;
    colorInterpretation: string;
    colorTable: { entries: number[][] };
    metadata: Record<string, Record<string, string>>;
  }[];
}
const gdalinfo = (path: string) =>
  JSON.parse(execFileSync('gdalinfo', ['-json', path], { encoding: 'utf8' })) as GdalInfo;

async function downloadClassMap(run: Run, { file, crs, size }: Journey): Promise<void> {
  await page.goBack();
  const waiting = page.waitForEvent('download');
  await page.getByRole('link', { name: 'Class map, GeoTIFF' }).click();
  const path = join(dir, `${run.id}.tif`);
  await (await waiting).saveAs(path);
  const [map, source] = [gdalinfo(path), gdalinfo(file)];
  expect(map.size).toEqual(size);
  expect(map.geoTransform).toEqual(source.geoTransform.map((value) => expect.closeTo(value, 6)));
  expect(map.coordinateSystem.wkt).toContain(crs);
  const band = map.bands[0]!;
  expect(band).toMatchObject({ type: 'Byte', noDataValue: 255, colorInterpretation: 'Palette' });
  for (const { code, name, colour } of run.classes) {
    expect(band.metadata['']?.[`CLASS_${code}`]).toBe(name);
    const [red, green, blue] = band.colorTable.entries[code] ?? [];
    expect(`#${[red, green, blue].map((value) => value?.toString(16).padStart(2, '0')).join('')}`).toBe(
      colour.toLowerCase(),
    );
  }
}

async function travel(name: string, journey: Journey): Promise<void> {
  const projectId = await createProject(name);
  const scene = await uploadScene(projectId, journey.file);
  expect([scene.width, scene.height]).toEqual(journey.size);
  await addClasses(journey.covers);
  await drawSamples(projectId, scene, journey.covers);
  const run = await startRun(projectId);
  await readAccuracy(run, journey.atLeast);
  await downloadClassMap(run, journey);
}

describe('a new site, from its first administrator to a class map', () => {
  it('lets the first administrator choose a password and sign in', async () => {
    const link = /Choose the password of \S+ here: (\S+)/.exec(product.printed())?.[1] ?? '';
    await page.goto(link.replace(/^https?:\/\/[^/]+/, product.url));
    await page.getByLabel(/name/i).first().fill('First Administrator');
    await page
      .getByLabel(/password/i)
      .first()
      .fill(PASSWORD);
    await page.keyboard.press('Enter');
    await page.waitForURL(/\/projects/);
    await expectAccessible('empty project list');
    await page.request.delete(`${product.url}/api/v1/session`);
    await page.goto(`${product.url}/projects`);
    await page.waitForURL(/sign-in/);
    await expectAccessible('sign-in');
    await page.getByLabel(/e-mail/i).fill(ADMIN);
    await page
      .getByLabel(/password/i)
      .first()
      .fill(PASSWORD);
    await page.keyboard.press('Enter');
    await page.waitForURL(/\/projects/);
  });

  it('makes a class map of a small scene, with its accuracy, and hands out a GeoTIFF that GDAL reads', async () => {
    const file = join(dir, 'three-covers.tif');
    await makeRaster(file, { width: 150, height: 120, value: threeCovers(150) });
    const rows = [0.15, 0.4, 0.65, 0.85];
    const covers = ['Open water', 'Woodland', 'Arable'].map((name, third) => ({
      name,
      spots: rows.map((v): [number, number] => [third / 3 + 1 / 6, v]),
    }));
    await travel('Three covers', { file, crs: 'UTM zone 28N', size: [150, 120], covers, atLeast: 0.95 });
  });

  it.skipIf(!existsSync(realScene))('does the same for a real six-band coastal scene', async () => {
    const covers: Cover[] = [
      {
        name: 'Sea',
        spots: [
          [0.93, 0.6],
          [0.85, 0.83],
          [0.77, 0.93],
          [0.95, 0.72],
        ],
      },
      {
        name: 'Woodland and scrub',
        spots: [
          [0.38, 0.4],
          [0.11, 0.11],
          [0.34, 0.06],
          [0.6, 0.565],
        ],
      },
      {
        name: 'Built-up',
        spots: [
          [0.82, 0.22],
          [0.55, 0.66],
          [0.45, 0.88],
          [0.8, 0.55],
        ],
      },
    ];
    await travel('Coast', {
      file: realScene,
      crs: 'SIRGAS 2000 / UTM zone 25S',
      size: [349, 352],
      covers,
      atLeast: 0.8,
    });
  });

  it('asked nothing of other machines and met no script error', () => {
    expect(faults).toEqual([]);
    expect(product.printed()).not.toMatch(/"level":(50|60)/);
  });
});
