// @ts-check
import { randomBytes } from 'node:crypto';
import {
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  realpathSync,
  renameSync,
  statSync,
} from 'node:fs';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { lockFolder } from './lock.mjs';
import { PlainError } from './plain-error.mjs';
import { identityOf, isRunning } from './process-identity.mjs';
import { databasePolitely, politely, stopProcess } from './stop-process.mjs';
import { writeFileAtomically } from './write-file.mjs';

/**
 * @typedef {import('./process-identity.mjs').ProcessIdentity} ProcessIdentity
 * @typedef {ProcessIdentity & { name: string, database: boolean }} Recorded
 *
 * @typedef {object} Secrets
 * @property {string} databaseAdminPassword
 * @property {string} databasePassword
 * @property {string} storeAccessKeyId
 * @property {string} storeSecretAccessKey
 * @property {string} seal the product's own: GAPMARK_SECRET
 *
 * @typedef {object} Instance one GAPMARK_DATA folder, held by this process alone until `stop()`
 * @property {string} id random, kept in the folder
 * @property {string} dataDir absolute, without links
 * @property {Secrets} secrets made once, readable by this user only
 * @property {(name: string) => string} folder a private folder under the data folder, made when missing
 * @property {(name: string, pid: number, database?: boolean) => ProcessIdentity | null} record remembers a started process
 *   on disk, so that a later start finds it even when this one is killed
 * @property {(pid: number) => void} forget
 * @property {(program: { stop: () => Promise<void>, phase: number }) => void} adopt remembers a program to be stopped with
 *   the instance; refused once it is being stopped
 * @property {() => Promise<void>} stop ends every program, the highest phase first, and gives the folder free. May be
 *   called at any moment, also while something is being started.
 */

const LONGEST_WAIT_MS = 60_000;

/**
 * @param {{ dataDir: string, say: import('./say.mjs').Say }} options
 * @returns {Promise<Instance>}
 */
export async function openInstance({ dataDir: wanted, say }) {
  const dataDir = makeDataFolder(wanted);
  const lock = await takeLock(dataDir, say);
  try {
    const list = processList(dataDir);
    await stopLeftovers(list, say);
    const id = readOrMakeId(dataDir, say);
    return {
      id,
      dataDir,
      secrets: readOrMakeSecrets(dataDir),
      folder: (name) => {
        const path = join(dataDir, name);
        mkdirSync(path, { recursive: true, mode: 0o700 });
        return path;
      },
      record: list.add,
      forget: list.remove,
      ...household(lock.release),
    };
  } catch (error) {
    lock.release();
    throw error;
  }
}

/** @param {() => void} release */
function household(release) {
  /** @type {{ stop: () => Promise<void>, phase: number }[]} */
  const programs = [];
  /** @type {Promise<void> | null} */
  let stopping = null;
  const stopAll = async () => {
    for (const phase of [...new Set(programs.map((program) => program.phase))].sort((a, b) => b - a)) {
      await Promise.all(
        programs.filter((program) => program.phase === phase).map((program) => program.stop()),
      );
    }
    release();
  };
  return {
    /** @param {{ stop: () => Promise<void>, phase: number }} program */
    adopt: (program) => {
      if (stopping) throw new PlainError('Nothing more is started: this copy is being stopped.');
      programs.push(program);
    },
    stop: () => {
      stopping ??= stopAll();
      return stopping;
    },
  };
}

/**
 * One that is about to end is waited for; one that stays is not disturbed.
 * @param {string} dataDir @param {import('./say.mjs').Say} say
 */
async function takeLock(dataDir, say) {
  const until = Date.now() + LONGEST_WAIT_MS;
  for (let told = false; ; told = true) {
    const lock = await lockFolder(dataDir, 'data');
    if ('release' in lock) return lock;
    if (!lock.ending || Date.now() > until) {
      throw new PlainError(
        `Gapmark already runs on ${dataDir} (${lock.holder}). Stop that one, or give this one its own folder and ` +
          'port: GAPMARK_DATA=… PORT=… npm start',
      );
    }
    if (!told) say(`- An earlier run on this folder is just ending (${lock.holder}); waiting for it …`);
    await sleep(200);
  }
}

/** @param {string} wanted */
function makeDataFolder(wanted) {
  try {
    // Passable for others, so that the database's own user reaches its cluster; what is inside is private.
    mkdirSync(wanted, { recursive: true, mode: 0o711 });
    return realpathSync(wanted);
  } catch (error) {
    throw new PlainError(`The folder ${wanted} (GAPMARK_DATA) cannot be made: ${String(error)}`);
  }
}

/** @param {string} dataDir */
function processList(dataDir) {
  mkdirSync(join(dataDir, 'run'), { recursive: true, mode: 0o700 });
  const path = join(dataDir, 'run', 'processes.json');
  const { dev, ino } = statSync(dataDir);
  // A copied folder brings the list of the original's processes along: they are not this folder's to stop.
  const folder = `${dev}:${ino}`;
  /** @type {Recorded[]} */
  let processes = [];
  try {
    const stored = JSON.parse(readFileSync(path, 'utf8'));
    if (stored.folder === folder) processes = stored.processes;
  } catch {
    // none yet
  }
  const save = () => writeFileAtomically(path, JSON.stringify({ folder, processes }, null, 1));
  return {
    /** @returns {readonly Recorded[]} */
    all: () => processes,
    /** @param {string} name @param {number} pid */
    add: (name, pid, database = false) => {
      const identity = identityOf(pid);
      if (!identity) return null;
      processes = [...processes, { ...identity, name, database }];
      save();
      return identity;
    },
    /** @param {number} pid */
    remove: (pid) => {
      processes = processes.filter((recorded) => recorded.pid !== pid);
      // The news of an end may come after a test has removed the whole folder: then there is nothing left to note.
      if (existsSync(join(dataDir, 'run'))) save();
    },
  };
}

/** @param {ReturnType<typeof processList>} list @param {import('./say.mjs').Say} say */
async function stopLeftovers(list, say) {
  // The last started goes first: the database and the store outlive what uses them.
  for (const recorded of [...list.all()].reverse()) {
    if (isRunning(recorded)) {
      say(`- An earlier run left its ${recorded.name} running (process ${recorded.pid}); stopping it …`);
      const ended = await stopProcess(recorded, {
        signals: recorded.database ? databasePolitely : politely,
        group: !recorded.database,
      });
      if (!ended) {
        throw new PlainError(
          `The ${recorded.name} of an earlier run (process ${recorded.pid}) does not end. Nothing was started.`,
        );
      }
    }
    list.remove(recorded.pid);
  }
}

/** @param {string} dataDir @param {import('./say.mjs').Say} say */
function readOrMakeId(dataDir, say) {
  const path = join(dataDir, 'instance');
  if (existsSync(path)) {
    const id = readFileSync(path, 'utf8').trim();
    if (/^[0-9a-f]{32}$/.test(id)) return id;
  }
  setAside(dataDir, say);
  const id = randomBytes(16).toString('hex');
  writeFileAtomically(path, `${id}\n`);
  return id;
}

/**
 * Without its id this is a new instance. What lies in the folder belongs to another one; it is moved, never deleted.
 * @param {string} dataDir @param {import('./say.mjs').Say} say
 */
export function setAside(dataDir, say) {
  const names = readdirSync(dataDir).filter((name) => name !== 'run' && !name.startsWith('set-aside-'));
  if (names.length === 0) return;
  const aside = join(dataDir, `set-aside-${new Date().toISOString().replace(/[:.]/g, '-')}`);
  mkdirSync(aside, { mode: 0o700 });
  for (const name of names) renameSync(join(dataDir, name), join(aside, name));
  say(`- The data folder had no instance id: this is a new instance. What was there is kept in ${aside}`);
}

/** @param {string} dataDir @returns {Secrets} */
function readOrMakeSecrets(dataDir) {
  const path = join(dataDir, 'secrets.json');
  const secret = () => randomBytes(24).toString('base64url');
  const stored = existsSync(path) ? JSON.parse(readFileSync(path, 'utf8')) : {};
  if (typeof stored.seal === 'string') return stored;
  const secrets = {
    databaseAdminPassword: secret(),
    databasePassword: secret(),
    storeAccessKeyId: randomBytes(10).toString('hex'),
    storeSecretAccessKey: secret(),
    seal: secret(),
    // A folder of an earlier version has all but the newest.
    ...stored,
  };
  writeFileAtomically(path, `${JSON.stringify(secrets, null, 2)}\n`);
  return secrets;
}
