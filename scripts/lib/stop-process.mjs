// @ts-check
import { setTimeout as sleep } from 'node:timers/promises';
import { isRunning } from './process-identity.mjs';

/** @typedef {import('./process-identity.mjs').ProcessIdentity} ProcessIdentity */

/**
 * @param {ProcessIdentity} identity
 * @param {NodeJS.Signals} signal
 * @param {boolean} group also its children, when it leads a process group of its own
 */
function send(identity, signal, group) {
  if (!isRunning(identity)) return;
  try {
    process.kill(group ? -identity.pid : identity.pid, signal);
  } catch {
    try {
      process.kill(identity.pid, signal);
    } catch {
      // it ended in between
    }
  }
}

/**
 * Ends one process: politely first, then a stronger signal each time the wait is over. Bounded by the sum of the waits.
 * @param {ProcessIdentity} identity
 * @param {{ signals: readonly { signal: NodeJS.Signals, waitMs: number }[], group?: boolean }} how
 * @returns {Promise<boolean>} whether it has ended
 */
export async function stopProcess(identity, { signals, group = false }) {
  for (const { signal, waitMs } of signals) {
    if (!isRunning(identity)) return true;
    send(identity, signal, group);
    const until = Date.now() + waitMs;
    while (Date.now() < until && isRunning(identity)) await sleep(20);
  }
  return !isRunning(identity);
}

/** What ends our own Node programs. */
export const politely = /** @type {const} */ ([
  { signal: 'SIGTERM', waitMs: 12_000 },
  { signal: 'SIGKILL', waitMs: 3_000 },
]);

/** PostgreSQL: fast shutdown, then immediate (it replays its log at the next start), then by force. */
export const databasePolitely = /** @type {const} */ ([
  { signal: 'SIGINT', waitMs: 20_000 },
  { signal: 'SIGQUIT', waitMs: 5_000 },
  { signal: 'SIGKILL', waitMs: 3_000 },
]);
