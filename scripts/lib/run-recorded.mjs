// @ts-check
import { runProgram } from './run-program.mjs';

/** @typedef {typeof runProgram} Run */

/**
 * Like `runProgram()`, and noted in the data folder while it runs: should this script be killed, the next start finds it.
 * @param {import('./instance.mjs').Instance} instance
 * @param {string} name
 * @returns {Run}
 */
export function recorded(instance, name) {
  return async (command, args, options = {}) => {
    let started = 0;
    try {
      return await runProgram(command, args, {
        ...options,
        onStart: (pid) => {
          started = pid;
          instance.record(name, pid);
        },
      });
    } finally {
      instance.forget(started);
    }
  };
}
