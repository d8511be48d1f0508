// @ts-check
import { mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { bundleOptions } from './bundle.mjs';
import { root } from './root.mjs';
import { runProgram } from './run-program.mjs';

/**
 * Runs a TypeScript program of ours once: bundled into a temporary folder from which the packages are found.
 * @param {string} file from the root
 * @param {readonly string[]} args
 * @param {{ nodeOptions?: string[] }} [options]
 * @returns {Promise<number>} its exit code
 */
export async function runTypeScript(file, args, { nodeOptions = [] } = {}) {
  const esbuild = await import('esbuild');
  const caches = join(root, 'node_modules', '.cache');
  mkdirSync(caches, { recursive: true });
  const folder = mkdtempSync(join(caches, 'gapmark-run-'));
  try {
    await esbuild.build(bundleOptions(folder, { program: file }));
    await esbuild.stop();
    const command = ['--enable-source-maps', ...nodeOptions, join(folder, 'program.js'), ...args];
    const { code } = await runProgram(process.execPath, command, { show: true });
    return code;
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
