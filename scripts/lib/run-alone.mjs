// @ts-check
import { parseArgs } from 'node:util';
import { openInstance } from './instance.mjs';
import { runMain } from './run-main.mjs';

/** @typedef {import('./instance.mjs').Instance} Instance */

/**
 * For a service started by itself: opens the folder given with --data, prints the service's environment as `KEY=value`
 * lines on standard output (progress goes to standard error), and stays until it is told to end.
 * @param {(instance: Instance, say: import('./say.mjs').Say) => Promise<Record<string, string>>} start gives the environment
 */
export async function runAlone(start) {
  const { values } = parseArgs({ options: { data: { type: 'string' } } });
  const dataDir = values.data ?? process.env.GAPMARK_DATA;
  if (!dataDir) {
    process.stderr.write('Which folder? Give --data DIR.\n');
    process.exit(2);
  }
  /** @type {Instance | null} */
  let instance = null;
  const say = (/** @type {string} */ line) => void process.stderr.write(`${line}\n`);
  const work = async () => {
    instance = await openInstance({ dataDir, say });
    const env = await start(instance, say);
    for (const [key, value] of Object.entries(env)) process.stdout.write(`${key}=${value}\n`);
    process.stdout.write('READY=1\n');
  };
  await runMain(work, { stop: async () => instance?.stop(), stopped: 0 });
}
