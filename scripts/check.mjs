// @ts-check
import { join } from 'node:path';
import { checkAstroImports } from './lib/astro-imports.mjs';
import { installPackages } from './lib/install-packages.mjs';
import { PlainError } from './lib/plain-error.mjs';
import { root } from './lib/root.mjs';
import { runMain } from './lib/run-main.mjs';
import { runProgram } from './lib/run-program.mjs';
import { say } from './lib/say.mjs';

/**
 * `npm run check`: types, lint and import rules, each told apart.
 *
 * @typedef {{ name: string, run: (limitMs: number) => Promise<string | null> }} Check `run` gives what is wrong, or null
 */

const LONGEST_MS = 300_000;
const IMPORTING = ['src', 'scripts', 'samples', 'bench', 'tests', 'docker-free-fakes'];

/** @param {string} file below node_modules @param {string[]} args @returns {Check['run']} */
const tool = (file, args) => async (limitMs) => {
  const env = { ...process.env, ASTRO_TELEMETRY_DISABLED: '1', CI: '1', NO_COLOR: '1', FORCE_COLOR: '0' };
  const { code, output } = await runProgram(process.execPath, [join(root, 'node_modules', file), ...args], {
    cwd: root,
    env,
    limitMs,
  });
  return code === 0 ? null : output.trim();
};

/** @type {Check[]} */
const checks = [
  {
    name: 'lint and format',
    run: tool('@biomejs/biome/bin/biome', ['check', '--diagnostic-level=error', '--max-diagnostics=50']),
  },
  // Reads pages and all TypeScript and JavaScript that tsconfig.json includes, and first makes the types of actions.
  {
    name: 'types',
    run: tool('astro/astro.js', ['check', '--minimumFailingSeverity', 'error', '--minimumSeverity', 'error']),
  },
  {
    name: 'import rules',
    run: tool('dependency-cruiser/bin/dependency-cruise.mjs', [
      '--config',
      '.dependency-cruiser.cjs',
      '--output-type',
      'err',
      ...IMPORTING,
    ]),
  },
  {
    name: 'import rules of pages',
    run: async () => checkAstroImports().faults.join('\n') || null,
  },
];

/**
 * Runs all of them and tells each.
 * @param {{ limitMs?: number }} [options] for each of them
 * @returns {Promise<{ passed: number, failed: number }>}
 */
export async function runChecks({ limitMs = LONGEST_MS } = {}) {
  let failed = 0;
  for (const { name, run } of checks) {
    const began = performance.now();
    const fault = await run(limitMs);
    const seconds = ((performance.now() - began) / 1000).toFixed(1);
    say(`${fault === null ? '✓' : '✗'} ${name} (${seconds} s)`);
    if (fault === null) continue;
    failed += 1;
    say(fault);
  }
  return { passed: checks.length - failed, failed };
}

if (import.meta.filename === process.argv[1]) {
  await runMain(async () => {
    await installPackages(say);
    const { failed } = await runChecks();
    if (failed > 0) throw new PlainError(`${failed} of ${checks.length} checks failed.`);
  });
}
