import AxeBuilder from '@axe-core/playwright';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { generateIsland } from '../../server/demo/island/generate-island.ts';
import type { BlindPoint, Design, Estimates } from '../../shared/contracts/reference.ts';
import type { Run } from '../../shared/contracts/run.ts';
import { openProduct, type Product } from './open-product.ts';

let product: Product;
let lead: Page;
let reviewer: Page;
let second: Page;
let projectId = '';
let run: Run;
let design: Design;

/** A page of somebody's own, signed in. */
async function openAs(name: string): Promise<Page> {
  const context = await product.browser.newContext({ viewport: { width: 1440, height: 900 } });
  const page = await context.newPage();
  page.setDefaultTimeout(20_000);
  const password = /password (\S+) unless/.exec(product.printed())?.[1] ?? '';
  const answer = await page.request.post(`${product.url}/api/v1/session`, {
    data: { email: `${name}@vennory.example`, password },
    headers: { origin: product.url },
  });
  expect(answer.ok()).toBe(true);
  return page;
}

async function getJson<T>(page: Page, path: string): Promise<T> {
  const answer = await page.request.get(`${product.url}/api/v1${path}`);
  expect(answer.ok(), path).toBe(true);
  return (await answer.json()) as T;
}

const designUrl = (rest = '') => `${product.url}/projects/${projectId}/accuracy/designs/${design.id}${rest}`;

async function expectAccessible(page: Page): Promise<void> {
  const { violations } = await new AxeBuilder({ page }).withTags(['wcag2a', 'wcag2aa', 'wcag22aa']).analyze();
  expect(violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html}`)).toEqual([]);
}

/** Answers every point that waits by keyboard alone: `digit` for the first ones, the class of place 1 for the others. */
async function answerAll(page: Page, digit: string): Promise<void> {
  await page.goto(designUrl('/check'));
  const heading = page.getByRole('heading', { level: 2 });
  await heading.waitFor();
  // One picture is enough here, and quicker than six.
  await page.keyboard.press('v');
  for (let place = 0; place < design.n; place++) {
    const number = await heading.textContent();
    await page.keyboard.press(place < 3 ? digit : '1');
    await page.keyboard.press('Enter');
    await page.waitForFunction((before) => document.querySelector('h2')?.textContent !== before, number);
  }
  await page.getByText('All your points are answered').waitFor();
}

beforeAll(async () => {
  product = await openProduct({ GROUNDSEL_DEMO: 'on' });
  lead = await openAs('lead');
  reviewer = await openAs('reviewer');
  second = await openAs('reviewer-b');
  projectId = (await getJson<{ projects: { id: string }[] }>(lead, '/projects')).projects[0]!.id;
  run = (await getJson<{ runs: Run[] }>(lead, `/projects/${projectId}/runs`)).runs.find(({ number }) => number === 1)!;
});
afterAll(() => product.close());

describe('a map judged by reference points', () => {
  it('has, in the demo, an estimate whose interval holds the truth', async () => {
    const { designs } = await getJson<{ designs: Design[] }>(lead, `/projects/${projectId}/designs`);
    const closed = designs.find(({ state, runId }) => state === 'closed' && runId === run.id)!;
    const { overall } = await getJson<Estimates>(lead, `/designs/${closed.id}/estimates`);
    const { fromArrayBuffer } = await import('geotiff');
    const body = await (await lead.request.get(`${product.url}/api/v1/runs/${run.id}/class-map.tif`)).body();
    const buffer = body.buffer.slice(body.byteOffset, body.byteOffset + body.byteLength) as ArrayBuffer;
    const [codes] = (await (await (await fromArrayBuffer(buffer)).getImage()).readRasters()) as unknown as [Uint8Array];
    const { trueClass } = generateIsland();
    let right = 0;
    for (let i = 0; i < trueClass.length; i++) if (codes[i] === trueClass[i]) right++;
    // Two people who err now and then judged it, so a little more than the sampling interval is allowed.
    expect(right / trueClass.length).toBeGreaterThan(overall.low! - 0.01);
    expect(right / trueClass.length).toBeLessThan(overall.high! + 0.01);
  });

  it('is planned with a live curve, and drawn', async () => {
    await lead.goto(`${product.url}/projects/${projectId}/accuracy`);
    await lead.getByRole('link', { name: 'Plan reference points' }).click();
    await lead.getByText('Precision by number of points').waitFor();
    const planned = lead.locator('mark');
    await planned.filter({ hasText: /points/ }).waitFor();
    expect(await planned.textContent()).not.toContain('20');
    await lead.getByText('Number of points', { exact: true }).click();
    await lead.getByLabel('Points in all').fill('10');
    await lead.getByText('The same for each class').click();
    await planned.filter({ hasText: /^20\spoints$/ }).waitFor();
    await expectAccessible(lead);
    await lead.getByRole('button', { name: 'Draw points' }).click();
    await lead.waitForURL(/designs\/[0-9a-f-]{36}$/);
    const id = lead.url().split('/').at(-1)!;
    design = await getJson<Design>(lead, `/designs/${id}`);
    expect(design).toMatchObject({ state: 'draft', n: 20, digest: null });
  });

  it('is frozen with a digest when the blind check opens', async () => {
    await lead.getByRole('button', { name: 'Open the blind check' }).click();
    await lead.getByRole('button', { name: 'Open and freeze' }).click();
    await lead.getByText('Reviewers answer the points without seeing the map.').waitFor();
    expect((await getJson<Design>(lead, `/designs/${design.id}`)).digest).toMatch(/^[0-9a-f]{64}$/);
    await expectAccessible(lead);
  });

  it('is interpreted by two people by keyboard, who are sent nothing of the map', async () => {
    const bodies: string[] = [];
    const refused: string[] = [];
    // Every answer of the server passes through here, so that none is missed because the page moved on.
    await reviewer.route(
      (url) => url.pathname.startsWith('/api/v1/') && !/events|tiles/.test(url.pathname),
      async (at) => {
        const response = await at.fetch();
        bodies.push(await response.text());
        if (at.request().url().includes('/runs/') && response.ok()) refused.push(at.request().url());
        await at.fulfill({ response });
      },
    );
    await reviewer.goto(designUrl('/check'));
    await reviewer.locator('img.leaflet-tile-loaded').first().waitFor();
    await expectAccessible(reviewer);
    await reviewer.keyboard.press('?');
    const keys = reviewer.getByRole('dialog', { name: 'Keys of the blind check' });
    await keys.getByText('Save and go on').waitFor();
    await reviewer.keyboard.press('Escape');
    await keys.waitFor({ state: 'hidden' });
    await reviewer.keyboard.press('3');
    await reviewer.keyboard.press('a');
    await reviewer.keyboard.press('4');
    await reviewer.keyboard.press('n');
    await reviewer.keyboard.type('wet ground');
    await reviewer.keyboard.press('Escape');
    await reviewer.reload();
    await reviewer.getByRole('button', { name: /Saltmarsh/, pressed: true }).waitFor();
    expect(await reviewer.getByLabel(/Note/).inputValue()).toBe('wet ground');
    await answerAll(reviewer, '3');
    await reviewer.unrouteAll({ behavior: 'wait' });
    await answerAll(second, '2');
    expect(bodies.length).toBeGreaterThan(20);
    expect(bodies.filter((text) => /mapped|"strata":\[/i.test(text.replaceAll(/"mapsWithheld":\w+/g, '')))).toEqual([]);
    expect(refused).toEqual([]);
    for (const path of [
      `/runs/${run.id}/class-map.tif`,
      `/runs/${run.id}/accuracy`,
      `/designs/${design.id}/estimates`,
    ]) {
      expect((await reviewer.request.get(`${product.url}/api/v1${path}`)).ok(), path).toBe(false);
    }
  });

  it('keeps an answer while the line is down, and saves it once it is back', async () => {
    await second.goto(designUrl('/check'));
    await second.getByRole('button', { name: 'Look at them again' }).click();
    const heading = second.getByRole('heading', { level: 2 });
    await heading.waitFor();
    const before = await heading.textContent();
    await second.keyboard.press('n');
    await second.keyboard.type('seen from the road');
    await second.keyboard.press('Escape');
    await second.context().setOffline(true);
    await second.keyboard.press('Enter');
    await second.getByText('No network.').waitFor();
    expect(await heading.textContent()).toBe(before);
    await second.context().setOffline(false);
    await second.getByText('All your points are answered').waitFor();
    const number = Number(/\d+/.exec(before ?? '')?.[0]);
    const { answer } = await getJson<BlindPoint>(second, `/designs/${design.id}/points/${number}`);
    expect(answer?.note).toBe('seen from the road');
  });

  it('has its disagreements decided, and is closed', async () => {
    await lead.goto(designUrl());
    await lead.getByRole('button', { name: 'End the blind check' }).click();
    await lead.getByRole('alertdialog').getByRole('button', { name: 'End the blind check' }).click();
    await lead.getByText('Krippendorff’s alpha').waitFor();
    await reviewer.goto(designUrl('/decide'));
    await reviewer.getByText(/points? to decide/).waitFor();
    await expectAccessible(reviewer);
    const nDisputed = (await getJson<Design>(reviewer, `/designs/${design.id}`)).progress.disputed;
    expect(nDisputed).toBeGreaterThan(0);
    for (let left = nDisputed; left > 0; left--) {
      await reviewer
        .getByRole('status')
        .filter({ hasText: new RegExp(`^${left}\\spoint`) })
        .waitFor();
      await reviewer.keyboard.press('1');
      await reviewer.keyboard.press('Enter');
    }
    await reviewer.getByText('All decided').waitFor();
    await lead.goto(designUrl());
    await lead.getByRole('button', { name: 'Close the design' }).click();
    await lead.getByRole('alertdialog').getByRole('button', { name: 'Close the design' }).click();
    await lead.getByRole('link', { name: 'Read the estimates' }).click();
  });

  it('gives estimates for three readers, each figure with how it was computed, and as CSV', async () => {
    await lead.getByText('of the mapped area is mapped rightly').waitFor();
    await lead.getByRole('table', { name: 'Areas of the classes' }).waitFor();
    await lead.getByRole('button', { name: 'Overall accuracy, how was this computed?' }).first().click();
    const how = lead.getByRole('dialog', { name: 'How Overall accuracy was computed' });
    await how.getByText(/Olofsson/).waitFor();
    await how.evaluate((box) => Promise.all(box.getAnimations().map(({ finished }) => finished)));
    await expectAccessible(lead);
    await lead.keyboard.press('Escape');
    await how.waitFor({ state: 'hidden' });
    await expectAccessible(lead);
    const [download] = await Promise.all([
      lead.waitForEvent('download'),
      lead.getByRole('link', { name: 'Download the estimates as CSV' }).click(),
    ]);
    const { readFile } = await import('node:fs/promises');
    const csv = await readFile(await download.path(), 'utf8');
    expect(csv).toContain('overall accuracy');
    expect(csv).toContain('stratum,code,pixels');
  });
});
