// @ts-check
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { lockFolder } from './lock.mjs';
import { PlainError } from './plain-error.mjs';
import { root } from './root.mjs';
import { runProgram } from './run-program.mjs';
import { step } from './say.mjs';

const OLDEST_NODE = /** @type {const} */ ([20, 20]);

/**
 * Runs `npm ci` when node_modules is not what the lock file says.
 * @param {import('./say.mjs').Say} say @param {import('./run-recorded.mjs').Run} [run]
 */
export async function installPackages(say, run = runProgram) {
  const [oldestMajor, oldestMinor] = OLDEST_NODE;
  const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
  if (major < oldestMajor || (major === oldestMajor && minor < oldestMinor)) {
    throw new PlainError(
      `Gapmark needs Node ${OLDEST_NODE.join('.')} or newer; this is ${process.versions.node}.`,
    );
  }
  if (packagesFit()) return;
  const lock = await waitForLock(say);
  try {
    if (packagesFit()) return;
    await step(say, 'Installing packages (npm ci), about half a minute', async () => {
      const { code, output } = await run('npm', ['ci', '--include=dev', '--no-audit', '--no-fund'], {
        cwd: root,
      });
      if (code !== 0) throw new PlainError(`The packages could not be installed:\n${output.trim()}`);
    });
  } finally {
    lock.release();
  }
}

/** @param {import('./say.mjs').Say} say */
async function waitForLock(say) {
  for (let told = false; ; told = true) {
    const lock = await lockFolder(root, 'packages');
    if ('release' in lock) return lock;
    if (!told) say(`- Waiting for ${lock.holder}, which installs packages in this checkout …`);
    await sleep(500);
  }
}

/** npm notes what it installed; that is compared with what the lock file wants. */
function packagesFit() {
  const note = join(root, 'node_modules/.package-lock.json');
  if (!existsSync(note)) return false;
  /** @type {(path: string) => Record<string, { version?: string, integrity?: string, optional?: boolean }>} */
  const read = (path) => JSON.parse(readFileSync(path, 'utf8')).packages;
  const installed = read(note);
  return Object.entries(read(join(root, 'package-lock.json'))).every(
    ([path, wanted]) =>
      path === '' || wanted.optional === true || installed[path]?.version === wanted.version,
  );
}
