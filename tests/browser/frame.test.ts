import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  DESK,
  enter,
  expectAccessible,
  expectNoSidewaysScroll,
  launch,
  open,
  origin,
  PHONE,
  signUp,
  type Watched,
} from './browser-kit.ts';

const PLACES = ['Jobs', 'Captures', 'Library', 'Teaching', 'Workshop'];
let browser: Browser;

beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

describe.each([
  ['phone', PHONE],
  ['desk', DESK],
] as const)('frame on a %s', (_, device) => {
  let watched: Watched;
  beforeAll(async () => {
    watched = await open(browser, device);
    await enter(watched.page);
    await watched.page.goto('/captures');
  });
  afterAll(() => watched.close());

  it.each(PLACES)('%s is reached from the navigation and marked as the current place', async (name) => {
    const { page, complaints } = watched;
    await page.getByRole('navigation', { name: 'Places' }).getByRole('link', { name, exact: true }).click();
    await page.waitForURL(`**/${name.toLowerCase()}`);
    const current = page.locator('nav a[aria-current="page"]');
    expect(await current.allInnerTexts()).toEqual([name]);
    await page.getByRole('heading', { level: 1 }).waitFor();
    await expectNoSidewaysScroll(page);
    await expectAccessible(page);
    expect(complaints).toEqual([]);
  });

  it('the skip link is the first stop of the keyboard and leads to the content', async () => {
    const { page } = watched;
    await page.goto('/workshop');
    await page.keyboard.press('Tab');
    await page.keyboard.press('Enter');
    expect(await page.evaluate(() => document.activeElement?.id)).toBe('main');
  });
});

describe('frame', () => {
  it('the theme switch shows dim, keeps it over a reload, and both themes pass the contrast check', async () => {
    const { page, complaints, close } = await open(browser, { ...DESK, colorScheme: 'light' });
    await enter(page);
    await page.goto('/captures');
    const ground = () => page.evaluate(() => getComputedStyle(document.documentElement).backgroundColor);
    expect(await ground()).toBe('rgb(244, 241, 234)');
    await page.getByRole('button', { name: 'Switch between paper and dim' }).click();
    expect(await ground()).toBe('rgb(22, 25, 27)');
    await page.goto('/workshop');
    expect(await page.locator('html').getAttribute('data-theme')).toBe('dim');
    await expectAccessible(page);
    await page.getByRole('button', { name: 'As the system' }).click();
    expect(await ground()).toBe('rgb(244, 241, 234)');
    expect(complaints).toEqual([]);
    await close();
  });

  it('follows the system when nothing was chosen', async () => {
    const { page, close } = await open(browser, { ...DESK, colorScheme: 'dark' });
    await page.goto('/sign-in');
    expect(await page.evaluate(() => getComputedStyle(document.documentElement).backgroundColor)).toBe(
      'rgb(22, 25, 27)',
    );
    await expectAccessible(page);
    await close();
  });

  it('/ goes to the search and ? lists the keys, until they are switched off', async () => {
    const { page, close } = await open(browser);
    await enter(page);
    await page.goto('/captures');
    await page.getByRole('heading', { name: 'No captures yet' }).waitFor();
    await page.keyboard.press('/');
    expect(await page.evaluate(() => document.activeElement?.getAttribute('type'))).toBe('search');
    await page.keyboard.type('?/');
    expect(await page.getByLabel('Search captures by title').inputValue()).toBe('?/');
    await page.getByRole('heading', { level: 1 }).click();
    await page.keyboard.press('?');
    const keys = page.getByRole('dialog', { name: 'Keys' });
    await keys.waitFor();
    await expectAccessible(page);
    await keys.getByLabel('Use these two keys').uncheck();
    await keys.getByRole('button', { name: 'Close' }).click();
    await page.keyboard.press('?');
    expect(await keys.isVisible()).toBe(false);
    await close();
  });

  it('says what is not there: 404 with the way on, for somebody signed in and for nobody', async () => {
    const { page, complaints, close } = await open(browser);
    const answer = await page.goto('/no-such-page');
    expect(answer?.status()).toBe(404);
    await page.getByRole('heading', { name: 'Not here' }).waitFor();
    await expectAccessible(page);
    await enter(page);
    expect((await page.goto('/captures/aaaaaaaaaaaaaaaaaaaa'))?.status()).toBe(404);
    await page.getByRole('link', { name: 'To the captures' }).click();
    await page.waitForURL('**/captures');
    expect(complaints).toEqual([]);
    await close();
  });

  it('a page for the signed-in sends to sign-in and comes back to where one was', async () => {
    const { page, close } = await open(browser);
    const account = await signUp(page);
    await page.context().clearCookies();
    await page.goto('/library?condition=idle');
    await page.waitForURL('**/sign-in?**');
    await page.getByLabel('E-mail').fill(account.email);
    await page.getByLabel('Password', { exact: true }).fill(account.password);
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.waitForURL('**/library?condition=idle');
    await close();
  });

  it('no markup of the server carries a style attribute or a script that the policy would not know', async () => {
    for (const path of ['/', '/sign-in', '/sign-up', '/no-such-page']) {
      const html = await (await fetch(new URL(path, origin))).text();
      expect(html).not.toMatch(/<[a-z][^>]*\sstyle=/i);
      expect(html).not.toMatch(/\son[a-z]+="/i);
    }
  });

  it('holds at 2560 px and without script', async () => {
    const wide = await open(browser, { viewport: { width: 2560, height: 1300 } });
    await enter(wide.page);
    for (const place of PLACES) {
      await wide.page.goto(`/${place.toLowerCase()}`);
      await expectNoSidewaysScroll(wide.page);
    }
    await wide.close();
    const plain = await open(browser, { ...PHONE, javaScriptEnabled: false });
    await enter(plain.page);
    await plain.page.goto('/captures');
    await plain.page.getByRole('link', { name: 'Workshop', exact: true }).click();
    await plain.page.getByRole('button', { name: 'Sign out' }).click();
    await plain.page.getByRole('link', { name: 'Sign in' }).waitFor();
    await plain.close();
  });
});
