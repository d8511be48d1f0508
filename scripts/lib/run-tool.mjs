// @ts-check
import { join } from 'node:path';
import { dist } from '../build.mjs';
import { PlainError } from './plain-error.mjs';
import { root } from './root.mjs';
import { runProgram } from './run-program.mjs';

/**
 * Runs a program of `dist/tools` that prints one line of JSON; `refused` in it is a plain fault.
 * @param {string} name @param {readonly string[]} args @param {Record<string, string>} env
 * @returns {Promise<Record<string, unknown>>}
 */
export async function runTool(name, args, env) {
  const program = join(dist, 'tools', `${name}.js`);
  const { code, stdout, output } = await runProgram(
    process.execPath,
    ['--enable-source-maps', program, ...args],
    {
      cwd: root,
      env,
    },
  );
  const last = stdout.trim().split('\n').at(-1) ?? '';
  /** @type {Record<string, unknown>} */
  let said = {};
  try {
    said = JSON.parse(last);
  } catch {
    // it failed before it could say anything
  }
  if (typeof said.refused === 'string') throw new PlainError(said.refused);
  if (code !== 0) throw new PlainError(`That failed. What was said:\n${output.trim().slice(-2000)}`);
  return said;
}
