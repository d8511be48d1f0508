// @ts-check
import { existsSync, mkdirSync, readFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { installedVersions } from '../../docker-free-fakes/postgres.mjs';
import { startServices } from '../services.mjs';
import { lockFolder } from './lock.mjs';
import { PlainError } from './plain-error.mjs';
import { root } from './root.mjs';

/** Where a running copy notes how its services are reached, for commands that are given while it runs. */
export const servicesFile = (/** @type {string} */ dataDir) => join(dataDir, 'run', 'services.json');

/**
 * Runs something against a copy's database and store, whether it runs now or not; with DATABASE_URL set, against the hosted
 * services that the environment names.
 * @template T
 * @param {import('./say.mjs').Say} say
 * @param {(env: Record<string, string>, instance: import('./instance.mjs').Instance | null) => Promise<T>} run
 *   `instance`: when it had to be started for this
 * @param {{ onStop?: (stop: () => Promise<void>) => void, mayRun?: boolean }} [options] `mayRun: false` refuses a running copy
 * @returns {Promise<T>}
 */
export async function withServices(say, run, { onStop = () => {}, mayRun = true } = {}) {
  const [newest] = installedVersions();
  const tools = {
    PATH: process.env.PATH ?? '/usr/bin:/bin',
    ...(newest === undefined ? {} : { PG_BIN: `/usr/lib/postgresql/${newest}/bin` }),
    AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true',
  };
  if (process.env.DATABASE_URL) {
    const given = Object.entries(process.env).flatMap(([name, value]) =>
      value === undefined ? [] : [[name, value]],
    );
    return run({ ...tools, ...Object.fromEntries(given) }, null);
  }
  const dataDir = resolve(process.env.GAPMARK_DATA || join(root, '.gapmark'));
  mkdirSync(dataDir, { recursive: true, mode: 0o711 });
  const lock = await lockFolder(dataDir, 'data');
  if (!('release' in lock)) {
    if (!mayRun || !existsSync(servicesFile(dataDir)))
      throw new PlainError(`Gapmark runs on ${dataDir} (${lock.holder}). Stop it first.`);
    return run({ ...tools, ...JSON.parse(readFileSync(servicesFile(dataDir), 'utf8')) }, null);
  }
  lock.release();
  const services = await startServices({ dataDir, say });
  onStop(services.stop);
  try {
    return await run(
      { ...tools, ...services.env, GAPMARK_SECRET: services.instance.secrets.seal },
      services.instance,
    );
  } finally {
    await services.stop();
  }
}
