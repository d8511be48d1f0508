// @ts-check
import { existsSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { root } from './root.mjs';

/** The programs beside the pages, as they lie in `dist/`. */
const PROGRAMS = {
  'entry/main': 'src/entry/main.ts',
  'worker/main': 'src/worker/main.ts',
  'tools/migrate': 'src/server/db/migrate.ts',
  'tools/backup': 'src/server/backup/backup-tool.ts',
  'tools/restore': 'src/server/backup/restore-tool.ts',
  'tools/reset-password': 'src/server/session/reset-by-hand.ts',
  'tools/seed-demo': 'src/server/workshop/seed-demo.ts',
  'tools/seed-library': 'src/server/workshop/seed-library.ts',
};

/** @returns {Record<string, string>} output name → source, threads of the worker included */
export function programs() {
  const folder = join(root, 'src/worker');
  const threads = existsSync(folder) ? readdirSync(folder).filter((name) => name.endsWith('.thread.ts')) : [];
  return {
    ...PROGRAMS,
    ...Object.fromEntries(
      threads.map((name) => [`worker/${name.replace(/\.ts$/, '')}`, `src/worker/${name}`]),
    ),
  };
}

/**
 * How every TypeScript program of ours becomes one that Node runs: packages stay packages, and the built pages are found
 * beside the program.
 * @param {string} outdir
 * @param {Record<string, string>} entryPoints
 * @returns {import('esbuild').BuildOptions}
 */
export function bundleOptions(outdir, entryPoints) {
  return {
    absWorkingDir: root,
    entryPoints,
    outdir,
    bundle: true,
    platform: 'node',
    target: 'node20',
    format: 'esm',
    packages: 'external',
    external: ['*/server/entry.mjs'],
    sourcemap: 'linked',
    logLevel: 'warning',
    logOverride: { 'unsupported-dynamic-import': 'silent' },
  };
}
