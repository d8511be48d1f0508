// @ts-check
import { readdirSync, readFileSync, readlinkSync } from 'node:fs';

/**
 * A process id alone is reused by the system; together with the start time (clock ticks since boot) and the boot's id it
 * names one process for good. Source: proc_pid_stat(5), field 22, starttime.
 * @typedef {{ pid: number, startTime: string, bootId: string }} ProcessIdentity
 */

/** @returns {string} */
export function bootId() {
  return readFileSync('/proc/sys/kernel/random/boot_id', 'utf8').trim();
}

/**
 * @param {number} pid
 * @returns {{ startTime: string, state: string } | null} null when there is no such process
 */
function stat(pid) {
  try {
    const text = readFileSync(`/proc/${pid}/stat`, 'utf8');
    // The name in parentheses may itself hold spaces and parentheses, so fields are counted from the last one.
    const fields = text.slice(text.lastIndexOf(')') + 2).split(' ');
    return { state: fields[0] ?? '', startTime: fields[19] ?? '' };
  } catch {
    return null;
  }
}

/**
 * @param {number} pid
 * @returns {ProcessIdentity | null} null when there is no such process
 */
export function identityOf(pid) {
  const found = stat(pid);
  return found ? { pid, startTime: found.startTime, bootId: bootId() } : null;
}

/**
 * A zombie has ended: only its parent has not yet asked how.
 * @param {ProcessIdentity} identity
 */
export function isRunning(identity) {
  if (identity.bootId !== bootId()) return false;
  const found = stat(identity.pid);
  return (
    found !== null && found.startTime === identity.startTime && found.state !== 'Z' && found.state !== 'X'
  );
}

/**
 * Processes that work in this folder. PostgreSQL's server and all its children do so in their cluster.
 * @param {string} folder an absolute path without links
 * @returns {ProcessIdentity[]}
 */
export function processesIn(folder) {
  /** @type {ProcessIdentity[]} */
  const found = [];
  for (const name of readdirSync('/proc')) {
    if (!/^\d+$/.test(name)) continue;
    try {
      if (readlinkSync(`/proc/${name}/cwd`) !== folder) continue;
    } catch {
      continue; // ended meanwhile, or another user's
    }
    const identity = identityOf(Number(name));
    if (identity && isRunning(identity)) found.push(identity);
  }
  return found;
}
