// @ts-check
import { readFileSync } from 'node:fs';
import { identityOf, isRunning } from './process-identity.mjs';

/**
 * Whether this process is on its way out: it was told to end, or the npm that started it is gone. Killed with SIGKILL,
 * npm cannot pass anything on, and nobody is left at the terminal who could stop us.
 */

const PATIENCE_MS = 500;
/** npm starts a shell, and the shell may or may not make way for us. */
const DEEPEST = 3;

let toldToEnd = false;
const npm = process.env.npm_lifecycle_event === undefined ? null : npmAbove();

export function markEnding() {
  toldToEnd = true;
}

export function isEnding() {
  return toldToEnd || npmIsGone();
}

/** Calls back once when npm goes. Does not keep the process alive. @param {() => void} then */
export function whenNpmGoes(then) {
  if (!npm) return;
  const timer = setInterval(() => {
    if (!npmIsGone()) return;
    clearInterval(timer);
    then();
  }, PATIENCE_MS);
  timer.unref();
}

function npmIsGone() {
  return npm !== null && !isRunning(npm);
}

/** @returns {import('./process-identity.mjs').ProcessIdentity | null} */
function npmAbove() {
  let pid = process.ppid;
  for (let depth = 0; depth < DEEPEST && pid > 1; depth++) {
    try {
      // npm names itself "npm start"; run by its file, the file says so.
      const [first = '', second = ''] = readFileSync(`/proc/${pid}/cmdline`, 'utf8').split('\0');
      if (/(^|\/)npm(\s|$)/.test(first) || /npm(-cli\.js)?$/.test(second)) return identityOf(pid);
      const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
      pid = Number(stat.slice(stat.lastIndexOf(')') + 2).split(' ')[1]);
    } catch {
      return null;
    }
  }
  return null;
}
