// @ts-check
import { mkdirSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { parseArgs } from 'node:util';
import { prepareCheckout } from './copy.mjs';
import { launchChromium } from './lib/chromium.mjs';
import { demoThings, fillPath } from './lib/demo-things.mjs';
import { installChromium } from './lib/install-debian.mjs';
import { PlainError } from './lib/plain-error.mjs';
import { root } from './lib/root.mjs';
import { runMain } from './lib/run-main.mjs';
import { say } from './lib/say.mjs';
import { startTestCopy } from './lib/test-copy.mjs';
import { demoPassword, demoPeople, pages, themes, widths } from './pages.mjs';

/**
 * `npm run look [-- --page NAME] [--width 360]`: pictures of every page, in both themes, at four widths, for each demo
 * role, into `.look/<page>/`. A copy of its own is started for it.
 *
 * @typedef {import('./pages.mjs').Looker} Looker
 */

const { values: only } = parseArgs({ options: { page: { type: 'string' }, width: { type: 'string' } } });
const folder = join(root, '.look');
/** What a page may still load or draw after it is there. */
const SETTLE_MS = 10_000;

/** @type {() => Promise<unknown>} */
let stop = async () => undefined;

async function main() {
  const chosen = pages.filter(({ name }) => only.page === undefined || name === only.page);
  if (chosen.length === 0)
    throw new PlainError(`There is no page ${only.page}. These are: ${pages.map((p) => p.name).join(', ')}`);
  await prepareCheckout(say);
  await installChromium(say);
  const copy = await startTestCopy(say, (given) => {
    stop = given;
  });
  const origin = copy.env.GAPMARK_TEST_ORIGIN ?? '';
  const things = await demoThings(origin, copy.env.GAPMARK_TEST_TOKEN ?? '', say);
  const browser = await launchChromium();
  rmSync(folder, { recursive: true, force: true });
  let made = 0;
  try {
    for (const looker of /** @type {Looker[]} */ (['nobody', ...Object.keys(demoPeople)])) {
      const wanted = chosen.filter(({ lookers }) => lookers.includes(looker));
      if (wanted.length === 0) continue;
      say(`- As ${looker}: ${wanted.map(({ name }) => name).join(', ')} …`);
      const cookies = await signIn(browser, origin, looker);
      for (const theme of themes) {
        for (const width of widths.filter((one) => only.width === undefined || one === Number(only.width))) {
          made += await pictures({ browser, origin, cookies, looker, theme, width, wanted, things });
        }
      }
    }
  } finally {
    await browser.close();
    await stop();
    stop = async () => undefined;
  }
  say(`${made} pictures are in ${folder}`);
}

/**
 * One session for all pictures of a person: tries to sign in are counted.
 * @param {import('playwright-core').Browser} browser @param {string} origin @param {Looker} looker
 */
async function signIn(browser, origin, looker) {
  if (looker === 'nobody') return [];
  const context = await browser.newContext({ baseURL: origin });
  try {
    const page = await context.newPage();
    await page.goto('/sign-in');
    await page.locator('input[name=email]').fill(demoPeople[looker]);
    await page.locator('input[name=password]').fill(demoPassword);
    await page.locator('input[name=password]').press('Enter');
    await page.waitForURL((url) => url.pathname !== '/sign-in');
    return await context.cookies();
  } finally {
    await context.close();
  }
}

/**
 * @param {{ browser: import('playwright-core').Browser, origin: string, cookies: import('playwright-core').Cookie[],
 *   looker: Looker, theme: string, width: number, wanted: typeof pages, things: Record<string, string> }} options
 * @returns {Promise<number>} how many were made
 */
async function pictures({ browser, origin, cookies, looker, theme, width, wanted, things }) {
  const phone = width < 600;
  const context = await browser.newContext({
    baseURL: origin,
    viewport: { width, height: phone ? 740 : Math.round(width * 0.625) },
    isMobile: phone,
    hasTouch: phone,
    reducedMotion: 'reduce',
  });
  let made = 0;
  try {
    await context.addCookies([...cookies, { name: 'theme', value: theme, url: origin }]);
    for (const { name, path } of wanted) {
      const address = fillPath(path, things);
      if (address === null) continue;
      const page = await context.newPage();
      page.on('pageerror', (error) => say(`! ${name} (${looker}, ${theme}, ${width}): ${error.message}`));
      await page.goto(address, { waitUntil: 'load' });
      await page.waitForLoadState('networkidle', { timeout: SETTLE_MS }).catch(() => {});
      mkdirSync(join(folder, name), { recursive: true });
      await page.screenshot({ path: join(folder, name, `${looker}-${theme}-${width}.png`), fullPage: true });
      await page.close();
      made += 1;
    }
  } finally {
    await context.close();
  }
  return made;
}

await runMain(main, { stop: async () => void (await stop()) });
