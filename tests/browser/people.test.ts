import { hash } from '@node-rs/argon2';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { totpCode } from '../../src/server/session/second-step/totp.ts';
import { pool } from '../api/security-kit.ts';
import { DESK, enter, expectAccessible, expectNoSidewaysScroll, launch, open, PHONE } from './browser-kit.ts';

const PASSWORD = 'four short plain words';
let browser: Browser;
beforeAll(async () => {
  browser = await launch();
});
afterAll(async () => {
  await browser.close();
  await pool.end();
});

describe('the code beside the password', () => {
  it('is set up, used and replaced by a recovery code with forms alone, without script', async () => {
    const { page, complaints, close } = await open(browser, { ...DESK, javaScriptEnabled: false });
    const { technician } = await enter(page, 'technician');
    const passwordHash = await hash(PASSWORD, { memoryCost: 1024, timeCost: 1 });
    await pool.query('update person set password_hash = $2 where id = $1', [technician.id, passwordHash]);
    await page.goto('/workshop/sign-in');
    await page.getByText('Set it up').click();
    await page.locator('#begin-password').fill(PASSWORD);
    await page.getByRole('button', { name: 'Make a key' }).click();
    const key = (await page.locator('[data-totp-key]').textContent())?.replace(/\s/g, '') ?? '';
    await page.getByLabel(/type the code that it shows/).fill(totpCode(key, Date.now() - 30_000));
    await page.getByRole('button', { name: 'Switch it on' }).click();
    const [recovery = ''] = await page.locator('[data-recovery-codes] li').allTextContents();
    await page.context().clearCookies();
    const signIn = async (code: string) => {
      await page.goto('/sign-in');
      await page.getByLabel('E-mail').fill(technician.email);
      await page.getByLabel('Password', { exact: true }).fill(PASSWORD);
      await page.getByRole('button', { name: 'Sign in' }).click();
      await page.waitForURL('**/sign-in/code**');
      await page.getByLabel('Code').fill(code);
      await page.getByRole('button', { name: 'Sign in' }).click();
    };
    await signIn('000000');
    await page.getByText('This code is not right').waitFor();
    await signIn(totpCode(key, Date.now()));
    await page.waitForURL('**/captures');
    await page.context().clearCookies();
    await signIn(recovery);
    await page.waitForURL('**/captures');
    expect(complaints).toEqual([]);
    await close();
  });
});

describe.each(['/workshop', '/workshop/sign-in', '/workshop/owner'])('%s', (path) => {
  it.each([
    ['phone', PHONE],
    ['desk', DESK],
  ] as const)('passes the accessibility check with everything open, on a %s', async (_, device) => {
    const { page, complaints, close } = await open(browser, device);
    await enter(page, 'owner');
    await page.goto(path);
    await page.evaluate(() => {
      for (const each of document.querySelectorAll('main details')) each.setAttribute('open', '');
    });
    await expectAccessible(page);
    await expectNoSidewaysScroll(page);
    expect(complaints).toEqual([]);
    await close();
  });
});

it.each(['/sign-in/code', '/reset', '/reset/new?key=none', '/invitation?key=none', '/e-mail?key=none'])(
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
