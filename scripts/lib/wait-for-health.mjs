// @ts-check
import { request } from 'node:http';
import { setTimeout as sleep } from 'node:timers/promises';
import { PlainError } from './plain-error.mjs';

const LONGEST_START_MS = 60_000;

/**
 * Waits until the web process answers that it is well.
 * @param {{ host: string, port: number, origin: string, program: import('./supervise.mjs').Supervised }} options
 */
export async function waitForHealth({ host, port, origin, program }) {
  const until = Date.now() + LONGEST_START_MS;
  for (;;) {
    if ((await statusOf({ host, port, origin })) === 200) return;
    if (!program.running())
      throw new PlainError(`The ${program.name} did not start. Its last words:\n${program.logTail()}`);
    if (Date.now() > until) {
      throw new PlainError(
        `The ${program.name} does not answer after ${LONGEST_START_MS / 1000} s. Its last words:\n${program.logTail()}`,
      );
    }
    await sleep(60);
  }
}

/**
 * @param {{ host: string, port: number, origin: string }} options
 * @returns {Promise<number | null>} null: no answer
 */
function statusOf({ host, port, origin }) {
  return new Promise((resolve) => {
    const asked = request(
      // The public host, as the web process refuses any other.
      {
        host,
        port,
        path: '/api/v1/health',
        headers: { host: new URL(origin).host },
        timeout: 5_000,
        agent: false,
      },
      (response) => {
        response.resume();
        resolve(response.statusCode ?? null);
      },
    );
    asked.on('timeout', () => asked.destroy());
    asked.on('error', () => resolve(null));
    asked.end();
  });
}
