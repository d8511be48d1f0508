import AxeBuilder from '@axe-core/playwright';
import {
  type Browser,
  type BrowserContext,
  type BrowserContextOptions,
  chromium,
  type Page,
} from 'playwright-core';
import { expect, vi } from 'vitest';
import type { Role } from '../../src/contract/roles.ts';
import { makeWorkshop, origin as testOrigin, type Workshop } from '../api/security-kit.ts';
import { confirmationLink } from '../kit/caught-mail.ts';

/** What browser tests stand on: Debian's Chromium on the built product, signed in, watched for anything it complains of. */

// Machines are noisy, and a page may be opened, checked and read several times in one test.
vi.setConfig({ testTimeout: 240_000, hookTimeout: 120_000 });

export const origin = new URL(testOrigin).origin;

export const PHONE = { viewport: { width: 360, height: 740 }, isMobile: true, hasTouch: true } as const;
export const DESK = { viewport: { width: 1440, height: 900 } } as const;

/** Only what a browser says of a page that a test asks for although it is not there, by status. */
const ASKED_FOR = /Failed to load resource: the server responded with a status of (4\d\d|503)/;

export const launch = (): Promise<Browser> =>
  chromium.launch({
    executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium',
    args: [
      '--no-sandbox',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
    ],
  });

export interface Watched {
  readonly context: BrowserContext;
  readonly page: Page;
  /** Console errors, uncaught exceptions and reports of the security policy. */
  readonly complaints: string[];
  close: () => Promise<void>;
}

/** A fresh browser profile whose complaints are collected. */
export async function open(browser: Browser, options: BrowserContextOptions = DESK): Promise<Watched> {
  const context = await browser.newContext({ baseURL: origin, ...options });
  const page = await context.newPage();
  const complaints: string[] = [];
  page.on('console', (message) => {
    if (message.type() === 'error' && !ASKED_FOR.test(message.text())) complaints.push(message.text());
  });
  page.on('pageerror', (error) => complaints.push(error.message));
  await page.addInitScript(() => {
    document.addEventListener('securitypolicyviolation', (event) =>
      console.error(`security policy: ${event.violatedDirective} ${event.blockedURI} ${event.sample}`),
    );
  });
  return { context, page, complaints, close: () => context.close() };
}

/** Signs a browser in as a person of a new, empty workshop; the sign-in forms have tests of their own. */
export async function enter(page: Page, role: Role = 'owner'): Promise<Workshop> {
  const workshop = await makeWorkshop('Karvelund Workshop');
  await enterAs(page, workshop, role);
  return workshop;
}

export const enterAs = (page: Page, workshop: Workshop, role: Role): Promise<void> =>
  page.context().addCookies([{ name: 'gapmark', value: workshop[role].sessionSecret, url: origin }]);

export interface Account {
  readonly email: string;
  readonly password: string;
}

let made = 0;

/** Opens the mailed link and presses its button. */
export async function confirmSignUp(page: Page, email: string): Promise<void> {
  await page.getByText('Look into your mail').waitFor();
  const link = await confirmationLink(email);
  await page.goto(link.pathname + link.search);
  await page.getByRole('button', { name: 'Set up my workshop' }).click();
  await page.waitForURL('**/captures');
}

/** A new person with a workshop of their own, signed in through the form. Sign-up is limited by address: use `enter` where the form does not matter. */
export async function signUp(page: Page): Promise<Account> {
  made += 1;
  const account = {
    email: `runa-${process.pid}-${Date.now().toString(36)}-${made}@workshop.example`,
    password: 'four short plain words',
  };
  await page.goto('/sign-up');
  await page.getByLabel('Your name').fill('Runa Aldemar');
  await page.getByLabel('Workshop or school').fill('Karvelund Workshop');
  await page.getByLabel('E-mail').fill(account.email);
  await page.getByLabel('Password', { exact: true }).fill(account.password);
  await page.getByRole('button', { name: 'Set it up' }).click();
  await confirmSignUp(page, account.email);
  return account;
}

/** No violation of WCAG 2.2 AA that a program can find, in the theme that is shown. */
export async function expectAccessible(page: Page): Promise<void> {
  const { violations } = await new AxeBuilder({ page })
    .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'])
    .analyze();
  const found = violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html).join(' | ')}`);
  expect(found).toEqual([]);
}

/** Nothing sticks out to the right: the page never scrolls sideways. */
export async function expectNoSidewaysScroll(page: Page): Promise<void> {
  const [content, view] = await page.evaluate(() => [
    document.documentElement.scrollWidth,
    document.documentElement.clientWidth,
  ]);
  expect(content).toBeLessThanOrEqual(view!);
}
