// @ts-check
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { runChecks } from './check.mjs';
import { prepareCheckout } from './copy.mjs';
import { installChromium } from './lib/install-debian.mjs';
import { root } from './lib/root.mjs';
import { runMain } from './lib/run-main.mjs';
import { runProgram } from './lib/run-program.mjs';
import { say } from './lib/say.mjs';
import { startTestCopy } from './lib/test-copy.mjs';

/**
 * `npm test`: everything that a change must pass, in one run. It ends with one line, `N passed, N failed, N skipped`.
 * `npm test -- tests/api/marks.test.ts …` runs the named files only, with what they need started for them.
 *
 * @typedef {import('./lib/vitest-counts.mjs').Counts} Counts
 */

/** What has not finished this long after the preparation has failed. A machine with much else to do may be given more. */
const WHOLE_RUN_MS = Number(process.env.GAPMARK_TEST_MINUTES || 13) * 60_000;
let deadline = Date.now() + WHOLE_RUN_MS;

/** Files or folders named by the caller; none: everything. */
const named = process.argv.slice(2).map((path) => path.replace(/^\.\//, ''));
const wholeRun = named.length === 0;

/** The scripts' own tests start copies and go with the API's. */
const withApi = /^(tests\/api\b|scripts\/[^/]+\.test\.ts)/;
const inBrowser = /^tests\/browser\b/;
const outsideServer = named.filter((path) => !withApi.test(path) && !inBrowser.test(path));

/** @type {Counts} */
const total = { passed: 0, failed: 0, skipped: [] };
/** @type {() => Promise<unknown>} */
let stopCopy = async () => undefined;

const counts = mkdtempSync(join(tmpdir(), 'gapmark-counts-'));
process.on('exit', () => rmSync(counts, { recursive: true, force: true }));

/** @param {string} title @param {() => Promise<void>} work */
async function stage(title, work) {
  say(`\n== ${title}`);
  const began = Date.now();
  try {
    await work();
  } catch (error) {
    total.failed += 1;
    say(`✗ ${title}: ${error instanceof Error ? error.message : String(error)}`);
  }
  say(`   ${title}: ${Math.round((Date.now() - began) / 1000)} s`);
}

/**
 * @param {string} config
 * @param {{ limitMs: number, files: string[], env?: Record<string, string> }} options `files` none: all of the config's
 */
async function vitest(config, { limitMs, files, env = {} }) {
  const file = join(counts, `${config}.json`);
  const left = deadline - Date.now();
  if (left < 1000) throw new Error('not run: the whole run’s time is over');
  const { code, output } = await runProgram(
    process.execPath,
    // biome-ignore format: one option and its value a line
    [
      join(root, 'node_modules/vitest/vitest.mjs'), 'run', '--config', config,
      '--reporter', join(root, 'scripts/lib/vitest-counts.mjs'), '--reporter', 'dot', '--silent=passed-only', ...files,
    ],
    {
      cwd: root,
      env: {
        ...process.env,
        ...env,
        TEST_COUNTS: file,
        AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true',
        CI: '1',
        NO_COLOR: '1',
        FORCE_COLOR: '0',
      },
      show: true,
      limitMs: Math.min(limitMs, left),
    },
  );
  if (!existsSync(file)) {
    const hung = output.includes('\nEnded: it had not finished');
    const over = left < limitMs ? 'the whole run’s time is over' : 'something in it hangs';
    const seconds = Math.round(Math.min(limitMs, left) / 1000);
    throw new Error(hung ? `ended after ${seconds} s: ${over}` : `vitest ended with code ${code}`);
  }
  /** @type {Counts} */
  const found = JSON.parse(readFileSync(file, 'utf8'));
  total.passed += found.passed;
  total.failed += found.failed;
  total.skipped.push(...found.skipped);
  if (code !== 0 && found.failed === 0) throw new Error(`vitest ended with code ${code}`);
}

/** A stage’s share of the whole run. @param {number} count of thirteen */
const minutes = (count) => (count / 13) * WHOLE_RUN_MS;

/** @param {string} folder */
const hasTests = (folder) =>
  existsSync(join(root, folder)) &&
  readdirSync(join(root, folder), { recursive: true, encoding: 'utf8' }).some((name) =>
    /\.test\.tsx?$/.test(name),
  );

async function main() {
  await prepareCheckout(say);
  await installChromium(say);
  deadline = Date.now() + WHOLE_RUN_MS;

  if (wholeRun) {
    await stage('Types, lint and import rules', async () => {
      const { passed, failed } = await runChecks({ limitMs: minutes(5) });
      total.passed += passed;
      total.failed += failed;
    });
  }
  if (wholeRun || outsideServer.length > 0) {
    await stage('Unit tests and outside checks', () =>
      vitest('vitest.config.ts', { limitMs: minutes(6), files: outsideServer }),
    );
  }
  if (wholeRun || outsideServer.length < named.length) await testAgainstCopy();
  conclude();
}

async function testAgainstCopy() {
  /** @type {Record<string, string>} */
  let env = {};
  await stage('A copy to test against', async () => {
    const copy = await startTestCopy(say, (stop) => {
      stopCopy = stop;
    });
    env = copy.env;
  });
  if (env.GAPMARK_TEST_ORIGIN !== undefined) {
    for (const [title, folder, belongs, config, share] of /** @type {const} */ ([
      ['API tests', 'tests/api', withApi, 'vitest.api.config.ts', 6],
      ['Browser tests', 'tests/browser', inBrowser, 'vitest.browser.config.ts', 7],
    ])) {
      const files = named.filter((path) => belongs.test(path));
      if (!(wholeRun ? hasTests(folder) : files.length > 0)) continue;
      await stage(title, () => vitest(config, { limitMs: minutes(share), files, env }));
    }
    await stage('Nothing is left running', async () => {
      const left = await stopCopy();
      stopCopy = async () => undefined;
      if (Array.isArray(left) && left.length > 0) throw new Error(`still there: ${left.join(', ')}`);
      total.passed += 1;
    });
  }
}

function conclude() {
  say('');
  for (const { title, reason } of total.skipped) say(`skipped: ${title}: ${reason || 'NO REASON GIVEN'}`);
  // A skip must say why; one that does not is a test that somebody switched off.
  total.failed += total.skipped.filter(({ reason }) => reason === '').length;
  if (total.passed + total.failed === 0) total.failed = 1;
  say(`${total.passed} passed, ${total.failed} failed, ${total.skipped.length} skipped`);
  process.exit(total.failed > 0 ? 1 : 0);
}

await runMain(main, { stop: async () => void (await stopCopy()) });
