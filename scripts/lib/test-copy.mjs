// @ts-check
import { chmodSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { startCopy } from '../copy.mjs';
import { PlainError } from './plain-error.mjs';
import { processesOf } from './processes-of.mjs';

/**
 * A copy for tests: everything real, in a folder of its own that goes with it.
 *
 * @typedef {object} TestCopy
 * @property {Record<string, string>} env what tests read: GAPMARK_TEST_ORIGIN (its address), GAPMARK_TEST_TOKEN (the demo
 *   token), GAPMARK_TEST_MAIL (the mail catcher; `messages.json` below it), GAPMARK_TEST_PRODUCT_ENV (JSON: the
 *   environment of its web and worker, for tests that start more of them), DATABASE_URL and S3_…
 * @property {() => Promise<number[]>} stop gives the processes that were left; there must be none
 */

/**
 * @param {import('./say.mjs').Say} say
 * @param {(stop: () => Promise<unknown>) => void} [onStop] handed over before anything runs
 * @returns {Promise<TestCopy>}
 */
export async function startTestCopy(say, onStop = () => {}) {
  const dataDir = mkdtempSync(join(tmpdir(), 'gapmark-test-'));
  chmodSync(dataDir, 0o711);
  let end = async () => {};
  let cluster = '';
  const stop = async () => {
    await end();
    const left = processesOf(dataDir);
    rmSync(dataDir, { recursive: true, force: true });
    if (cluster !== '') rmSync(cluster, { recursive: true, force: true });
    return left;
  };
  onStop(stop);
  try {
    const copy = await startCopy({
      dataDir,
      host: '127.0.0.1',
      port: 0,
      durable: false,
      say,
      onStop: (given, instance) => {
        end = given;
        // Only there when the temporary folder is closed to the database's user.
        cluster = join('/var/lib/gapmark', instance.id);
      },
    });
    if (copy.newToken === null)
      throw new PlainError('The demo workshop was not made, so there is no token to test with.');
    return {
      env: {
        ...copy.services.env,
        GAPMARK_TEST_ORIGIN: copy.origin,
        GAPMARK_TEST_TOKEN: copy.newToken,
        GAPMARK_TEST_MAIL: copy.mailPage,
        GAPMARK_TEST_PRODUCT_ENV: JSON.stringify(copy.env),
      },
      stop,
    };
  } catch (error) {
    await stop();
    throw error;
  }
}

/** For `vitest --config vitest.api.config.ts` by itself; under `npm test` the copy runs already. */
export default async function setup() {
  if (process.env.GAPMARK_TEST_ORIGIN !== undefined) return undefined;
  const copy = await startTestCopy((line) => void process.stderr.write(`${line}\n`));
  Object.assign(process.env, copy.env);
  return copy.stop;
}
