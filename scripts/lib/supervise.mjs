// @ts-check
import { spawn } from 'node:child_process';
import { closeSync, existsSync, openSync, readFileSync, renameSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { databasePolitely, politely, stopProcess } from './stop-process.mjs';

/**
 * @typedef {object} Program
 * @property {string} name what people call it: "database", "web server"
 * @property {string} command
 * @property {string[]} args
 * @property {NodeJS.ProcessEnv} env the whole environment of the program
 * @property {string} [cwd]
 * @property {number} [uid]
 * @property {number} [gid]
 * @property {number} [phase] what has a higher one ends before what has a lower one; services have 0
 * @property {boolean} [database] stop it as PostgreSQL wants to be stopped
 * @property {boolean} [channel] open a channel for messages to us
 *
 * @typedef {object} Supervised
 * @property {string} name
 * @property {() => number | null} pid null while it is down
 * @property {(message: (value: unknown) => void) => void} onMessage
 * @property {() => boolean} running
 * @property {() => void} keepUp from now on start it again when it ends
 * @property {() => string} logTail the last lines that it wrote
 * @property {string} logPath
 * @property {() => Promise<void>} stop
 * @property {() => void} begin starts it again after `stop()`
 */

const FIRST_PAUSE_MS = 250;
const LONGEST_PAUSE_MS = 15_000;
/** A program that stood this long starts again without a pause counted from earlier falls. */
const STEADY_MS = 60_000;
const LARGEST_LOG_BYTES = 8 * 1024 * 1024;

/**
 * Starts a program in its own session, so that Ctrl-C at the terminal reaches only us and we stop everything in order.
 * @param {import('./instance.mjs').Instance} instance
 * @param {Program} program
 * @param {import('./say.mjs').Say} say
 * @returns {Supervised}
 */
export function supervise(instance, program, say) {
  const logPath = join(instance.folder('log'), `${program.name.replaceAll(' ', '-')}.log`);
  /** @type {import('node:child_process').ChildProcess | null} */
  let child = null;
  /** @type {import('./process-identity.mjs').ProcessIdentity | null} */
  let identity = null;
  /** @type {NodeJS.Timeout | null} */
  let again = null;
  /** @type {Set<(value: unknown) => void>} */
  const listeners = new Set();
  let keptUp = false;
  let stopping = false;
  let pauseMs = FIRST_PAUSE_MS;

  const start = () => {
    again = null;
    turnOver(logPath);
    const log = openSync(logPath, 'a', 0o600);
    const startedAt = Date.now();
    const started = spawn(program.command, program.args, {
      env: program.env,
      cwd: program.cwd ?? process.cwd(),
      detached: true,
      stdio: program.channel ? ['ignore', log, log, 'ipc'] : ['ignore', log, log],
      ...(program.uid === undefined ? {} : { uid: program.uid, gid: program.gid }),
    });
    closeSync(log);
    child = started;
    const { pid } = started;
    if (pid !== undefined) identity = instance.record(program.name, pid, program.database);
    started.on('message', (value) => {
      for (const listener of listeners) listener(value);
    });
    let ended = false;
    /** @param {string} how */
    const onEnd = (how) => {
      if (ended) return;
      ended = true;
      if (pid !== undefined) instance.forget(pid);
      if (child === started) child = null;
      if (stopping || !keptUp) return;
      if (Date.now() - startedAt > STEADY_MS) pauseMs = FIRST_PAUSE_MS;
      say(
        `! The ${program.name} ended (${how}); starting it again in ${pauseMs / 1000} s. Its log: ${logPath}`,
      );
      again = setTimeout(start, pauseMs);
      pauseMs = Math.min(pauseMs * 2, LONGEST_PAUSE_MS);
    };
    started.on('error', (error) => onEnd(String(error)));
    started.on('exit', (code, signal) => onEnd(signal ?? `code ${code}`));
  };
  const stop = async () => {
    stopping = true;
    if (again) clearTimeout(again);
    if (child === null || identity === null) return;
    await stopProcess(identity, {
      signals: program.database ? databasePolitely : politely,
      group: !program.database,
    });
    instance.forget(identity.pid);
  };
  instance.adopt({ stop, phase: program.phase ?? 0 });
  start();

  return {
    name: program.name,
    logPath,
    pid: () => child?.pid ?? null,
    running: () => child !== null,
    onMessage: (listener) => listeners.add(listener),
    keepUp: () => {
      keptUp = true;
    },
    logTail: () => (existsSync(logPath) ? lastLines(readFileSync(logPath, 'utf8'), 12) : ''),
    stop,
    begin: () => {
      stopping = false;
      if (child === null) start();
    },
  };
}

/** @param {string} path */
function turnOver(path) {
  if (existsSync(path) && statSync(path).size > LARGEST_LOG_BYTES) renameSync(path, `${path}.old`);
}

/** @param {string} text @param {number} count */
function lastLines(text, count) {
  return text.trimEnd().split('\n').slice(-count).join('\n');
}
