import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { send } from '../api/security-kit.ts';
import { DESK, expectAccessible, expectNoSidewaysScroll, launch, open, PHONE } from './browser-kit.ts';
import { type Bench, drawn, measuredSample, openTrace, scriptBytes } from './trace-kit.ts';

let browser: Browser;
let bench: Bench;
let url = '';

beforeAll(async () => {
  browser = await launch();
  bench = await measuredSample('crank-60-2-weak-tooth.csv', 'One tooth is short');
  const body = { kind: 'point', signal: 0, from: 0.4, to: null, value: 0, text: 'Tooth 23 short' };
  await send('POST', `/api/v1/captures/${bench.id}/marks`, { headers: bench.desk.headers, body });
});
afterAll(() => browser.close());

describe('from a link to an answer', () => {
  it('the dialog makes a link with a question and shows its address once', async () => {
    const { page, complaints, close } = await open(browser, DESK);
    await openTrace(page, bench);
    await page.getByRole('button', { name: 'Share' }).click();
    const dialog = page.getByRole('dialog', { name: 'Share this trace' });
    await dialog.getByLabel('Your question').fill('Chipped tooth, or <i>dirt</i>?');
    await expectAccessible(page);
    await dialog.getByRole('button', { name: 'Make the link' }).click();
    url = await dialog.getByLabel('Address of the link').inputValue();
    expect(url).toMatch(/\/s\/[\w-]{43}$/);
    await dialog.getByText('Chipped tooth, or <i>dirt</i>?').waitFor();
    await dialog.getByText('seen not yet').waitFor();
    await expectAccessible(page);
    await page.reload();
    await drawn(page);
    await page.getByRole('button', { name: 'Share' }).click();
    await dialog.getByText('Chipped tooth').waitFor();
    expect(await page.content()).not.toContain(new URL(url).pathname);
    expect(complaints).toEqual([]);
    await close();
  });

  it('a colleague opens it on a phone without an account: trace, mark, question, numbers, and answers', async () => {
    const { page, complaints, close } = await open(browser, PHONE);
    const answer = await page.goto(url);
    expect(answer?.status()).toBe(200);
    expect(answer?.headers()['cache-control']).toContain('no-store');
    expect(answer?.headers()['x-robots-tag']).toContain('noindex');
    expect(answer?.headers()['referrer-policy']).toBe('no-referrer');
    await drawn(page);
    await page.getByRole('heading', { name: 'One tooth is short' }).waitFor();
    await page.getByRole('heading', { name: 'Chipped tooth, or <i>dirt</i>?' }).waitFor();
    await page.getByRole('button', { name: 'Mark 1: Tooth 23 short' }).waitFor();
    await page.getByText('rpm').first().waitFor();
    await expectNoSidewaysScroll(page);
    await expectAccessible(page);
    const trace = (await page.locator('.plot-stage').boundingBox())!;
    expect(trace.y).toBeLessThan(200);

    await page.getByRole('button', { name: 'Send answer' }).tap();
    await page.getByText('Please say who you are').waitFor();
    await page.getByLabel('Your name').fill('Oona Vesk');
    await page.getByLabel('Your answer').fill('Look through the sensor hole. <script>1</script>');
    await page.getByRole('button', { name: 'Mark', exact: true }).tap();
    const there = (await page.locator('.plot-stage').boundingBox())!;
    await page.touchscreen.tap(there.x + 150, there.y + 50);
    await page.getByRole('button', { name: /^Take the mark at/ }).waitFor();
    await page.getByRole('button', { name: 'Send answer' }).tap();
    await page.getByText('Your answer is sent.').waitFor();
    await page.getByRole('list', { name: 'Answers' }).getByText('Oona Vesk').waitFor();
    await page.emulateMedia({ colorScheme: 'dark' });
    await expectAccessible(page);
    expect(complaints).toEqual([]);
    await close();
  });

  it('the sender sees one look, the answer and its mark, and can hide it', async () => {
    const { page, complaints, close } = await open(browser, DESK);
    await openTrace(page, bench);
    await page.getByRole('region', { name: 'Marks' }).getByText('with an answer').waitFor();
    await page.getByRole('button', { name: 'Share' }).click();
    const dialog = page.getByRole('dialog', { name: 'Share this trace' });
    await dialog.getByText('seen once, 1 answer').waitFor();
    await dialog.getByText('Look through the sensor hole. <script>1</script>').waitFor();
    await dialog.getByRole('button', { name: 'Hide' }).click();
    await dialog.getByText('Look through the sensor hole').waitFor({ state: 'detached' });
    expect(complaints).toEqual([]);
    await close();
  });

  it('the page loads at most 110 KB of script until the trace is drawn, zoomed once and a mark opened', async () => {
    const { page, close } = await open(browser, PHONE);
    const bytes = await scriptBytes(page, async () => {
      await page.goto(url);
      await drawn(page);
      await page.getByRole('application').focus();
      await page.keyboard.press('+');
      await page.getByRole('button', { name: /^Mark 1/ }).tap();
      await page.waitForLoadState('networkidle');
    });
    expect(bytes).toBeGreaterThan(60_000);
    expect(bytes).toBeLessThanOrEqual(110_000);
    await close();
  });

  it('works at 1440 px in dim as well, and asks nothing from elsewhere', async () => {
    const { page, complaints, close } = await open(browser, { ...DESK, colorScheme: 'dark' });
    const hosts = new Set<string>();
    page.on('request', (request) => hosts.add(new URL(request.url()).host));
    await page.goto(url);
    await drawn(page);
    await expectNoSidewaysScroll(page);
    await expectAccessible(page);
    expect([...hosts]).toEqual([new URL(url).host]);
    expect(complaints).toEqual([]);
    await close();
  });

  it('withdrawn from the dialog it is 410 with a sentence; a wrong one is 404', async () => {
    const desk = await open(browser, DESK);
    await openTrace(desk.page, bench);
    await desk.page.getByRole('button', { name: 'Share' }).click();
    const dialog = desk.page.getByRole('dialog', { name: 'Share this trace' });
    await dialog.getByRole('button', { name: 'Withdraw', exact: true }).click();
    await dialog.getByText('It stops opening at once.').waitFor();
    await dialog.getByRole('button', { name: 'Withdraw the link' }).click();
    await dialog.getByText('withdrawn', { exact: false }).waitFor();
    await desk.close();

    const phone = await open(browser, PHONE);
    expect((await phone.page.goto(url))?.status()).toBe(410);
    await phone.page.getByText('Ask the person who sent it for a new one').waitFor();
    await expectAccessible(phone.page);
    expect((await phone.page.goto(`${url.slice(0, -43)}${'a'.repeat(43)}`))?.status()).toBe(404);
    expect(phone.complaints).toEqual([]);
    await phone.close();
  });
});
