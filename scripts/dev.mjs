// @ts-check
import { join, resolve } from 'node:path';
import { installedVersions } from '../docker-free-fakes/postgres.mjs';
import { bundleOptions, programs } from './lib/bundle.mjs';
import { installPostgres } from './lib/install-debian.mjs';
import { installPackages } from './lib/install-packages.mjs';
import { openInstance } from './lib/instance.mjs';
import { PlainError } from './lib/plain-error.mjs';
import { productEnv } from './lib/product-env.mjs';
import { root } from './lib/root.mjs';
import { runMain } from './lib/run-main.mjs';
import { recorded } from './lib/run-recorded.mjs';
import { say } from './lib/say.mjs';
import { supervise } from './lib/supervise.mjs';
import { waitForHealth } from './lib/wait-for-health.mjs';
import { startServices } from './services.mjs';

/**
 * `npm run dev`: the services, the pages with reload, and the worker started again when its sources change. It uses the
 * data of `npm start` unless GAPMARK_DATA says otherwise, and its own output folder.
 */

const host = '127.0.0.1';
const port = Number(process.env.PORT || 4321);
const outdir = join(root, 'node_modules', '.cache', 'gapmark-dev');

let stop = async () => {};

async function main() {
  const dataDir = resolve(process.env.GAPMARK_DATA || join(root, '.gapmark'));
  const instance = await openInstance({ dataDir, say });
  stop = instance.stop;
  const run = recorded(instance, 'set-up');
  await installPackages(say, run);
  await installPostgres(say, () => installedVersions().length > 0);
  const services = await startServices({ dataDir, instance, say });
  const origin = process.env.GAPMARK_ORIGIN || `http://${host}:${port}`;
  const env = {
    ...productEnv({
      services: services.env,
      secret: instance.secrets.seal,
      dataDir: instance.dataDir,
      host,
      port,
      origin,
    }),
    NODE_ENV: 'development',
  };

  const pages = supervise(
    instance,
    {
      name: 'page server',
      command: process.execPath,
      args: [join(root, 'node_modules/astro/astro.js'), 'dev', '--host', host, '--port', String(port)],
      env,
      cwd: root,
      phase: 1,
    },
    say,
  );
  /** @type {import('./lib/supervise.mjs').Supervised | null} */
  let worker = null;
  const afterBuild = async () => {
    if (worker) {
      await worker.stop();
      worker.begin();
      say('- The worker was built and started again');
      return;
    }
    const { code, output } = await run(process.execPath, [join(outdir, 'tools/migrate.js')], {
      cwd: root,
      env,
    });
    if (code !== 0) throw new PlainError(`The database could not be brought up to date:\n${output.trim()}`);
    const args = ['--enable-source-maps', join(outdir, 'worker/main.js')];
    const program = { name: 'worker process', command: process.execPath, args, env, cwd: root, phase: 1 };
    worker = supervise(instance, program, say);
    worker.keepUp();
  };
  await watchPrograms(afterBuild);
  await waitForHealth({ host, port, origin, program: pages });
  pages.keepUp();
  // The web and its seed speak to each other through the public address, as anybody does.
  const seeded = await run(process.execPath, [join(outdir, 'tools/seed-demo.js')], { cwd: root, env });
  if (seeded.code !== 0) say(`! The demo workshop could not be made:\n${seeded.output.trim()}`);
  else if (seeded.stdout.trim() !== '')
    say(`Demo token: ${JSON.parse(seeded.stdout.trim().split('\n').at(-1) ?? '{}').token}`);
  say(`- Mail: ${services.mailPage}   Logs: ${instance.folder('log')}`);
  say(`Gapmark reloads here: ${origin}`);
}

/** Builds worker, threads and tools now and whenever a source changes. @param {() => Promise<void>} afterBuild */
async function watchPrograms(afterBuild) {
  const { context } = await import('esbuild');
  const { 'entry/main': _, ...wanted } = programs();
  await new Promise((resolve, reject) => {
    const plugin = {
      name: 'after-build',
      /** @param {import('esbuild').PluginBuild} build */
      setup(build) {
        build.onEnd(({ errors }) => {
          if (errors.length > 0) return;
          afterBuild().then(resolve, reject);
        });
      },
    };
    context({ ...bundleOptions(outdir, wanted), plugins: [plugin] }).then(
      (watching) => watching.watch(),
      reject,
    );
  });
}

await runMain(main, { stop: () => stop(), stopped: 0 });
