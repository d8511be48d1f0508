import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { send } from '../api/security-kit.ts';
import { DESK, expectAccessible, launch, open, PHONE } from './browser-kit.ts';
import { type Bench, measuredSample, openTrace, shownView } from './trace-kit.ts';

let browser: Browser;
let bench: Bench;

beforeAll(async () => {
  browser = await launch();
  bench = await measuredSample('crank-60-2-weak-tooth.csv', 'Marked');
});
afterAll(() => browser.close());

const dialog = (page: Page, name: string) => page.getByRole('dialog', { name });
const list = (page: Page) => page.getByRole('region', { name: 'Marks' });

async function pin(page: Page, text: string): Promise<void> {
  await dialog(page, 'New mark').getByLabel('What is seen here').fill(text);
  await dialog(page, 'New mark').getByRole('button', { name: 'Pin mark' }).click();
  await list(page).getByText(text).waitFor();
}

describe('marks', () => {
  it('a tap on the trace pins a mark at that time and at the trace’s own value, with text as it was typed', async () => {
    const { page, complaints, close } = await open(browser, PHONE);
    await openTrace(page, bench, '?from=0.3&to=0.4');
    await page.locator('.thumb-tools').getByRole('button', { name: 'Mark' }).tap();
    const stage = (await page.locator('.plot-stage').boundingBox())!;
    await page.touchscreen.tap(stage.x + stage.width / 2, stage.y + 80);
    const at = Number(await dialog(page, 'New mark').getByLabel('At, seconds').inputValue());
    expect(at).toBeCloseTo(0.35, 2);
    await expectAccessible(page);
    await pin(page, 'Short <img src=x onerror=alert(1)> tooth');
    expect(await page.locator('.plot-balloon img, .marks img').count()).toBe(0);
    const balloon = page.getByRole('button', { name: /^Mark 1: Short/ });
    const box = (await balloon.boundingBox())!;
    expect(box.x + box.width / 2).toBeCloseTo(stage.x + stage.width / 2, -1);
    expect(complaints).toEqual([]);
    await close();
  });

  it('m pins one at the cursor, it can be changed, deleted and brought back', async () => {
    const { page, complaints, close } = await open(browser, DESK);
    await openTrace(page, bench);
    await page.getByRole('application').focus();
    await page.keyboard.press('m');
    await pin(page, 'Look here');
    await list(page).getByRole('button', { name: 'Change mark 1' }).waitFor();
    const row = list(page).getByRole('listitem').filter({ hasText: 'Look here' });
    await row.getByRole('button', { name: /^Change/ }).click();
    const change = dialog(page, 'Change mark');
    await change.getByLabel('What is seen here').fill('Look here first');
    await change.getByLabel('Kind').selectOption('range');
    await change.getByLabel('To, seconds').fill('0.9');
    await change.getByRole('button', { name: 'Save mark' }).click();
    await list(page).getByText('Look here first').waitFor();
    expect(await page.locator('.plot-mark-frame').count()).toBe(1);

    const changed = list(page).getByRole('listitem').filter({ hasText: 'Look here first' });
    await changed.getByRole('button', { name: /^Delete/ }).click();
    await page.getByText('Mark deleted').waitFor();
    await expect.poll(() => changed.count()).toBe(0);
    await expectAccessible(page);
    await page.getByRole('button', { name: 'Undo' }).click();
    await changed.waitFor();
    expect(complaints).toEqual([]);
    await close();
  });

  it('choosing one in the list takes the view to it', async () => {
    const { page, close } = await open(browser, DESK);
    await openTrace(page, bench, '?from=0.9&to=1');
    await list(page).getByRole('button', { name: /Short/ }).first().click();
    const { from, to } = await shownView(page);
    expect(from).toBeLessThan(0.35);
    expect(to).toBeGreaterThan(0.35);
    await close();
  });

  it('a chosen one is dragged by its handle or moved by keys, and the move can be undone', async () => {
    const { page, close } = await open(browser, DESK);
    await openTrace(page, bench);
    await list(page).locator('.mark-go').first().click();
    const handle = page.getByRole('slider', { name: 'Place of the mark' });
    await handle.waitFor();
    const at = async () => Number(await handle.getAttribute('aria-valuenow'));
    const before = await at();
    await handle.focus();
    await page.keyboard.press('ArrowRight');
    await page.keyboard.press('ArrowRight');
    await page.getByText('Mark moved').waitFor();
    expect(await at()).toBeGreaterThan(before);
    await page.getByRole('button', { name: 'Undo' }).click();
    await expect.poll(at).toBeCloseTo(before, 9);
    await close();
  });

  it('two people change one mark: nothing is overwritten, the second sees what the first wrote and chooses', async () => {
    const { page, close } = await open(browser, DESK);
    await openTrace(page, bench);
    await list(page)
      .getByRole('button', { name: /^Change/ })
      .first()
      .click();
    const change = dialog(page, 'Change mark');
    await change.getByLabel('What is seen here').fill('mine');

    const path = `/api/v1/captures/${bench.id}/marks`;
    const marks = await send('GET', path, { headers: bench.desk.headers });
    const first = marks.json.items[0];
    const headers = { ...bench.desk.headers, 'if-match': first.etag };
    expect(
      (await send('PATCH', `/api/v1/marks/${first.id}`, { headers, body: { text: 'theirs' } })).status,
    ).toBe(200);

    await change.getByRole('button', { name: 'Save mark' }).click();
    await change.getByText('It now reads: “theirs”.').waitFor();
    expect(await change.getByLabel('What is seen here').inputValue()).toBe('mine');
    expect((await send('GET', path, { headers: bench.desk.headers })).json.items[0].text).toBe('theirs');
    await expectAccessible(page);
    await change.getByRole('button', { name: 'Keep mine' }).click();
    await change.getByRole('button', { name: 'Save mark' }).click();
    await list(page).getByText('mine', { exact: true }).waitFor();
    await close();
  });
});
