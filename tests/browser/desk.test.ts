import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openProduct, type Product } from './open-product.ts';

const PASSWORD = 'vennory-demo';
/** Half the side of a drawn square on the screen, pixels. */
const REACH = 16;

let product: Product;
let first: Page;
let second: Page;
let lead: Page;
let project: string;

async function openDesk(email: string, query = ''): Promise<Page> {
  const page = await (await product.browser.newContext({ viewport: { width: 1440, height: 900 } })).newPage();
  page.setDefaultTimeout(15_000);
  const headers = { origin: product.url };
  await page.request.post(`${product.url}/api/v1/session`, { data: { email, password: PASSWORD }, headers });
  const list = await page.request.get(`${product.url}/api/v1/projects`);
  project = ((await list.json()) as { projects: { id: string }[] }).projects[0]?.id ?? '';
  await page.goto(`${product.url}/projects/${project}/samples${query}`);
  await map(page).waitFor();
  return page;
}

const map = (page: Page) => page.locator('.leaflet-container');
/** The map says how many samples it shows. */
const countOn = async (page: Page) =>
  Number(/with (\d+) samples/.exec((await map(page).getAttribute('aria-label')) ?? '')?.[1]);

async function waitForCount(page: Page, count: number, withinMs: number): Promise<void> {
  const deadline = Date.now() + withinMs;
  while ((await countOn(page)) !== count) {
    if (Date.now() > deadline)
      throw new Error(`${count} samples wanted within ${withinMs} ms, got ${await countOn(page)}`);
    await page.waitForTimeout(25);
  }
}

beforeAll(async () => {
  product = await openProduct({ GROUNDSEL_DEMO: 'on' });
  [first, second, lead] = [
    await openDesk('labeller-a@vennory.example'),
    await openDesk('labeller-b@vennory.example'),
    await openDesk('lead@vennory.example'),
  ];
}, 240_000);
afterAll(() => product.close());

describe('two labellers and the lead at one desk', () => {
  it('shows who else is there', async () => {
    await second.getByRole('list', { name: 'Also at the desk' }).getByText('Labeller A').waitFor({ state: 'attached' });
  });

  it('shows a drawing of one at the other within two seconds of saving', async () => {
    const before = await countOn(second);
    await first.keyboard.press('p');
    const box = (await map(first).boundingBox())!;
    const [x, y] = [box.x + box.width * 0.62, box.y + box.height * 0.32];
    for (const [dx, dy] of [
      [-REACH, -REACH],
      [REACH, -REACH],
      [REACH, REACH],
      [-REACH, REACH],
    ] as const) {
      await first.mouse.click(x + dx, y + dy);
    }
    await first.keyboard.press('Enter');
    await first.getByRole('button', { name: /^Save sample/ }).waitFor();
    const saved = first.waitForResponse(
      (answer) => answer.request().method() === 'POST' && /\/samples$/.test(answer.url()),
    );
    await first.keyboard.press('Enter');
    expect((await saved).status()).toBe(201);
    // The event takes under a second (event-stream.test.ts); the rest is left to a busy machine that draws three maps.
    await waitForCount(second, before + 1, 2_000);
  });

  it('shows at the lead’s who is changing a sample, and both versions to whoever saves second', async () => {
    const slip = first.getByRole('complementary');
    const title = (await slip.first().getAttribute('aria-label')) ?? '';
    const number = Number(/sample (\d+)/.exec(title)?.[1]);
    const list = await lead.request.get(`${product.url}/api/v1/projects/${project}/samples`);
    const { samples } = (await list.json()) as { samples: { id: string; number: number; version: number }[] };
    const sample = samples.find((one) => one.number === number)!;
    await first.keyboard.press('e');
    await lead.goto(`${product.url}/projects/${project}/samples?sample=${sample.id}`);
    await lead.getByText('Labeller A is changing this sample.').waitFor();
    await lead.request.patch(`${product.url}/api/v1/samples/${sample.id}`, {
      data: { version: sample.version, note: 'From the lead' },
      headers: { origin: product.url },
    });
    await first.getByRole('textbox', { name: /^Note/ }).fill('From the labeller');
    await first.getByRole('button', { name: /^Save changes/ }).click();
    const dialog = first.getByRole('dialog');
    await dialog.getByText('From the lead').waitFor();
    await dialog.getByText('From the labeller').waitFor();
    await dialog.getByRole('button', { name: /mine/i }).click();
    await dialog.waitFor({ state: 'hidden' });
  });

  it('takes a sample from submitted over returned with a comment to the labeller’s answer', async () => {
    await first.getByRole('button', { name: 'Submit', exact: true }).click();
    await lead.getByRole('button', { name: 'Return…' }).click();
    await lead.getByRole('textbox', { name: 'What is to be done' }).fill('Keep off the edge.');
    await lead.getByRole('button', { name: 'Return with comment' }).click();
    await first.getByText('Keep off the edge.').waitFor();
    await first.getByRole('textbox', { name: 'Comment' }).fill('Moved it.');
    await first.getByRole('button', { name: 'Add comment' }).click();
    await lead.getByText('Moved it.').waitFor();
    await first.getByRole('button', { name: 'Submit again' }).click();
    await lead.getByRole('button', { name: 'Accept' }).click();
    await first.getByText('Accepted', { exact: true }).first().waitFor();
  });
});
