import { spawn } from 'node:child_process';
import { once } from 'node:events';
import {
  cpSync,
  existsSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { expect, onTestFinished, test } from 'vitest';
import { openInstance } from './instance.mjs';
import { quiet } from './say.mjs';

function dataFolder() {
  const folder = mkdtempSync(join(tmpdir(), 'gapmark-instance-'));
  onTestFinished(() => rmSync(folder, { recursive: true, force: true }));
  return join(folder, 'data');
}

const openFolder = (dataDir: string) => openInstance({ dataDir, say: quiet });

/** A process that ends at SIGTERM, and when it did. */
function sleeper() {
  const child = spawn('sleep', ['60'], { detached: true });
  onTestFinished(() => void child.kill('SIGKILL'));
  return { child, ended: once(child, 'exit') };
}

test('openInstance() keeps id and secrets, for this user only', async () => {
  const dataDir = dataFolder();
  const first = await openFolder(dataDir);
  await first.stop();
  const second = await openFolder(dataDir);
  await second.stop();
  expect(second.id).toBe(first.id);
  expect(second.secrets).toEqual(first.secrets);
  expect(new Set(Object.values(first.secrets)).size).toBe(5);
  for (const name of ['instance', 'secrets.json'])
    expect(statSync(join(dataDir, name)).mode & 0o777).toBe(0o600);
});

test('openInstance() refuses a folder that another start holds, and says who', async () => {
  const dataDir = dataFolder();
  const first = await openFolder(dataDir);
  await expect(openFolder(dataDir)).rejects.toThrow(
    `already runs on ${first.dataDir} (process ${process.pid})`,
  );
  await first.stop();
  await (await openFolder(dataDir)).stop();
});

test('openInstance() stops what an earlier run left, and no stranger with the same id', async () => {
  const dataDir = dataFolder();
  const left = sleeper();
  const stranger = sleeper();
  const first = await openFolder(dataDir);
  first.record('web process', left.child.pid!);
  first.record('worker process', stranger.child.pid!);
  await first.stop();
  const list = join(dataDir, 'run/processes.json');
  const stored = JSON.parse(readFileSync(list, 'utf8'));
  stored.processes[1].startTime = '1';
  writeFileSync(list, JSON.stringify(stored));

  const second = await openFolder(dataDir);
  const [, signal] = await left.ended;
  expect(signal).toBe('SIGTERM');
  expect(stranger.child.exitCode ?? stranger.child.signalCode).toBeNull();
  await second.stop();
});

test('openInstance() on a copied folder leaves the original’s processes alone', async () => {
  const dataDir = dataFolder();
  const running = sleeper();
  const original = await openFolder(dataDir);
  original.record('web process', running.child.pid!);
  cpSync(dataDir, `${dataDir}-copy`, { recursive: true });
  await (await openFolder(`${dataDir}-copy`)).stop();
  expect(running.child.exitCode ?? running.child.signalCode).toBeNull();
  await original.stop();
});

test('openInstance() without an id is a new instance and keeps what was there', async () => {
  const dataDir = dataFolder();
  const first = await openFolder(dataDir);
  writeFileSync(join(first.folder('objects'), 'capture'), 'bytes');
  await first.stop();
  rmSync(join(dataDir, 'instance'));
  const second = await openFolder(dataDir);
  await second.stop();
  expect(second.id).not.toBe(first.id);
  expect(existsSync(join(dataDir, 'objects'))).toBe(false);
  const [aside] = readdirSync(dataDir).filter((name) => name.startsWith('set-aside-'));
  expect(readFileSync(join(dataDir, aside!, 'objects/capture'), 'utf8')).toBe('bytes');
});

test('stop() ends the highest phase first, and nothing is taken on after it', async () => {
  const instance = await openFolder(dataFolder());
  const order: string[] = [];
  const program = (name: string, phase: number) => ({ phase, stop: async () => void order.push(name) });
  instance.adopt(program('database', 0));
  instance.adopt(program('web', 1));
  await instance.stop();
  expect(order).toEqual(['web', 'database']);
  expect(() => instance.adopt(program('late', 1))).toThrow('being stopped');
});
