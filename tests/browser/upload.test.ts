import { createHash } from 'node:crypto';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { sampleCsv } from '../api/capture-kit.ts';
import { pool } from '../api/security-kit.ts';
import { DESK, enter, expectAccessible, expectNoSidewaysScroll, launch, open, PHONE } from './browser-kit.ts';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

const file = (text: string | Buffer, name = 'kw-cold.csv') => ({
  name,
  mimeType: 'text/csv',
  buffer: Buffer.from(text),
});
const choose = (page: Page, ...files: ReturnType<typeof file>[]) =>
  page.setInputFiles('input[type=file]', files);
const onItsWay = (page: Page) => page.getByRole('list', { name: 'Files on their way' });
const openTrace = (page: Page) => onItsWay(page).getByRole('link', { name: 'Open the trace' });
const WAIT = { timeout: 45_000 };

const capturesOf = async (workshopId: string) =>
  (
    await pool.query<{ sha256: string; status: string; bytes: string }>(
      'select sha256, status, bytes from capture where workshop_id = $1',
      [workshopId],
    )
  ).rows;

describe.each([
  ['phone', PHONE],
  ['desk', DESK],
] as const)('upload on a %s', (name, device) => {
  it('an empty workshop teaches, and a sample goes all the way to its trace', async () => {
    const { page, complaints, close } = await open(browser, device);
    await enter(page, 'technician');
    await page.goto('/captures');
    await page.getByRole('heading', { name: 'No captures yet' }).waitFor();
    await page.getByText('What to record').waitFor();
    await expectAccessible(page);
    await page.getByRole('button', { name: name === 'phone' ? 'Sample' : 'Try a sample' }).click();
    await expectAccessible(page);
    await page.getByRole('button', { name: 'Add the sample Crank and cam while cranking' }).click();
    await openTrace(page).waitFor(WAIT);
    await page.getByText('looks like').first().waitFor();
    await expectAccessible(page);
    await expectNoSidewaysScroll(page);
    const row = page.getByRole('region', { name: 'List of captures' }).getByRole('listitem').first();
    await row.getByText(/^60.2, 20\d\.\d rpm$/).waitFor();
    await openTrace(page).click();
    await page.waitForURL(/\/captures\/[a-z0-9]+$/);
    expect(complaints).toEqual([]);
    await close();
  });
});

describe('upload', () => {
  it('keeps the very bytes, says how they were read, and takes another circuit', async () => {
    const { page, complaints, close } = await open(browser);
    const workshop = await enter(page, 'technician');
    await page.goto('/captures');
    const text = sampleCsv(4_000);
    await choose(page, file(text));
    await openTrace(page).waitFor(WAIT);
    await page.getByText('comma, decimal point, seconds').waitFor();
    await page.getByText('0.1 ms, 10 kHz').waitFor();
    await page.getByLabel('Another circuit for Level').selectOption({ label: 'Coil command' });
    await page
      .getByRole('region', { name: 'List of captures' })
      .locator('.chip', { hasText: 'Coil command' })
      .waitFor(WAIT);
    expect(await capturesOf(workshop.id)).toMatchObject([
      { sha256: createHash('sha256').update(text).digest('hex'), status: 'ready' },
    ]);
    expect(complaints).toEqual([]);
    await close();
  });

  it('pauses when the line is lost, goes on by itself, and makes one capture of all the bytes', async () => {
    const { page, context, close } = await open(browser);
    const workshop = await enter(page, 'technician');
    await page.goto('/captures');
    const text = sampleCsv(300_000);
    const network = await context.newCDPSession(page);
    await network.send('Network.emulateNetworkConditions', {
      offline: false,
      latency: 20,
      downloadThroughput: -1,
      uploadThroughput: 1_500_000,
    });
    await choose(page, file(text, 'long.csv'));
    await page.locator('progress[aria-label="Sending"]').waitFor();
    await page.waitForFunction(
      () => (document.querySelector<HTMLProgressElement>('progress[aria-label="Sending"]')?.value ?? 0) > 0.1,
    );
    await context.setOffline(true);
    await page.getByText(/^paused at \d+ %$/).waitFor();
    await page.getByText('What was sent is kept').waitFor();
    expect(await capturesOf(workshop.id)).toEqual([]);
    await context.setOffline(false);
    await openTrace(page).waitFor(WAIT);
    expect(await capturesOf(workshop.id)).toMatchObject([
      {
        sha256: createHash('sha256').update(text).digest('hex'),
        bytes: String(Buffer.byteLength(text)),
        status: 'ready',
      },
    ]);
    await close();
  });

  it('several files go one after the other, and a bad one does not hold up a good one', async () => {
    const { page, complaints, close } = await open(browser, PHONE);
    await enter(page, 'technician');
    await page.goto('/captures');
    const picture = Buffer.concat([
      Buffer.from([0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10]),
      Buffer.alloc(2_000, 7),
    ]);
    await choose(
      page,
      file('', 'empty.csv'),
      file(picture, 'holiday.csv'),
      file('Time (s),KW (V)\n', 'names-only.csv'),
      file('KW (V)\nabc\ndef\n', 'one-column.csv'),
      file(sampleCsv(2_000), 'good.csv'),
    );
    await openTrace(page).waitFor(WAIT);
    const items = onItsWay(page).locator('> li');
    for (const [name, title] of [
      ['empty.csv', 'This file was not taken'],
      ['holiday.csv', 'This file could not be read'],
      ['names-only.csv', 'This file could not be read'],
      ['one-column.csv', 'This file could not be read'],
    ] as const) {
      const item = items.filter({ hasText: name });
      await item.getByText(title).waitFor(WAIT);
      for (const word of ['Happened', 'Kept', 'Do']) await item.getByText(word, { exact: true }).waitFor();
    }
    await expectAccessible(page);
    await expectNoSidewaysScroll(page);
    expect(complaints).toEqual([]);
    await close();
  });

  it('can be left while it is read, and found again in the list', async () => {
    const { page, complaints, close } = await open(browser);
    await enter(page, 'technician');
    await page.goto('/captures');
    await choose(page, file(sampleCsv(120_000), 'left-alone.csv'));
    await onItsWay(page).getByText('Received').waitFor(WAIT);
    await page.goto('/workshop');
    await page.goto('/captures');
    const row = page.getByRole('listitem').filter({ hasText: 'left-alone' });
    await row.waitFor();
    await row.getByText(/waits its turn|reading|measuring/).waitFor({ state: 'detached', ...WAIT });
    await row.getByText('12.0 s').locator('visible=true').waitFor();
    expect(complaints).toEqual([]);
    await close();
  });

  it('a correction of the time unit reads the file again and changes its length', async () => {
    const { page, complaints, close } = await open(browser);
    await enter(page, 'technician');
    await page.goto('/captures');
    await choose(page, file(sampleCsv(2_000), 'unit.csv'));
    await openTrace(page).waitFor(WAIT);
    await onItsWay(page).getByRole('link', { name: 'How it was read' }).click();
    await page.getByRole('heading', { name: 'First rows, as they came' }).waitFor();
    await page.getByText('numbers from here').waitFor();
    await expectAccessible(page);
    await page.getByLabel('Time unit').selectOption('ms');
    await page.locator('.cell', { hasText: 'Step' }).getByText('10 MHz').waitFor(WAIT);
    await page.getByLabel('Factor of Pick-up').fill('20:');
    await page.getByText('Needs a number: 20 or 20:1').waitFor();
    await page.getByLabel('Factor of Pick-up').fill('20:1');
    await page.getByLabel('Factor of Pick-up').press('Enter');
    await page.waitForFunction(
      () => document.querySelector<HTMLInputElement>('[aria-label="Factor of Pick-up"]')?.value === '20',
    );
    expect(complaints).toEqual([]);
    await close();
  });

  it('a file that could not be read shows its rows, and a correction makes it a trace', async () => {
    const { page, close } = await open(browser, PHONE);
    await enter(page, 'technician');
    await page.goto('/captures');
    const rows = Array.from(
      { length: 500 },
      (_, i) => `${Math.sin(i / 9).toFixed(4)};${i % 50 < 25 ? 0 : 5}`,
    );
    await choose(page, file(`KW;NW\n${rows.join('\n')}\n`, 'no-time.csv'));
    await onItsWay(page).getByText('This file could not be read').waitFor(WAIT);
    await onItsWay(page).getByRole('link', { name: 'See the rows' }).click();
    await page.getByLabel('Sample interval, s').fill('0.0001');
    await page.getByRole('button', { name: 'Take' }).last().click();
    await page.getByRole('link', { name: 'Right, open the trace' }).waitFor(WAIT);
    await page.getByText('0.1 ms, 10 kHz').waitFor();
    await expectAccessible(page);
    await expectNoSidewaysScroll(page);
    await close();
  });
});
