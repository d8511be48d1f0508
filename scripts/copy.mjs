// @ts-check
import { existsSync, readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { installedVersions } from '../docker-free-fakes/postgres.mjs';
import { build, dist } from './build.mjs';
import { installPostgres } from './lib/install-debian.mjs';
import { installPackages } from './lib/install-packages.mjs';
import { openInstance } from './lib/instance.mjs';
import { PlainError } from './lib/plain-error.mjs';
import { tryPort } from './lib/ports.mjs';
import { productEnv } from './lib/product-env.mjs';
import { root } from './lib/root.mjs';
import { runProgram } from './lib/run-program.mjs';
import { recorded } from './lib/run-recorded.mjs';
import { step } from './lib/say.mjs';
import { supervise } from './lib/supervise.mjs';
import { waitForHealth } from './lib/wait-for-health.mjs';
import { writeFileAtomically } from './lib/write-file.mjs';
import { startServices } from './services.mjs';

/**
 * @typedef {object} Copy a running Gapmark with all that it needs
 * @property {string} origin its public address
 * @property {string} address where it is reached on this machine
 * @property {string | null} newToken the demo token, when the demo workshop was made by this start
 * @property {string} mailPage
 * @property {Record<string, string>} env of its processes
 * @property {import('./services.mjs').Services} services
 * @property {(name: string) => Promise<import('./lib/run-program.mjs').Finished>} tool runs one of dist/tools to its end
 * @property {{ web: import('./lib/supervise.mjs').Supervised, worker: import('./lib/supervise.mjs').Supervised }} programs
 */

/**
 * Packages, PostgreSQL and an up-to-date build: what any copy in this checkout needs.
 * @param {import('./lib/say.mjs').Say} say @param {import('./lib/run-recorded.mjs').Run} [run]
 */
export async function prepareCheckout(say, run = runProgram) {
  await installPackages(say, run);
  await installPostgres(say, () => installedVersions().length > 0);
  await build({ say, run });
}

/**
 * Starts one copy. How to stop it is handed over before anything runs, so that it can be ended at any moment.
 * @param {{ dataDir: string, host: string, port: number, origin?: string | undefined, durable?: boolean,
 *   say: import('./lib/say.mjs').Say, onStop: (stop: () => Promise<void>, instance: import('./lib/instance.mjs').Instance) => void }} options `port` 0: any that is free
 * @returns {Promise<Copy>}
 */
export async function startCopy({ dataDir, host, port: wanted, origin: given, durable = true, say, onStop }) {
  const instance = await openInstance({ dataDir, say });
  const port = await claimPort(host, wanted);
  onStop(instance.stop, instance);
  await prepareCheckout(say, recorded(instance, 'set-up'));

  const services = await startServices({ dataDir, say, durable, instance });
  const address = `http://${printable(host)}:${port}`;
  const origin = given ?? address;
  const env = productEnv({
    services: services.env,
    secret: instance.secrets.seal,
    dataDir: instance.dataDir,
    host,
    port,
    origin,
  });
  const tool = (/** @type {string} */ name) =>
    recorded(instance, name)(process.execPath, ['--enable-source-maps', join(dist, 'tools', `${name}.js`)], {
      cwd: root,
      env,
    });

  await step(say, 'Bringing the database up to date', async () => {
    const { code, output } = await tool('migrate');
    if (code !== 0) throw new PlainError(`The database could not be brought up to date:\n${output.trim()}`);
  });
  const start = (/** @type {string} */ name, /** @type {string} */ file) => {
    const args = ['--enable-source-maps', join(dist, file)];
    return supervise(instance, { name, command: process.execPath, args, env, cwd: root, phase: 1 }, say);
  };
  const web = start('web process', 'entry/main.js');
  const worker = start('worker process', 'worker/main.js');
  await step(say, 'Starting web and worker, waiting for the first healthy answer', () =>
    waitForHealth({ host: printable(host), port, origin, program: web }),
  );
  web.keepUp();
  worker.keepUp();
  const newToken = await seed({ env, tool, say, pending: join(instance.dataDir, 'demo-token') });
  return {
    origin,
    address,
    newToken,
    mailPage: services.mailPage,
    env,
    services,
    tool,
    programs: { web, worker },
  };
}

/**
 * Asked early: a start that cannot serve shall not first build for a minute.
 * @param {string} host @param {number} wanted
 */
async function claimPort(host, wanted) {
  const found = await tryPort(wanted, host);
  if ('port' in found) return found.port;
  if (found.code === 'EADDRINUSE') {
    throw new PlainError(
      `Port ${wanted} is taken by another program. Choose another one: PORT=${wanted + 1} npm start`,
    );
  }
  throw new PlainError(`Port ${wanted} on ${host} cannot be used (${found.code}). Check HOST and PORT.`);
}

/** @param {string} host what a browser on this machine would use */
function printable(host) {
  if (['0.0.0.0', '::', 'localhost', ''].includes(host)) return '127.0.0.1';
  return host.includes(':') ? `[${host}]` : host;
}

/**
 * The token is kept until it has been shown once: a start that is killed in between loses nothing.
 * @param {{ env: Record<string, string>, pending: string, say: import('./lib/say.mjs').Say,
 *   tool: (name: string) => Promise<import('./lib/run-program.mjs').Finished> }} options
 */
async function seed({ env, pending, say, tool }) {
  if (env.GAPMARK_ENV === 'production') {
    say('- GAPMARK_ENV is production: the demo workshop is left out');
    return null;
  }
  await step(
    say,
    'Looking after the demo workshop (the first time its captures are read and measured)',
    async () => {
      const { code, stdout, output } = await tool('seed-demo');
      const token = tokenIn(stdout);
      if (token !== null) writeFileAtomically(pending, token);
      if (code !== 0) {
        say(
          `! The demo workshop could not be made; the next start tries again. What was said:\n${output.trim().slice(-2000)}`,
        );
      }
    },
  );
  return existsSync(pending) ? readFileSync(pending, 'utf8') : null;
}

/** Once shown, the token is in nobody's files any more. @param {Copy} copy */
export function forgetToken(copy) {
  rmSync(join(copy.services.instance.dataDir, 'demo-token'), { force: true });
}

/** @param {string} stdout @returns {string | null} */
function tokenIn(stdout) {
  const last = stdout.trim().split('\n').at(-1) ?? '';
  try {
    const { token } = JSON.parse(last);
    return typeof token === 'string' ? token : null;
  } catch {
    return null;
  }
}
