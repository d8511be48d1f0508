// @ts-check
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { bundleOptions, programs } from './lib/bundle.mjs';
import { compressFiles } from './lib/compress.mjs';
import { lockFolder } from './lib/lock.mjs';
import { PlainError } from './lib/plain-error.mjs';
import { root } from './lib/root.mjs';
import { runMain } from './lib/run-main.mjs';
import { runProgram } from './lib/run-program.mjs';
import { step, say as tellTerminal } from './lib/say.mjs';
import { sourceHash } from './lib/source-hash.mjs';
import { writeFileAtomically } from './lib/write-file.mjs';

/** Where the built product lies. GAPMARK_DIST, a folder inside the checkout, keeps two builds of one checkout apart. */
export const dist = resolve(root, process.env.GAPMARK_DIST ?? 'dist');

/**
 * Builds pages and programs when the sources changed since the last time.
 * @param {{ say?: import('./lib/say.mjs').Say, run?: import('./lib/run-recorded.mjs').Run }} [options]
 */
export async function build({ say = tellTerminal, run = runProgram } = {}) {
  const lock = await waitForLock(say);
  try {
    const hash = sourceHash();
    const mark = join(dist, '.build-hash');
    if (existsSync(mark) && readFileSync(mark, 'utf8').trim() === hash) return;
    // A build that is broken off must not pass for a whole one.
    rmSync(mark, { force: true });
    await step(say, 'Building the pages (the sources are new or changed), about half a minute', () =>
      buildPages(run),
    );
    await step(say, 'Building the programs and compressing what browsers load', async () => {
      const esbuild = await import('esbuild');
      for (const folder of ['entry', 'worker', 'tools'])
        rmSync(join(dist, folder), { recursive: true, force: true });
      await esbuild.build(bundleOptions(dist, programs()));
      await esbuild.stop();
      await compressFiles(join(dist, 'client'));
    });
    writeFileAtomically(mark, `${hash}\n`, 0o644);
  } finally {
    lock.release();
  }
}

/** Two starts in one checkout build one after the other. @param {import('./lib/say.mjs').Say} say */
async function waitForLock(say) {
  mkdirSync(dist, { recursive: true });
  for (let told = false; ; told = true) {
    const lock = await lockFolder(dist, 'build');
    if ('release' in lock) return lock;
    if (!told) say(`- Waiting for ${lock.holder}, which builds in this checkout …`);
    await sleep(500);
  }
}

/** @param {import('./lib/run-recorded.mjs').Run} run */
async function buildPages(run) {
  const { code, output } = await run(
    process.execPath,
    [join(root, 'node_modules/astro/astro.js'), 'build', '--outDir', dist],
    {
      cwd: root,
      env: { ...process.env, NODE_ENV: 'production', ASTRO_TELEMETRY_DISABLED: '1', CI: '1', NO_COLOR: '1' },
    },
  );
  if (code !== 0)
    throw new PlainError(`The pages could not be built:\n${output.trim().split('\n').slice(-40).join('\n')}`);
}

if (import.meta.filename === process.argv[1]) await runMain(() => build());
