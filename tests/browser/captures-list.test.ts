import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { makeThings, pool } from '../api/security-kit.ts';
import { DESK, enter, expectAccessible, expectNoSidewaysScroll, launch, open, PHONE } from './browser-kit.ts';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

const MARKUP = '<img src=x onerror=alert(1)> & <b>Tom</b>';

describe.each([
  ['phone', PHONE],
  ['desk', DESK],
] as const)('captures on a %s', (_, device) => {
  it('lists the newest first, each once, and more on demand; words and state narrow it', async () => {
    const { page, complaints, close } = await open(browser, device);
    const workshop = await enter(page, 'instructor');
    for (let count = 0; count < 30; count += 1) {
      const { capture, exerciseCapture } = await makeThings(workshop.id, workshop.technician);
      // One capture each is what this list is about.
      await pool.query('update capture set deleted_at = now() where id = $1', [exerciseCapture]);
      await pool.query(
        'update capture set title = $2, created_at = now() - make_interval(mins => $3) where id = $1',
        [capture, count === 3 ? MARKUP : `Turn ${count}`, count],
      );
    }
    await page.goto('/captures');
    const rows = page.getByRole('region', { name: 'List of captures' }).locator('> ul > li');
    await rows.first().waitFor();
    expect(await rows.count()).toBe(25);
    expect(await rows.first().getByRole('heading').textContent()).toBe('Turn 0');
    expect(await rows.nth(3).getByRole('heading').textContent()).toBe(MARKUP);
    await page.getByRole('button', { name: 'Show more' }).click();
    await rows.nth(29).waitFor();
    const titles = await rows.getByRole('heading').allInnerTexts();
    expect(new Set(titles).size).toBe(30);
    await expectAccessible(page);
    await expectNoSidewaysScroll(page);

    await page.getByLabel('Search captures by title').fill('turn 1');
    await page.waitForFunction(() => location.search === '?search=turn+1');
    await page.waitForFunction(() => document.querySelectorAll('section > ul > li').length === 11);
    await page.reload();
    await page.waitForFunction(() => document.querySelectorAll('section > ul > li').length === 11);
    expect(await page.getByLabel('Search captures by title').inputValue()).toBe('turn 1');
    await page.getByLabel('State').selectOption('failed');
    await page.getByRole('heading', { name: 'No capture fits' }).waitFor();
    await page.getByRole('button', { name: 'Show all' }).click();
    await rows.nth(20).waitFor();
    expect(complaints).toEqual([]);
    await close();
  });
});

describe('captures', () => {
  it('a capture that was being read when the page came is watched until it is ready', async () => {
    const { page, complaints, close } = await open(browser);
    const workshop = await enter(page, 'technician');
    const { capture } = await makeThings(workshop.id, workshop.technician);
    await pool.query(`update capture set status = 'reading' where id = $1`, [capture]);
    await page.goto('/captures');
    const reading = page.getByRole('listitem').getByText('reading', { exact: true });
    await reading.waitFor();
    await pool.query(`update capture set status = 'ready' where id = $1`, [capture]);
    await reading.waitFor({ state: 'detached', timeout: 20_000 });
    expect(complaints).toEqual([]);
    await close();
  });

  it('says so when the list does not come, and comes back by itself or by hand', async () => {
    const { page, close } = await open(browser);
    await enter(page, 'technician');
    await page.route('**/api/v1/captures?*', (route) =>
      route.fulfill({
        status: 503,
        contentType: 'application/json',
        body: JSON.stringify({
          error: { code: 'service_away', message: 'The database is away for the moment.' },
        }),
      }),
    );
    await page.goto('/captures?search=x');
    await page.getByText('The list did not come').waitFor();
    await page.getByText('The database is away for the moment.').waitFor();
    await expectAccessible(page);
    await page.unroute('**/api/v1/captures?*');
    await page.getByRole('button', { name: 'Try again' }).click();
    await page.getByRole('heading', { name: 'No capture fits' }).waitFor();
    await close();
  });

  it('a learner sees own practice captures only', async () => {
    const { page, close } = await open(browser);
    const workshop = await enter(page, 'learner');
    await makeThings(workshop.id, workshop.technician);
    await page.goto('/captures');
    await page.getByRole('heading', { name: 'No captures yet' }).waitFor();
    expect((await page.goto('/library'))?.status()).toBe(403);
    await page.getByRole('heading', { name: 'Not for your role' }).waitFor();
    await expectAccessible(page);
    await close();
  });
});
