// @ts-check
import { setTimeout as sleep } from 'node:timers/promises';
import { PlainError } from './plain-error.mjs';
import { supervise } from './supervise.mjs';

const LONGEST_START_MS = 30_000;

/**
 * Starts one of our Node services and waits until it listens, on ports that it picks. When it falls and is started again
 * it gets the same ports, so whoever uses it needs no new address.
 * @param {import('./instance.mjs').Instance} instance
 * @param {{ name: string, file: string, env: Record<string, string>, say: import('./say.mjs').Say }} service
 */
export async function startServiceProcess(instance, { name, file, env: own, say }) {
  /** @type {NodeJS.ProcessEnv} */
  const env = { PATH: process.env.PATH, LANG: 'C.UTF-8', ...own, SERVICE_PORTS: '{}' };
  const program = supervise(
    instance,
    { name, command: process.execPath, args: [file], env, channel: true },
    say,
  );
  /** @type {Record<string, number> | null} */
  let ports = null;
  program.onMessage((message) => {
    ports = /** @type {{ ports: Record<string, number> }} */ (message).ports;
    env.SERVICE_PORTS = JSON.stringify(ports);
  });
  const until = Date.now() + LONGEST_START_MS;
  for (;;) {
    if (ports !== null) break;
    if (!program.running() || Date.now() > until) {
      const tail = program.logTail();
      await program.stop();
      throw new PlainError(`The ${name} did not start. Its last words:\n${tail}`);
    }
    await sleep(20);
  }
  program.keepUp();
  return { ports: /** @type {Record<string, number>} */ (ports), program };
}
