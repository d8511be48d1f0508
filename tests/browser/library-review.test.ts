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
let bench: Bench;
let id = '';

beforeAll(async () => {
  browser = await launch();
  bench = await measuredSample('crank-60-2-with-cam.csv', 'To be reviewed');
});
afterAll(() => browser.close());

describe('reviewing a known-good', () => {
  it('a stretch is proposed with instrument, probe and years', async () => {
    const { page, complaints, close } = await open(browser, DESK);
    await enterAs(page, bench.desk.workshop, 'technician');
    await page.goto(`/captures/${bench.id}`);
    await page.getByRole('button', { name: 'Keep as known-good' }).click();
    const dialog = page.getByRole('dialog', { name: 'Keep as known-good' });
    await dialog.getByLabel('From', { exact: true }).fill('0.1');
    await dialog.getByLabel('To', { exact: true }).fill('1');
    await dialog.getByLabel('Make').fill('Orvane');
    await dialog.getByLabel('Model').fill('Kestle 1.6');
    await dialog.getByLabel('First year').fill('2011');
    await dialog.getByLabel('Last year').fill('2014');
    await dialog.getByLabel('Instrument').fill('Two-channel handheld');
    await dialog.getByLabel('Where it comes from').fill('Recorded for this test by the sample program.');
    await dialog.getByRole('button', { name: 'Propose' }).click();
    id = (await page.getByRole('link', { name: 'See the proposal' }).getAttribute('href'))!
      .split('/')
      .at(-1)!;
    expect(complaints).toEqual([]);
    await close();
  });

  it.each([
    ['phone', PHONE],
    ['desk', DESK],
  ] as const)('on a %s its page draws the frozen trace and says where it came from', async (_, device) => {
    const { page, complaints, close } = await open(browser, device);
    await enterAs(page, bench.desk.workshop, 'technician');
    await page.goto(`/library/${id}`);
    await page.locator('.plot-lane[data-draws]').first().waitFor();
    await page.getByText('Two-channel handheld').waitFor();
    await page.getByText('2011 to 2014').first().waitFor();
    await page.getByText('Nobody has reviewed it yet.').waitFor();
    await expectNoSidewaysScroll(page);
    await expectAccessible(page);
    expect(complaints).toEqual([]);
    await close();
  });

  it('another person returns it with a reason, which the history tells, and its author may not review it', async () => {
    const { page, complaints, close } = await open(browser, DESK);
    await enterAs(page, bench.desk.workshop, 'instructor');
    await page.goto(`/library/${id}`);
    await page.getByRole('button', { name: 'Return to its author' }).click();
    await page.getByText('Say what is missing, so that it can be mended').waitFor();
    await page.getByLabel('Note to the author').fill('Name the vehicle.');
    await page.getByRole('button', { name: 'Return to its author' }).click();
    await page.getByText('Name the vehicle.').waitFor();
    await page.getByText('returned it').waitFor();
    await enterAs(page, bench.desk.workshop, 'technician');
    await page.goto(`/library/${id}`);
    expect(await page.getByRole('button', { name: 'Publish' }).count()).toBe(0);
    expect(complaints).toEqual([]);
    await close();
  });
});
