import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { makeDesk, settled, uploadCsv } from '../api/capture-kit.ts';
import {
  DESK,
  enterAs,
  expectAccessible,
  expectNoSidewaysScroll,
  launch,
  open,
  PHONE,
  type Watched,
} from './browser-kit.ts';
import {
  type Bench,
  drawn,
  draws,
  measured,
  measuredSample,
  openTrace,
  scriptBytes,
  shownView,
} from './trace-kit.ts';

let browser: Browser;
let bench: Bench;

beforeAll(async () => {
  browser = await launch();
  bench = await measuredSample('crank-60-2-with-cam.csv', 'Crank and cam <b>while</b> cranking');
});
afterAll(() => browser.close());

describe.each([
  ['phone', PHONE],
  ['desk', DESK],
] as const)('the trace on a %s', (name, device) => {
  let watched: Watched;
  beforeAll(async () => {
    watched = await open(browser, device);
    await openTrace(watched.page, bench);
  });
  afterAll(() => watched.close());

  it('is drawn in a lane for each signal, with the title as it was typed, and pleases axe in both themes', async () => {
    const { page, complaints } = watched;
    expect(await page.locator('.plot-lane').count()).toBe(2);
    expect((await draws(page)).every((count) => count > 0)).toBe(true);
    expect(await page.getByRole('heading', { level: 1 }).innerText()).toBe(
      'Crank and cam <b>while</b> cranking',
    );
    await expectNoSidewaysScroll(page);
    await expectAccessible(page);
    await page.emulateMedia({ colorScheme: 'dark' });
    await expectAccessible(page);
    await page.emulateMedia({ colorScheme: 'light' });
    expect(complaints).toEqual([]);
  });

  it('shows the samples behind a number: the view goes there, they are hatched and counted', async () => {
    const { page, complaints } = watched;
    await page.getByRole('button', { name: /^Rising edge 2/ }).click();
    await page.locator('.plot-evidence rect').first().waitFor({ state: 'attached' });
    await page
      .locator('.foot-line')
      .getByText(/Rising edge 2 297\.\d°/)
      .waitFor();
    expect(await page.locator('.foot-line').innerText()).toMatch(/\d samples/);
    const { from, to } = await shownView(page);
    const hatched = await page.locator('.plot-evidence rect').evaluateAll((all) => all.length);
    expect(hatched).toBeGreaterThan(0);
    expect(to - from).toBeLessThan(1.1);
    await page.getByRole('button', { name: /^Rising edge 2/ }).click();
    await page.locator('.plot-evidence').waitFor({ state: 'detached' });
    expect(complaints).toEqual([]);
  });

  it('n and p step through the turns', async () => {
    const { page } = watched;
    await page.getByRole('application').focus();
    await page.keyboard.press('0');
    await page.keyboard.press('p');
    const first = await shownView(page);
    await page.keyboard.press('n');
    const second = await shownView(page);
    expect(second.from).toBeGreaterThan(first.from);
    expect(second.to - second.from).toBeLessThan(1);
    await page.keyboard.press('p');
    expect((await shownView(page)).from).toBeCloseTo(first.from, 2);
  });

  it(`loads at most 160 KB of script until it is drawn, zoomed once and a mark opened (${name})`, async () => {
    const fresh = await open(browser, device);
    await enterAs(fresh.page, bench.desk.workshop, 'technician');
    const bytes = await scriptBytes(fresh.page, async () => {
      await fresh.page.goto(`/captures/${bench.id}`);
      await drawn(fresh.page);
      await fresh.page.getByRole('application').focus();
      await fresh.page.keyboard.press('+');
      await fresh.page.keyboard.press('m');
      await fresh.page.getByRole('dialog', { name: 'New mark' }).waitFor();
    });
    expect(bytes).toBeGreaterThan(60_000);
    expect(bytes).toBeLessThanOrEqual(160_000);
    expect(fresh.complaints).toEqual([]);
    await fresh.close();
  });
});

describe('the trace under a mouse', () => {
  let watched: Watched;
  beforeAll(async () => {
    watched = await open(browser, DESK);
    await openTrace(watched.page, bench);
  });
  afterAll(() => watched.close());

  it('moving the cursor and choosing a number of samples in view draw no trace', async () => {
    const { page } = watched;
    const stage = (await page.locator('.plot-stage').boundingBox())!;
    const before = await draws(page);
    for (let i = 1; i < 10; i += 1) await page.mouse.move(stage.x + i * 60, stage.y + 60 + i * 10);
    await page.locator('.plot-cursor-value').first().waitFor();
    expect(await page.locator('.plot-cursor-value').first().innerText()).toMatch(/V$/);
    expect(await draws(page)).toEqual(before);
  });

  it('the wheel zooms at the pointer, drag moves, a double click shows all', async () => {
    const { page } = watched;
    const stage = (await page.locator('.plot-stage').boundingBox())!;
    const x = stage.x + stage.width * 0.25;
    const timeAtPointer = async () => {
      const { from, to } = await shownView(page);
      return from + 0.25 * (to - from);
    };
    const [before, view] = [await timeAtPointer(), await shownView(page)];
    await page.mouse.move(x, stage.y + 100);
    await page.mouse.wheel(0, -400);
    await expect.poll(async () => (await shownView(page)).to).toBeLessThan(view.to);
    expect(await timeAtPointer()).toBeCloseTo(before, 4);

    const zoomed = await shownView(page);
    await page.mouse.down();
    await page.mouse.move(x + 200, stage.y + 100, { steps: 4 });
    await page.mouse.up();
    const moved = await shownView(page);
    const expected = (200 / stage.width) * (zoomed.to - zoomed.from);
    expect(zoomed.from - moved.from).toBeCloseTo(expected, 4);
    expect(moved.to - moved.from).toBeCloseTo(zoomed.to - zoomed.from, 9);

    await page.mouse.dblclick(x, stage.y + 100);
    await expect.poll(async () => (await shownView(page)).from).toBe(0);
  });

  it('the address holds the view, and a copied one opens it', async () => {
    const { page } = watched;
    await openTrace(page, bench, '?from=0.25&to=0.35');
    const view = await shownView(page);
    expect(view.from).toBeCloseTo(0.25, 9);
    expect(view.to).toBeCloseTo(0.35, 9);
    await page.getByRole('application').focus();
    await page.keyboard.press('ArrowRight');
    await page.waitForURL(/from=0\.26&to=0\.36/);
  });

  it('single letters act only while the trace has focus', async () => {
    const { page } = watched;
    await page.getByRole('heading', { level: 1 }).click();
    await page.keyboard.press('m');
    await page.keyboard.press('s');
    expect(await page.getByRole('dialog').isVisible()).toBe(false);
    expect(await page.getByRole('slider', { name: 'Start of the span' }).count()).toBe(0);
    await page.getByRole('application').focus();
    await page.keyboard.press('s');
    await page.getByRole('slider', { name: 'Start of the span' }).waitFor();
    expect(await page.getByRole('region', { name: 'Span' }).innerText()).toMatch(/ms.*Hz/s);
    await page.keyboard.press('Escape');
    await page.keyboard.press('?');
    await page.getByRole('dialog', { name: 'Keys while the trace has focus' }).waitFor();
    await expectAccessible(page);
    await page.keyboard.press('Escape');
  });

  it('a chip hides its lane and brings it back', async () => {
    const { page } = watched;
    const chip = page.locator('button.chip', { hasText: 'Cam' });
    await chip.click();
    expect(await page.locator('.plot-lane').count()).toBe(1);
    expect(await chip.getAttribute('aria-pressed')).toBe('false');
    await chip.click();
    expect(await page.locator('.plot-lane').count()).toBe(2);
  });

  it('samples further apart than eight pixels stand as dots: zoomed in, most of the lane is empty', async () => {
    const { page } = watched;
    const ink = () =>
      page
        .locator('.plot-lane canvas')
        .first()
        .evaluate((element) => {
          const canvas = element as HTMLCanvasElement;
          const { data } = canvas.getContext('2d')!.getImageData(0, 0, canvas.width, canvas.height);
          const columns = new Set<number>();
          for (let i = 3; i < data.length; i += 4) {
            const [red = 0, green = 0] = [data[i - 3], data[i - 2]];
            if (data[i]! > 128 && red < 100 && green > 60 && green < 140)
              columns.add(((i - 3) / 4) % canvas.width);
          }
          return columns.size / canvas.width;
        });
    await openTrace(page, bench, '?from=0.3&to=0.4');
    expect(await ink()).toBeGreaterThan(0.95);
    // 25 kHz over 1 ms: 25 samples, some 35 px apart.
    await openTrace(page, bench, '?from=0.3&to=0.301');
    expect(await page.locator('.plot-lane').first().getAttribute('data-layout')).toBe('samples');
    expect(await ink()).toBeLessThan(0.3);
  });
});

describe('the trace under fingers', () => {
  it('two fingers pinch about what they hold, one drags', async () => {
    const { page, close } = await open(browser, PHONE);
    await openTrace(page, bench);
    const stage = (await page.locator('.plot-stage').boundingBox())!;
    const session = await page.context().newCDPSession(page);
    const touch = (type: 'touchStart' | 'touchMove' | 'touchEnd', xs: number[]) =>
      session.send('Input.dispatchTouchEvent', {
        type,
        touchPoints: xs.map((share, id) => ({ x: stage.x + stage.width * share, y: stage.y + 60, id })),
      });
    const before = await shownView(page);
    const timeAt = (view: { from: number; to: number }, share: number) =>
      view.from + share * (view.to - view.from);
    await touch('touchStart', [0.4]);
    await touch('touchStart', [0.4, 0.6]);
    await touch('touchMove', [0.3, 0.7]);
    await touch('touchMove', [0.2, 0.8]);
    await touch('touchEnd', []);
    const after = await shownView(page);
    expect(after.to - after.from).toBeCloseTo((before.to - before.from) / 3, 3);
    expect(timeAt(after, 0.2)).toBeCloseTo(timeAt(before, 0.4), 3);

    await touch('touchStart', [0.5]);
    await touch('touchMove', [0.6]);
    await touch('touchMove', [0.7]);
    await touch('touchEnd', []);
    const moved = await shownView(page);
    expect(after.from - moved.from).toBeCloseTo(0.2 * (after.to - after.from), 3);
    await close();
  });

  it('the panel has three heights, by tap and by keys', async () => {
    const { page, close } = await open(browser, PHONE);
    await openTrace(page, bench);
    const sheet = page.getByRole('complementary', { name: 'Numbers and marks' });
    const height = async () => (await sheet.boundingBox())!.height;
    const half = await height();
    const grip = page.getByRole('button', { name: /^Height of the panel/ });
    await grip.focus();
    await page.keyboard.press('ArrowDown');
    expect(await height()).toBe(72);
    await page.keyboard.press('ArrowUp');
    await page.keyboard.press('ArrowUp');
    expect(await height()).toBeGreaterThan(half * 1.5);
    await expectNoSidewaysScroll(page);
    await close();
  });
});

describe('what can go wrong with a trace', () => {
  it('keeps a one-sample spike in view of two hundred thousand samples', async () => {
    const rows = Array.from(
      { length: 200_000 },
      (_, i) => `${(i / 100_000).toFixed(5)},${i === 123_456 ? 5 : 0}`,
    );
    const spike = await measured(`Time (s),Level (V)\n${rows.join('\n')}\n`, 'One spike');
    const { page, close } = await open(browser, DESK);
    await openTrace(page, spike);
    const top = await page
      .locator('.plot-lane canvas')
      .first()
      .evaluate((element) => {
        const canvas = element as HTMLCanvasElement;
        const { data } = canvas.getContext('2d')!.getImageData(0, 0, canvas.width, canvas.height);
        for (let i = 3; i < data.length; i += 4)
          if (data[i]! > 100) return Math.floor((i - 3) / 4 / canvas.width) / canvas.height;
        return 1;
      });
    // 5 V stands a fourteenth below the top of the lane.
    expect(top).toBeLessThan(0.12);
    await close();
  });

  it('keeps what is drawn when the network goes in the middle, says so, and recovers by itself', async () => {
    const { page, close } = await open(browser, DESK);
    await openTrace(page, bench);
    await page.route('**/window?**', (route) => route.abort());
    await page.getByRole('application').focus();
    for (let i = 0; i < 6; i += 1) await page.keyboard.press('+');
    await page.locator('.plot-trouble').getByText('trying again').waitFor();
    expect(await page.locator('.plot-lane').count()).toBe(2);
    await page.unroute('**/window?**');
    await page.locator('.plot-trouble').waitFor({ state: 'detached' });
    await close();
  });

  it('says why a file could not be read and leads to how it was read', async () => {
    const desk = await makeDesk();
    const id = await uploadCsv(desk, 'not a capture at all\njust words\n', { title: 'Words only' });
    await settled(desk, id);
    const { page, complaints, close } = await open(browser, PHONE);
    await enterAs(page, desk.workshop, 'technician');
    await page.goto(`/captures/${id}`);
    await page.getByRole('alert').waitFor();
    expect(await page.getByRole('alert').innerText()).toMatch(/Kept/);
    await expectAccessible(page);
    await page.getByRole('link', { name: 'See how the file was read' }).click();
    await page.waitForURL(`**/captures/${id}/reading`);
    expect(complaints).toEqual([]);
    await close();
  });

  it('another workshop’s capture is not there', async () => {
    const other = await makeDesk();
    const { page, close } = await open(browser, DESK);
    await enterAs(page, other.workshop, 'owner');
    expect((await page.goto(`/captures/${bench.id}`))?.status()).toBe(404);
    await close();
  });
});

describe('the wheel', () => {
  it('the wheel shows each tooth, names the short one and leads to its samples', async () => {
    const weak = await measuredSample('crank-60-2-weak-tooth.csv', 'One short tooth');
    const { page, complaints, close } = await open(browser, PHONE);
    await enterAs(page, weak.desk.workshop, 'technician');
    await page.goto(`/captures/${weak.id}/wheel`);
    await page.getByRole('img', { name: 'Wheel 60-2 with 58 teeth' }).waitFor();
    await page.getByText('Tooth 23', { exact: true }).first().waitFor();
    await expectAccessible(page);
    await expectNoSidewaysScroll(page);
    await page.getByRole('link', { name: 'Show its samples in the trace' }).click();
    await drawn(page);
    const { from, to } = await shownView(page);
    expect(to - from).toBeLessThan(0.1);
    expect(complaints).toEqual([]);
    await close();
  });
});
