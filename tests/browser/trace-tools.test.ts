import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { send } from '../api/security-kit.ts';
import { DESK, enterAs, expectAccessible, launch, open, PHONE } from './browser-kit.ts';
import { type Bench, drawn, draws, measuredSample, openTrace, shownView } from './trace-kit.ts';

let browser: Browser;
let wheel: Bench;
let coil: Bench;

beforeAll(async () => {
  browser = await launch();
  wheel = await measuredSample('crank-60-2-with-cam.csv', 'Crank and cam');
  coil = await measuredSample('coil-primary-burn.csv', 'Coil', wheel.desk);
});
afterAll(() => browser.close());

describe('a coil', () => {
  it('opens at one firing, told from its switch-off, and is gone through firing by firing', async () => {
    const { page, complaints, close } = await open(browser, DESK);
    await openTrace(page, coil);
    const opened = await shownView(page);
    expect(opened.to - opened.from).toBeLessThan(0.02);
    expect(await page.locator('.plot-scale').textContent()).toContain('switch-off');
    expect(await page.locator('.plot-scale').textContent()).toContain('0 ms');
    await page.getByRole('application').focus();
    await page.keyboard.press('n');
    const next = await shownView(page);
    // The sample file fires every 150 ms.
    expect(next.from - opened.from).toBeCloseTo(0.15, 3);
    await page.getByRole('button', { name: 'Whole' }).click();
    expect((await shownView(page)).to).toBeGreaterThan(0.35);
    await page.getByRole('button', { name: 'Firing', exact: true }).click();
    const again = await shownView(page);
    expect(again.to - again.from).toBeLessThan(0.02);
    expect(complaints).toEqual([]);
    await close();
  });

  it('on a phone, firings are in reach of the thumb', async () => {
    const { page, close } = await open(browser, PHONE);
    await openTrace(page, coil);
    const before = await shownView(page);
    await page.getByRole('button', { name: 'Previous firing' }).tap();
    expect((await shownView(page)).from).toBeLessThan(before.from);
    await page.locator('.thumb-turn').getByText('Firing 1').waitFor();
    await close();
  });
});

describe('lanes', () => {
  it('can be ordered, hidden, turned over and put on one scale, on a phone too, and the address holds it', async () => {
    const { page, complaints, close } = await open(browser, PHONE);
    await openTrace(page, wheel);
    await page.getByLabel('More').tap();
    await page.locator('.capture-more').getByRole('button', { name: 'Lanes' }).tap();
    const dialog = page.getByRole('dialog', { name: 'Lanes' });
    await dialog.getByRole('button', { name: 'Move Cam up' }).tap();
    await dialog.getByRole('button', { name: 'Crank upside down' }).tap();
    await dialog.getByLabel('Lanes of one unit share one scale').check();
    await expectAccessible(page);
    await dialog.getByRole('button', { name: 'Done' }).tap();
    await page.waitForURL(/lanes=1%2C0-.*scales=common/);
    expect(await page.locator('.plot-lane').first().getAttribute('data-signal')).toBe('1');
    await page.reload();
    await drawn(page);
    expect(
      await page
        .locator('.plot-lane')
        .evaluateAll((all) => all.map((lane) => (lane as HTMLElement).dataset.signal)),
    ).toEqual(['1', '0']);
    expect(complaints).toEqual([]);
    await close();
  });

  it('grow and shrink by their grip, by drag and by keys', async () => {
    const { page, close } = await open(browser, DESK);
    await openTrace(page, wheel);
    const heights = () =>
      page.locator('.plot-lane').evaluateAll((all) => all.map((lane) => lane.getBoundingClientRect().height));
    const before = await heights();
    const grip = page.getByRole('slider', { name: 'Height of Crank and Cam' });
    await grip.focus();
    await page.keyboard.press('ArrowDown');
    const after = await heights();
    expect(after[0]! - before[0]!).toBeCloseTo(24, 0);
    expect(before[1]! - after[1]!).toBeCloseTo(24, 0);
    const box = (await grip.boundingBox())!;
    await page.mouse.move(box.x + 30, box.y + 12);
    await page.mouse.down();
    await page.mouse.move(box.x + 30, box.y - 68, { steps: 4 });
    await page.mouse.up();
    expect((await heights())[0]! - after[0]!).toBeCloseTo(-80, 0);
    await close();
  });

  it('take another factor: the capture is measured again and drawn anew', async () => {
    const own = await measuredSample('coil-primary-burn.csv', 'Coil through a divider', wheel.desk);
    const { page, close } = await open(browser, DESK);
    await openTrace(page, own);
    const kick = page.getByRole('button', { name: /^Kick, highest sample/ });
    expect(await kick.innerText()).toContain('262');
    await page.getByRole('button', { name: 'Lanes' }).click();
    const dialog = page.getByRole('dialog', { name: 'Lanes' });
    await dialog.getByLabel(/^Factor of/).fill('2:1');
    await dialog.getByRole('button', { name: 'Save' }).click();
    await page.getByRole('button', { name: /^Kick, highest sample\s*524/ }).waitFor({ timeout: 60_000 });
    await close();
  });
});

describe('the span', () => {
  it('tells values at both ends, difference, slope, mean and angle for each lane, and draws no trace', async () => {
    const { page, complaints, close } = await open(browser, DESK);
    await openTrace(page, wheel, '?from=0.458&to=0.747&span=0.5,0.6');
    const figures = page.getByRole('region', { name: 'Span' });
    await figures.waitFor();
    const text = await figures.innerText();
    expect(text).toContain('100.00 ms');
    expect(text).toContain('10.00 Hz');
    expect(text).toMatch(/12\d\.\d°/);
    for (const label of ['start', 'end', 'difference', 'slope', 'mean', 'lowest', 'highest', 'samples'])
      expect(text).toContain(label);
    expect(text).toMatch(/2.?501/);
    const before = await draws(page);
    await page.getByRole('slider', { name: 'End of the span' }).focus();
    await page.keyboard.press('ArrowRight');
    await page.keyboard.press('ArrowRight');
    expect(await draws(page)).toEqual(before);
    await page.waitForURL(/span=0\.5%2C0\.601/);
    expect(complaints).toEqual([]);
    await close();
  });

  it('is put on teeth, edges and peaks on request', async () => {
    const { page, close } = await open(browser, DESK);
    await openTrace(page, wheel, '?from=0.5&to=0.56&span=0.51,0.53');
    const at = async (name: string) =>
      Number(await page.getByRole('slider', { name }).getAttribute('aria-valuenow'));
    await page.getByRole('button', { name: 'teeth', exact: true }).click();
    await expect.poll(() => at('Start of the span')).not.toBe(0.51);
    const { json } = await send('GET', `/api/v1/captures/${wheel.id}/wheel`, { headers: wheel.desk.headers });
    for (const name of ['Start of the span', 'End of the span']) {
      const shown = await at(name);
      // A handle says its place to ten microseconds.
      const away = Math.min(...json.teethS.map((tooth: number) => Math.abs(tooth - shown)));
      expect(away, name).toBeLessThan(1e-5);
    }
    await page.getByRole('button', { name: 'peaks', exact: true }).click();
    await expect
      .poll(async () => page.getByRole('region', { name: 'Span' }).innerText())
      .toMatch(/start\s+1\.\d+ V|start\s+−1\.\d+ V/);
    await close();
  });
});

describe('views', () => {
  it('b goes back to the view before and f forward again', async () => {
    const { page, close } = await open(browser, DESK);
    await openTrace(page, wheel);
    const first = await shownView(page);
    await page.getByRole('application').focus();
    await page.keyboard.press('0');
    await page.keyboard.press('b');
    expect((await shownView(page)).from).toBeCloseTo(first.from, 9);
    await page.keyboard.press('f');
    expect((await shownView(page)).from).toBe(0);
    await page.getByRole('button', { name: 'Back to the view before' }).click();
    expect((await shownView(page)).from).toBeCloseTo(first.from, 9);
    await close();
  });

  it('an address from an older version, with from and to only, opens the same stretch with all lanes', async () => {
    const { page, close } = await open(browser, DESK);
    await enterAs(page, wheel.desk.workshop, 'technician');
    await page.goto(`/captures/${wheel.id}?from=0.2&to=0.3&zoom=7`);
    await drawn(page);
    expect(await shownView(page)).toEqual({ from: 0.2, to: 0.3 });
    expect(await page.locator('.plot-lane').count()).toBe(2);
    await close();
  });
});
