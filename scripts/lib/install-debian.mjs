// @ts-check
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { PlainError } from './plain-error.mjs';
import { runProgram } from './run-program.mjs';
import { step } from './say.mjs';

/**
 * @param {import('./say.mjs').Say} say
 * @param {{ packageName: string, what: string, present: () => boolean, before?: () => void }} wanted
 */
async function installDebian(say, { packageName, what, present, before }) {
  if (present()) return;
  if (process.getuid?.() !== 0 || !existsSync('/usr/bin/apt-get')) {
    throw new PlainError(
      `${what} is missing. Install it, then start again: sudo apt-get install ${packageName}`,
    );
  }
  before?.();
  await step(say, `Installing ${what} (apt-get install ${packageName}), a minute or two`, async () => {
    const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive', UCF_FORCE_CONFFOLD: '1' };
    const patience = ['-o', 'DPkg::Lock::Timeout=300', '-o', 'Acquire::Retries=2'];
    await runProgram('apt-get', ['update', ...patience], { env, limitMs: 300_000 });
    const install = ['install', '-y', '--no-install-recommends', ...patience, packageName];
    const { code, output } = await runProgram('apt-get', install, { env });
    if (code !== 0 || !present()) {
      throw new PlainError(
        `${what} could not be installed:\n${output.trim().split('\n').slice(-15).join('\n')}`,
      );
    }
  });
}

/** @param {import('./say.mjs').Say} say @param {() => boolean} present */
export function installPostgres(say, present) {
  return installDebian(say, {
    packageName: 'postgresql',
    what: 'PostgreSQL',
    present,
    before: noClusterOfItsOwn,
  });
}

/** @param {import('./say.mjs').Say} say */
export function installChromium(say) {
  return installDebian(say, {
    packageName: 'chromium',
    what: 'Chromium',
    present: () => existsSync('/usr/bin/chromium'),
  });
}

/** Debian's package would start a cluster that nobody asked for. Source: createcluster.conf(5). */
function noClusterOfItsOwn() {
  const path = '/etc/postgresql-common/createcluster.conf';
  const text = existsSync(path) ? readFileSync(path, 'utf8') : '';
  if (/^\s*create_main_cluster\s*=/m.test(text)) return;
  mkdirSync('/etc/postgresql-common', { recursive: true });
  writeFileSync(path, `${text}create_main_cluster = false\n`);
}
