import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Desk, makeDesk } from '../api/capture-kit.ts';
import { DESK, expectNoSidewaysScroll, launch, open, PHONE } from './browser-kit.ts';
import { measured, openTrace, shownView } from './trace-kit.ts';

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
});
