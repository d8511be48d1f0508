// @ts-check
import { spawn } from 'node:child_process';
import { isEnding } from './ending.mjs';
import { identityOf } from './process-identity.mjs';
import { politely, stopProcess } from './stop-process.mjs';

/**
 * @typedef {object} Finished
 * @property {number} code 128 and more when a signal ended it
 * @property {string} stdout
 * @property {string} output both streams, as they came
 */

/** @type {Set<import('./process-identity.mjs').ProcessIdentity>} */
const underWay = new Set();

/**
 * Runs a program to its end. It leads a process group, so that ending it ends its children as well.
 * @param {string} command
 * @param {readonly string[]} args
 * @param {{ cwd?: string, env?: NodeJS.ProcessEnv, uid?: number, gid?: number, show?: boolean, limitMs?: number,
 *   onStart?: (pid: number) => void, input?: string }} [options] `show` passes its output on while it runs
 * @returns {Promise<Finished>}
 */
export function runProgram(command, args, options = {}) {
  // Whoever ends this script ends what runs; nothing may begin after that.
  if (isEnding())
    return Promise.resolve({ code: 130, stdout: '', output: 'Not started: this script is ending.' });
  return new Promise((resolve) => {
    let stdout = '';
    let output = '';
    const child = spawn(command, [...args], {
      cwd: options.cwd ?? process.cwd(),
      env: options.env ?? process.env,
      detached: true,
      stdio: [options.input === undefined ? 'ignore' : 'pipe', 'pipe', 'pipe'],
      ...(options.uid === undefined ? {} : { uid: options.uid, gid: options.gid }),
    });
    const identity = child.pid === undefined ? null : identityOf(child.pid);
    if (identity) {
      underWay.add(identity);
      options.onStart?.(identity.pid);
    }
    child.stdin?.on('error', () => {});
    child.stdin?.end(options.input);
    child.stdout?.on('data', (data) => {
      stdout += String(data);
      output += String(data);
      if (options.show) process.stdout.write(data);
    });
    child.stderr?.on('data', (data) => {
      output += String(data);
      if (options.show) process.stderr.write(data);
    });
    const limit =
      options.limitMs === undefined || !identity
        ? null
        : setTimeout(() => {
            output += `\nEnded: it had not finished after ${Math.round(Number(options.limitMs) / 1000)} s.\n`;
            void stopProcess(identity, { signals: politely, group: true });
          }, options.limitMs);
    /** @param {number} code */
    const finish = (code) => {
      if (limit) clearTimeout(limit);
      if (identity) underWay.delete(identity);
      resolve({ code, stdout, output });
    };
    child.on('error', (error) => {
      output += String(error);
      finish(127);
    });
    // A grandchild that stays would hold the streams open, and 'close' would never come.
    child.on('exit', () => identity && sweepGroup(identity.pid));
    child.on('close', (code, signal) => finish(code ?? (signal ? 130 : 1)));
  });
}

/** What a finished program may have left in its group. @param {number} leader */
function sweepGroup(leader) {
  try {
    process.kill(-leader, 'SIGKILL');
  } catch {
    // nothing left
  }
}

/** Ends what runs at this moment. */
export async function stopRunningPrograms() {
  await Promise.all(
    [...underWay].map((identity) => stopProcess(identity, { signals: politely, group: true })),
  );
}
