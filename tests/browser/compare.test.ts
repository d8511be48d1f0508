import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  DESK,
  enterAs,
  expectAccessible,
  expectNoSidewaysScroll,
  launch,
  open,
  PHONE,
} from './browser-kit.ts';
import { type Bench, measuredSample } from './trace-kit.ts';

let browser: Browser;
let good: Bench;
let late: Bench;
let address = '';

beforeAll(async () => {
  browser = await launch();
  good = await measuredSample('crank-60-2-with-cam.csv', 'Cam in time');
  late = await measuredSample('crank-60-2-cam-late.csv', 'Cam late', good.desk);
});
afterAll(() => browser.close());

describe('comparing', () => {
  it('a capture is kept as known-good, published by another person, chosen and compared over crank degrees', async () => {
    const { page, complaints, close } = await open(browser, DESK);
    await enterAs(page, good.desk.workshop, 'technician');
    await page.goto(`/captures/${good.id}`);
    await page.getByRole('button', { name: 'Keep as known-good' }).click();
    const dialog = page.getByRole('dialog', { name: 'Keep as known-good' });
    await dialog.getByLabel('Make').fill('Orvane');
    await dialog.getByLabel('Model').fill('Kestle 1.6');
    await dialog.getByLabel('Where it comes from').fill('Recorded for this test by the sample program.');
    await expectAccessible(page);
    await dialog.getByRole('button', { name: 'Propose' }).click();
    const link = page.getByRole('link', { name: 'See the proposal' });
    const id = (await link.getAttribute('href'))!.split('/').at(-1);

    await enterAs(page, good.desk.workshop, 'instructor');
    const published = await page.request.post(`/api/v1/known-goods/${id}/reviews`, {
      headers: { origin: new URL(page.url()).origin },
      data: { decision: 'publish', note: '' },
    });
    expect(published.status()).toBe(201);

    await enterAs(page, good.desk.workshop, 'technician');
    await page.goto(`/captures/${late.id}/compare`);
    await page.getByRole('button', { name: 'Cam', exact: true }).click();
    await page.getByRole('button', { name: /^Orvane Kestle 1\.6/ }).waitFor();
    await expectAccessible(page);
    await page.getByRole('button', { name: /^Orvane Kestle 1\.6/ }).click();
    await page.waitForURL('**/comparisons/*');
    address = page.url();
    await page
      .getByText(/^The cam comes 18\.0 degrees late/)
      .first()
      .waitFor();
    await page.locator('.plot-lane[data-draws]').waitFor();
    expect(complaints).toEqual([]);
    await close();
  });

  it.each([
    ['phone', PHONE],
    ['desk', DESK],
  ] as const)(
    'on a %s it says the difference, draws both and lists every value with its verdict',
    async (_, device) => {
      const { page, complaints, close } = await open(browser, device);
      await enterAs(page, good.desk.workshop, 'technician');
      await page.goto(address);
      await page.getByText('6 of 10 outside').waitFor();
      await page.getByText(/^Aligned at the gap/).waitFor();
      const row = page.getByRole('row').filter({ hasText: 'Rising edge 1' });
      expect(await row.innerText()).toMatch(/75\.0°[\s\S]*57\.0°[\s\S]*\+18\.0°[\s\S]*outside/);
      expect(await page.locator('.plot-lane').getAttribute('data-draws')).not.toBeNull();
      await expectNoSidewaysScroll(page);
      await expectAccessible(page);
      await page.emulateMedia({ colorScheme: 'dark' });
      await expectAccessible(page);
      expect(complaints).toEqual([]);
      await close();
    },
  );

  it('another capture of the circuit is a reference too', async () => {
    const { page, complaints, close } = await open(browser, PHONE);
    await enterAs(page, good.desk.workshop, 'technician');
    await page.goto(`/captures/${late.id}/compare`);
    await page.getByRole('button', { name: /^Cam in time/ }).click();
    await page.waitForURL('**/comparisons/*');
    await page.getByText(/^Aligned at/).waitFor();
    expect(complaints).toEqual([]);
    await close();
  });
});
