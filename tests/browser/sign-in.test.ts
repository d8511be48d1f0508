import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  confirmSignUp,
  DESK,
  enter,
  expectAccessible,
  expectNoSidewaysScroll,
  launch,
  open,
  PHONE,
  signUp,
} from './browser-kit.ts';

let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(() => browser.close());

describe.each([
  ['phone with script', PHONE],
  ['desk without script', { ...DESK, javaScriptEnabled: false }],
] as const)('sign-in on a %s', (_, device) => {
  it('a wrong password is told in words, keeps the address and signs nobody in', async () => {
    const { page, complaints, close } = await open(browser, device);
    const account = await signUp(page);
    await page.context().clearCookies();
    await page.goto('/sign-in');
    await page.getByLabel('E-mail').fill(account.email);
    await page.getByLabel('Password', { exact: true }).fill('not the right one');
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.getByText('E-mail and password do not belong together.').waitFor();
    expect(await page.getByLabel('E-mail').inputValue()).toBe(account.email);
    expect(await page.getByLabel('Password', { exact: true }).inputValue()).toBe('');
    expect((await page.context().cookies()).filter(({ name }) => name.includes('gapmark'))).toEqual([]);
    await page.getByLabel('Password', { exact: true }).fill(account.password);
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.waitForURL('**/captures');
    expect(complaints).toEqual([]);
    await close();
  });
});

describe('sign-in', () => {
  it.each(['/', '/sign-in', '/sign-up'])(
    '%s passes the accessibility check and holds at 360 px',
    async (path) => {
      const { page, complaints, close } = await open(browser, PHONE);
      await page.goto(path);
      await expectAccessible(page);
      await expectNoSidewaysScroll(page);
      expect(complaints).toEqual([]);
      await close();
    },
  );

  it('sign-up says beside the field what is wrong with it, when the browser does not check', async () => {
    const { page, close } = await open(browser, { ...DESK, javaScriptEnabled: false });
    await page.goto('/sign-up');
    // Without script the browser's own checks are all there is; a form sent past them gets the server's words.
    await page.getByLabel('Your name').fill('Runa Aldemar');
    await page.getByLabel('Workshop or school').fill('Karvelund Workshop');
    await page.getByLabel('E-mail').fill('runa@workshop');
    await page.getByLabel('Password', { exact: true }).fill('four short plain words');
    await page.getByRole('button', { name: 'Set it up' }).click();
    const field = page.getByLabel('E-mail');
    await page.getByText('Needs an address such as name@workshop.example').waitFor();
    expect(await field.getAttribute('aria-invalid')).toBe('true');
    expect(await field.inputValue()).toBe('runa@workshop');
    expect(await page.getByLabel('Your name').inputValue()).toBe('Runa Aldemar');
    await close();
  });

  it('what was typed is shown as text: markup in a name stays text', async () => {
    const { page, complaints, close } = await open(browser);
    await page.goto('/sign-up');
    await page.getByLabel('Your name').fill('<img src=x onerror=alert(1)>');
    await page.getByLabel('Workshop or school').fill('<b>Karvelund</b>');
    const email = `markup-${Date.now()}@workshop.example`;
    await page.getByLabel('E-mail').fill(email);
    await page.getByLabel('Password', { exact: true }).fill('four short plain words');
    await page.getByRole('button', { name: 'Set it up' }).click();
    await confirmSignUp(page, email);
    await page.goto('/workshop');
    await page.getByRole('heading', { name: '<b>Karvelund</b>', exact: true }).waitFor();
    expect(await page.locator('main img, main b').count()).toBe(0);
    expect(complaints).toEqual([]);
    await close();
  });

  it('the password can be shown and hidden again', async () => {
    const { page, close } = await open(browser, PHONE);
    await page.goto('/sign-in');
    const field = page.locator('#field-password');
    await field.fill('secret words');
    await page.getByRole('button', { name: 'Show' }).click();
    expect(await field.getAttribute('type')).toBe('text');
    await page.getByRole('button', { name: 'Hide' }).click();
    expect(await field.getAttribute('type')).toBe('password');
    await close();
  });

  it('a new token is shown once, and can be ended', async () => {
    const { page, complaints, close } = await open(browser);
    await enter(page);
    await page.goto('/workshop');
    await page.getByText('New token').click();
    await page.getByLabel('What it is for').fill('bench export');
    await page.getByRole('button', { name: 'Make it' }).click();
    const secret = (await page.locator('[data-made-token]').textContent())?.trim() ?? '';
    expect(secret).toMatch(/^gapmark_[\w-]{40,}$/);
    await expectAccessible(page);
    await page.goto('/workshop');
    expect(await page.content()).not.toContain(secret);
    await page.getByRole('button', { name: 'End the token bench export' }).click();
    await page.waitForURL('**/workshop');
    await page.getByRole('button', { name: 'End the token bench export' }).waitFor({ state: 'detached' });
    expect(complaints).toEqual([]);
    await close();
  });
});
