// @ts-check
import { markEnding, whenNpmGoes } from './ending.mjs';
import { PlainError } from './plain-error.mjs';
import { stopRunningPrograms } from './run-program.mjs';

/**
 * Runs a script's work: a plain sentence for a plain fault, and on SIGINT, SIGTERM, SIGHUP or when npm is gone, nothing
 * stays behind. A second signal changes nothing: npm passes on what the terminal has sent us already.
 * @param {() => Promise<unknown>} work
 * @param {{ stop?: () => Promise<void>, stopped?: number }} [options] what else ends with it, and the exit code then
 */
export async function runMain(work, { stop = async () => {}, stopped } = {}) {
  let ending = false;
  const end = async (/** @type {number} */ code) => {
    if (ending) return;
    ending = true;
    markEnding();
    await stopRunningPrograms();
    await stop();
    process.exit(code);
  };
  process.on('SIGINT', () => void end(stopped ?? 130));
  process.on('SIGTERM', () => void end(stopped ?? 143));
  process.on('SIGHUP', () => void end(stopped ?? 129));
  whenNpmGoes(() => void end(1));
  try {
    await work();
  } catch (error) {
    // What was under way fails because it is being ended: that is no news.
    if (ending) return;
    const plain = error instanceof PlainError;
    process.stderr.write(`${plain ? error.message : String(error instanceof Error ? error.stack : error)}\n`);
    await end(1);
  }
}
