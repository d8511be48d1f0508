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
import { type Bench, measured, measuredSample } from './trace-kit.ts';

let browser: Browser;
let wheel: Bench;
let coil: Bench;

beforeAll(async () => {
  browser = await launch();
  wheel = await measuredSample('crank-60-2-weak-tooth.csv', 'One short tooth');
  coil = await measuredSample('coil-primary-burn.csv', 'Coil', wheel.desk);
});
afterAll(() => browser.close());

const devices = [
  ['phone', PHONE],
  ['desk', DESK],
] as const;

describe.each(devices)('turns on a %s', (_name, device) => {
  it('lays each turn under the other with the speed beside it, shades, overlays, and leads to the samples', async () => {
    const { page, complaints, close } = await open(browser, device);
    await enterAs(page, wheel.desk.workshop, 'technician');
    await page.goto(`/captures/${wheel.id}/turns`);
    const rows = page.locator('ol .turns-row');
    await page.locator('ol canvas[data-drawn="1"]').nth(3).waitFor();
    expect(await rows.count()).toBe(5);
    expect(await page.locator('.turns-all canvas').getAttribute('data-drawn')).toBe('3');
    expect(await rows.nth(1).innerText()).toContain('214.8 rpm');
    expect(await rows.first().innerText()).toContain('Part');

    await page.getByRole('button', { name: /^Short tooth/ }).click();
    await page.locator('.turns-column').first().waitFor();
    expect(
      await page.getByRole('slider', { name: 'Column through all rows' }).getAttribute('aria-valuetext'),
    ).toMatch(/^129\.\d° to 135\.\d°$/);
    expect(await rows.nth(1).innerText()).toMatch(/ V/);
    await expectNoSidewaysScroll(page);
    await expectAccessible(page);

    await page.getByRole('button', { name: 'As shade' }).click();
    await expectAccessible(page);
    await page.getByRole('button', { name: 'On one another' }).click();
    expect(await rows.count()).toBe(0);
    await page.getByRole('button', { name: '720°', exact: true }).click();
    await page.getByRole('button', { name: 'Under each other' }).click();
    expect(await rows.nth(1).innerText()).toContain('Turns 1, 2');
    await page.getByRole('link', { name: /^Turns 1, 2: show its samples/ }).click();
    await page.waitForURL(/\/captures\/[^/]+\?from=/);
    expect(complaints).toEqual([]);
    await close();
  });

  it('lays firings on their switch-off where there is no wheel', async () => {
    const { page, complaints, close } = await open(browser, device);
    await enterAs(page, coil.desk.workshop, 'technician');
    await page.goto(`/captures/${coil.id}/turns`);
    await page.locator('.turns-all canvas[data-drawn="3"]').waitFor();
    expect(await page.locator('.turns-scale').innerText()).toContain('0 ms');
    expect(await page.locator('ol .turns-row').allInnerTexts()).toHaveLength(3);
    expect(complaints).toEqual([]);
    await close();
  });
});

describe.each(devices)('the spectrum on a %s', (_name, device) => {
  it('reads sines by frequency and amplitude in volts, names how it was made, and shows orders where speed is known', async () => {
    // 2 V at 60 Hz and 0.5 V at 180 Hz on 3 V: arithmetic says what must be read.
    const lines = ['Time (s),Pick-up (V)'];
    for (let i = 0; i < 20_000; i += 1) {
      const t = i / 10_000;
      const volts = 3 + 2 * Math.sin(2 * Math.PI * 60 * t) + 0.5 * Math.sin(2 * Math.PI * 180 * t);
      lines.push(`${t.toFixed(4)},${volts.toFixed(5)}`);
    }
    const sines = await measured(lines.join('\n'), 'Two sines', wheel.desk);
    const { page, complaints, close } = await open(browser, device);
    await enterAs(page, sines.desk.workshop, 'technician');
    await page.goto(`/captures/${sines.id}/spectrum`);
    const first = page.getByRole('button', { name: /60\.00? Hz/ }).last();
    await first.waitFor();
    expect(await first.innerText()).toContain('2.00 V');
    expect(
      await page
        .getByRole('button', { name: /180\.00? Hz/ })
        .last()
        .innerText(),
    ).toContain('0.500 V');
    const panel = page.getByRole('complementary', { name: /Lines/ });
    expect(await panel.innerText()).toMatch(/2 above 4 × the noise/);
    expect(await panel.innerText()).toMatch(/Hann, amplitude corrected/);
    expect(await panel.innerText()).toMatch(/from 1\.00 Hz on/);
    await page.getByLabel('Window function').selectOption('flattop');
    await panel.getByText(/Flat top, amplitude corrected/).waitFor();
    await page.getByRole('button', { name: 'dB' }).click();
    await first.click();
    await expectNoSidewaysScroll(page);
    await expectAccessible(page);
    await page.emulateMedia({ colorScheme: 'dark' });
    await expectAccessible(page);
    expect(complaints).toEqual([]);
    await close();
  });

  it('puts crank orders over the axis from the teeth in the window', async () => {
    const { page, complaints, close } = await open(browser, device);
    await enterAs(page, wheel.desk.workshop, 'technician');
    await page.goto(`/captures/${wheel.id}/spectrum`);
    await page.getByText(/rpm from the teeth in the window/).waitFor();
    // 60 places a turn: the strongest line is that of the teeth.
    expect(await page.locator('.spectrum-row').first().innerText()).toMatch(/order 60\.\d/);
    expect(complaints).toEqual([]);
    await close();
  });

  it('says why samples at uneven steps have no spectrum', async () => {
    const text = [
      'time s,Cam V',
      ...[0, 0.01, 0.013, 0.05, 0.051, 0.09, 0.2, 0.21].map((t, i) => `${t},${i % 2}`),
    ];
    const uneven = await measured(text.join('\n'), 'Changes', wheel.desk);
    const { page, close } = await open(browser, device);
    await enterAs(page, uneven.desk.workshop, 'technician');
    await page.goto(`/captures/${uneven.id}/spectrum`);
    await page.getByText('Samples at uneven steps have no spectrum here').waitFor();
    await close();
  });
});
