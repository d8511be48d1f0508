import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Desk, makeDesk } from '../api/capture-kit.ts';
import { send } from '../api/security-kit.ts';
import { DESK, enterAs, expectNoSidewaysScroll, launch, open, PHONE } from './browser-kit.ts';
import { drawn, measured, openTrace, shownView } from './trace-kit.ts';

let browser: Browser;
let desk: Desk;

beforeAll(async () => {
  browser = await launch();
  desk = await makeDesk();
});
afterAll(() => browser.close());

const rows = (count: number, row: (i: number) => string, head: string) =>
  [head, ...Array.from({ length: count }, (_, i) => `${(i / 1000).toFixed(3)},${row(i)}`)].join('\n');

const ODD: readonly (readonly [what: string, text: string, lanes: number])[] = [
  [
    'ten signals of which one is all holes',
    rows(
      500,
      (i) =>
        Array.from({ length: 10 }, (_, k) =>
          k === 4 ? 'OL' : (Math.sin(i / (k + 3)) * (k + 1)).toFixed(3),
        ).join(),
      `Time (s),${Array.from({ length: 10 }, (_, k) => `S${k} (V)`).join()}`,
    ),
    10,
  ],
  ['a constant', rows(500, () => '12', 'Time (s),Level (V)'), 1],
  ['values of ±1e30', rows(500, (i) => (i % 2 === 0 ? '1e30' : '-1e30'), 'Time (s),Far (V)'), 1],
];

describe.each(ODD)('%s', (_what, text, lanes) => {
  it.each([
    ['phone', PHONE],
    ['desk', DESK],
  ] as const)('is drawn on a %s without a complaint', async (_name, device) => {
    const bench = await measured(text, 'Odd', desk);
    const { page, complaints, close } = await open(browser, device);
    await openTrace(page, bench);
    expect(await page.locator('.plot-lane').count()).toBe(lanes);
    await expectNoSidewaysScroll(page);
    await page.getByRole('application').focus();
    await page.keyboard.press('s');
    await page.keyboard.press('+');
    await page.getByRole('region', { name: 'Span' }).waitFor();
    expect(await page.locator('.plot').innerText()).not.toMatch(/NaN|Infinity|undefined/);
    expect(complaints).toEqual([]);
    await close();
  });
});

describe('an address that asks for too much', () => {
  it('outside of the capture, the view is brought inside', async () => {
    const bench = await measured(ODD[1]![1], 'Level', desk);
    const { page, complaints, close } = await open(browser, DESK);
    await openTrace(page, bench, '?from=100&to=200&span=900,901&at=1e99&lanes=77');
    const { from, to } = await shownView(page);
    expect(from).toBeGreaterThanOrEqual(0);
    expect(to).toBeLessThanOrEqual(0.5);
    expect(complaints).toEqual([]);
    await close();
  });

  it('a capture that is deleted while it is open: what is there stays, and the page says so', async () => {
    // Long enough that a closer look asks for samples again.
    const long = rows(60_000, (i) => Math.sin(i / 5).toFixed(3), 'Time (s),S (V)');
    const bench = await measured(long, 'Soon gone', desk);
    const { page, close } = await open(browser, DESK);
    await enterAs(page, bench.desk.workshop, 'technician');
    await page.goto(`/captures/${bench.id}`);
    await drawn(page);
    const path = `/api/v1/captures/${bench.id}`;
    const { headers } = await send('GET', path, { headers: desk.headers });
    const owner = bench.desk.workshop.owner.browser;
    const gone = await send('DELETE', path, { headers: { ...owner, 'if-match': String(headers.etag) } });
    expect(gone.status).toBe(204);
    await page.getByRole('application').focus();
    for (let i = 0; i < 12; i += 1) await page.keyboard.press('+');
    await page
      .getByText(/not here|not there|does not exist|is gone/i)
      .first()
      .waitFor();
    await close();
  });
});
