import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { chmodSync, existsSync, mkdtempSync, readFileSync, rmSync, statSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import { afterAll, expect, test } from 'vitest';
import { processesOf } from './lib/processes-of.mjs';

/** What `npm start` promises, kept by the start script itself on the built product. */

const script = fileURLToPath(new URL('./start.mjs', import.meta.url));
const dataDir = mkdtempSync(join(tmpdir(), 'gapmark-start-'));
chmodSync(dataDir, 0o711);
const started: ChildProcess[] = [];

afterAll(async () => {
  for (const child of started)
    if (child.exitCode === null && child.signalCode === null) await end(child, 'SIGTERM');
  const id = existsSync(join(dataDir, 'instance'))
    ? readFileSync(join(dataDir, 'instance'), 'utf8').trim()
    : '';
  // Only there when the temporary folder is closed to the database's user.
  if (id) rmSync(join('/var/lib/gapmark', id), { recursive: true, force: true });
  rmSync(dataDir, { recursive: true, force: true });
});

function start(settings: Record<string, string> = {}) {
  const { npm_lifecycle_event: _, ...env } = process.env;
  const child = spawn(process.execPath, [script], {
    // Without what is still being made after the ready line, two looks at the captures can be compared.
    env: { ...env, GAPMARK_DATA: dataDir, PORT: '0', GAPMARK_STARTING_LIBRARY: 'off', ...settings },
  });
  started.push(child);
  let output = '';
  for (const stream of [child.stdout, child.stderr]) {
    stream.on('data', (data) => {
      output += String(data);
    });
  }
  return { child, output: () => output };
}

async function ready(run: ReturnType<typeof start>): Promise<string> {
  for (;;) {
    const match = /^Gapmark is ready: (http:\/\/127\.0\.0\.1:\d+)$/m.exec(run.output());
    if (match) return match[1]!;
    if (run.child.exitCode !== null) throw new Error(`the start ended: ${run.output()}`);
    await sleep(50);
  }
}

async function end(child: ChildProcess, signal: NodeJS.Signals) {
  const exit = once(child, 'exit');
  child.kill(signal);
  return exit;
}

async function captures(origin: string, token: string): Promise<string[]> {
  const answer = await fetch(`${origin}/api/v1/captures`, { headers: { authorization: `Bearer ${token}` } });
  expect(answer.status).toBe(200);
  const { items } = (await answer.json()) as { items: { id: string }[] };
  return items.map(({ id }) => id).sort();
}

test('npm start serves, shows the demo token once, refuses a second one, survives SIGKILL and leaves nothing', {
  timeout: 300_000,
}, async () => {
  const first = start();
  const origin = await ready(first);
  await expect.poll(first.output, { timeout: 5_000 }).toMatch(/^Demo token: \S+$/m);
  const token = /^Demo token: (\S+)$/m.exec(first.output())![1]!;
  const before = await captures(origin, token);
  expect(before.length).toBeGreaterThan(0);
  expect(statSync(join(dataDir, 'secrets.json')).mode & 0o777).toBe(0o600);
  expect(existsSync(join(dataDir, 'demo-token'))).toBe(false);

  const second = start();
  await once(second.child, 'close');
  expect(second.child.exitCode).toBe(1);
  expect(second.output()).toContain(`already runs on ${dataDir} (process ${first.child.pid})`);

  const { processes } = JSON.parse(readFileSync(join(dataDir, 'run/processes.json'), 'utf8'));
  const pids = processes.map(({ pid }: { pid: number }) => pid);
  expect(processes.map(({ name }: { name: string }) => name).sort()).toEqual([
    'database',
    'mail catcher',
    'object store',
    'web process',
    'worker process',
  ]);
  await end(first.child, 'SIGKILL');
  const third = start();
  const again = await ready(third);
  for (const pid of pids)
    expect(existsSync(`/proc/${pid}`) && processesOf(dataDir).includes(pid)).toBe(false);
  expect(await captures(again, token)).toEqual(before);
  expect(third.output()).not.toContain('Demo token');

  const [code] = await end(third.child, 'SIGINT');
  expect(code).toBe(0);
  expect(processesOf(dataDir)).toEqual([]);
});

test('npm start says which port is taken, and starts nothing', async () => {
  const server = createServer();
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as { port: number };
  const run = start({ PORT: String(port) });
  const [code] = await once(run.child, 'close');
  server.close();
  expect(code).toBe(1);
  expect(run.output().trim()).toBe(
    `Port ${port} is taken by another program. Choose another one: PORT=${port + 1} npm start`,
  );
  expect(processesOf(dataDir)).toEqual([]);
});

test('npm start names a PORT that is no port', async () => {
  const run = start({ PORT: 'http' });
  const [code] = await once(run.child, 'close');
  expect([code, run.output().trim()]).toEqual([
    1,
    'PORT is “http”; it must be a number from 0 (any) to 65535.',
  ]);
});
