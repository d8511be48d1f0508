// @ts-check

/** @typedef {(line: string) => void} Say */

/** Progress goes to standard output, one line each. @type {Say} */
export const say = (line) => {
  process.stdout.write(`${line}\n`);
};

/** @type {Say} */
export const quiet = () => {};

/**
 * Runs one step with a line that says what is waited for, and one with how long it took when that was noticeable.
 * @template T
 * @param {Say} tell
 * @param {string} what
 * @param {() => Promise<T>} work
 * @returns {Promise<T>}
 */
export async function step(tell, what, work) {
  tell(`- ${what} …`);
  const began = performance.now();
  const result = await work();
  const seconds = (performance.now() - began) / 1000;
  if (seconds >= 1) tell(`  done after ${seconds.toFixed(1)} s`);
  return result;
}
