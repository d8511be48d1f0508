// @ts-check
import { parseArgs } from 'node:util';
import { openInstance } from './instance.mjs';
import { PlainError } from './plain-error.mjs';
import { stopRunningPrograms } from './run-program.mjs';

/**
 * @typedef {import('./instance.mjs').Instance} Instance
 * @typedef {{ env: Record<string, string>, stop: () => Promise<void> }} Started
 */

/**
 * For a service started by itself: opens the folder given with --data, prints the service's environment as `KEY=value`
 * lines on standard output (progress goes to standard error), and stays until it is told to end.
 * @param {(instance: Instance, say: import('./say.mjs').Say) => Promise<Started>} start
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
  /** @type {Promise<Started> | null} */
  let starting = null;
  const end = async (/** @type {number} */ code) => {
    await stopRunningPrograms();
    const started = await starting?.catch(() => null);
    await started?.stop();
    instance?.close();
    process.exit(code);
  };
  for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP']))
    process.once(signal, () => void end(0));
  const say = (/** @type {string} */ line) => void process.stderr.write(`${line}\n`);
  try {
    instance = await openInstance({ dataDir, say });
    starting = start(instance, say);
    const { env } = await starting;
    for (const [key, value] of Object.entries(env)) process.stdout.write(`${key}=${value}\n`);
    process.stdout.write('READY=1\n');
  } catch (error) {
    process.stderr.write(
      `${error instanceof PlainError ? error.message : String(error instanceof Error ? error.stack : error)}\n`,
    );
    await end(1);
  }
}
