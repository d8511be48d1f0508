import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, realpathSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { expect, onTestFinished, test } from 'vitest';
import { identityOf, isRunning, processesIn } from './process-identity.mjs';

function sleeper(cwd = '/') {
  const child = spawn('sleep', ['60'], { cwd });
  onTestFinished(() => void child.kill('SIGKILL'));
  return child;
}

test('isRunning() knows a process while it lives and no longer', async () => {
  const child = sleeper();
  const identity = identityOf(child.pid!)!;
  expect(isRunning(identity)).toBe(true);
  child.kill('SIGKILL');
  await once(child, 'exit');
  expect(isRunning(identity)).toBe(false);
});

test('isRunning() is not fooled by another process with the same id, nor by another boot', () => {
  const identity = identityOf(sleeper().pid!)!;
  expect(isRunning({ ...identity, startTime: String(Number(identity.startTime) - 1) })).toBe(false);
  expect(isRunning({ ...identity, bootId: 'another' })).toBe(false);
});

test('processesIn() finds who works in a folder', () => {
  const folder = realpathSync(mkdtempSync(join(tmpdir(), 'gapmark-cwd-')));
  onTestFinished(() => rmSync(folder, { recursive: true }));
  const child = sleeper(folder);
  expect(processesIn(folder).map(({ pid }) => pid)).toEqual([child.pid]);
});
