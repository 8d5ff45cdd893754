import { fromArrayBuffer } from 'geotiff';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { generateIsland } from '../../server/demo/island/generate-island.ts';
import type { Accuracy } from '../../shared/contracts/accuracy.ts';
import type { Run } from '../../shared/contracts/run.ts';
import { openProduct, type Product } from './open-product.ts';

let product: Product;
let page: Page;
let projectId = '';
let run: Run;

beforeAll(async () => {
  product = await openProduct({ GROUNDSEL_DEMO: 'on' });
  const context = await product.browser.newContext({ viewport: { width: 1440, height: 900 }, colorScheme: 'dark' });
  page = await context.newPage();
  page.setDefaultTimeout(20_000);
});
afterAll(() => product.close());

async function getJson<T>(path: string): Promise<T> {
  const answer = await page.request.get(`${product.url}/api/v1${path}`);
  expect(answer.ok(), path).toBe(true);
  return (await answer.json()) as T;
}

async function signInAs(name: string): Promise<void> {
  const password = /password (\S+) unless/.exec(product.printed())?.[1] ?? '';
  await page.request.delete(`${product.url}/api/v1/session`);
  await page.goto(`${product.url}/sign-in`);
  await page.getByLabel(/e-mail/i).fill(`${name}@vennory.example`);
  await page
    .getByLabel(/password/i)
    .first()
    .fill(password);
  await page.keyboard.press('Enter');
  await page.waitForURL(/\/projects/);
}

describe('the demo that the first start loads', () => {
  it('opens on a finished run, told in one sentence', async () => {
    await signInAs('lead');
    projectId = (await getJson<{ projects: { id: string }[] }>('/projects')).projects[0]!.id;
    run = (await getJson<{ runs: Run[] }>(`/projects/${projectId}/runs`)).runs[0]!;
    expect(run.job.state).toBe('finished');
    await page.goto(`${product.url}/projects/${projectId}/overview`);
    await page.getByText(/Run 1 agrees with/).waitFor();
    const { samples } = await getJson<{ samples: unknown[] }>(`/projects/${projectId}/samples`);
    expect(samples).toHaveLength(250);
  });

  it('shows both scenes and the class map as tiles', async () => {
    await page.goto(`${product.url}/projects/${projectId}/samples`);
    await page.locator('img.leaflet-tile-loaded').first().waitFor();
    await page.getByText('Spring', { exact: true }).click();
    await page.locator('img.leaflet-tile-loaded').first().waitFor();
    await page.goto(`${product.url}/projects/${projectId}/runs/${run.id}`);
    await page.locator(`img.leaflet-tile-loaded[src*="/runs/${run.id}/tiles/"]`).first().waitFor();
  });

  it('has a class map that agrees with the generator’s truth about as well as its held-out samples say', async () => {
    const answer = await page.request.get(`${product.url}/api/v1/runs/${run.id}/class-map.tif`);
    const body = await answer.body();
    const image = await (
      await fromArrayBuffer(body.buffer.slice(body.byteOffset, body.byteOffset + body.byteLength) as ArrayBuffer)
    ).getImage();
    const [codes] = (await image.readRasters()) as unknown as [Uint8Array];
    const { trueClass } = generateIsland();
    expect(codes).toHaveLength(trueClass.length);
    let right = 0;
    let mapped = 0;
    for (let i = 0; i < trueClass.length; i++) {
      if (codes[i] === 255) continue;
      mapped++;
      if (codes[i] === trueClass[i]) right++;
    }
    expect(mapped).toBe(trueClass.length);
    const { overall } = await getJson<Accuracy>(`/runs/${run.id}/accuracy?unit=pixel`);
    expect(right / mapped).toBeGreaterThan(0.8);
    // Purposive samples describe themselves, so this asks for the neighbourhood only.
    expect(Math.abs(right / mapped - (overall.value ?? 0))).toBeLessThan(0.12);
  });

  it('keeps the map from the client until it is handed over', async () => {
    await signInAs('client');
    await page.goto(`${product.url}/projects/${projectId}`);
    await page.getByText('has been handed over yet').waitFor();
    expect((await page.request.get(`${product.url}/api/v1/runs/${run.id}`)).status()).toBe(404);
  });
});
