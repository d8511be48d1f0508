import { type ChildProcess, execFile, spawn } from 'node:child_process';
import { createHash, randomBytes } from 'node:crypto';
import { once } from 'node:events';
import { chmodSync, existsSync, mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { GetObjectCommand, ListObjectsV2Command, PutObjectCommand, S3Client } from '@aws-sdk/client-s3';
import pg from 'pg';
import { afterAll, expect, test, vi } from 'vitest';

/** `npm run backup` and `npm run restore`: a round trip from one data folder to another, as somebody at a terminal does it. */
vi.setConfig({ testTimeout: 300_000 });

const root = resolve(import.meta.dirname, '..');
const dist = resolve(root, process.env.GAPMARK_DIST ?? 'dist');
const work = mkdtempSync(join(tmpdir(), 'gapmark-backup-'));
chmodSync(work, 0o711);
const folders = { from: join(work, 'from'), to: join(work, 'to') };
const running: ChildProcess[] = [];

afterAll(async () => {
  for (const child of running) await stop(child);
  for (const folder of Object.values(folders)) {
    const id = existsSync(join(folder, 'instance'))
      ? readFileSync(join(folder, 'instance'), 'utf8').trim()
      : '';
    if (id) rmSync(join('/var/lib/gapmark', id), { recursive: true, force: true });
  }
  rmSync(work, { recursive: true, force: true });
}, 120_000);

async function stop(child: ChildProcess) {
  if (child.exitCode !== null || child.signalCode !== null) return;
  const gone = once(child, 'exit');
  child.kill('SIGTERM');
  await gone;
}

/** The environment without the services of the copy that other tests use. */
function environment(dataDir: string) {
  const { DATABASE_URL: _, npm_lifecycle_event: __, ...env } = process.env;
  return { ...env, GAPMARK_DATA: dataDir };
}

/** Database, store and mail of a folder; gives how they are reached. */
async function services(dataDir: string) {
  const child = spawn(process.execPath, ['scripts/services.mjs', '--data', dataDir], {
    cwd: root,
    env: environment(dataDir),
  });
  running.push(child);
  let text = '';
  child.stdout.on('data', (data) => {
    text += String(data);
  });
  for (let tries = 0; !text.includes('READY=1'); tries += 1) {
    if (child.exitCode !== null || tries > 2_400) throw new Error(`the services did not start: ${text}`);
    await sleep(50);
  }
  const env = Object.fromEntries(
    text.split('\n').flatMap((line) => {
      const match = /^([A-Z0-9_]+)=(.*)$/.exec(line);
      return match ? [[match[1]!, match[2]!]] : [];
    }),
  ) as Record<string, string>;
  return {
    child,
    env,
    pool: new pg.Pool({ connectionString: env.DATABASE_URL, max: 1 }),
    store: storeOf(env),
  };
}

function storeOf(env: Record<string, string>) {
  const client = new S3Client({
    endpoint: env.S3_ENDPOINT!,
    region: env.S3_REGION ?? 'us-east-1',
    forcePathStyle: true,
    credentials: { accessKeyId: env.S3_ACCESS_KEY_ID!, secretAccessKey: env.S3_SECRET_ACCESS_KEY! },
  });
  const Bucket = env.S3_BUCKET ?? 'gapmark';
  return {
    put: (Key: string, Body: Uint8Array) => client.send(new PutObjectCommand({ Bucket, Key, Body })),
    keys: async () =>
      ((await client.send(new ListObjectsV2Command({ Bucket }))).Contents ?? [])
        .map((one) => one.Key!)
        .sort(),
    get: async (Key: string) =>
      (await client.send(new GetObjectCommand({ Bucket, Key }))).Body!.transformToByteArray(),
  };
}

/** A command of ours at the terminal. */
function command(name: 'backup' | 'restore' | 'reset-password', dataDir: string, ...args: string[]) {
  return new Promise<{ code: number; output: string }>((done) => {
    const env = environment(dataDir);
    execFile(
      process.execPath,
      [`scripts/${name}.mjs`, ...args],
      { cwd: root, env },
      (error, stdout, stderr) => {
        done({ code: typeof error?.code === 'number' ? error.code : error ? 1 : 0, output: stdout + stderr });
      },
    );
  });
}

const sha256 = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex');

test('a backup of a running copy goes into an empty folder, database, objects and secret, and nowhere else', async () => {
  const from = await services(folders.from);
  const migrated = spawn(process.execPath, [join(dist, 'tools/migrate.js')], {
    cwd: root,
    env: { ...environment(folders.from), ...from.env },
  });
  expect((await once(migrated, 'exit'))[0]).toBe(0);
  await from.pool.query(
    "insert into workshop (id, name) values ('wwwwwwwwwwwwwwwwwwww', 'Grüße; drop table')",
  );
  await from.pool.query(
    "insert into person (id, email, name, password_hash) values ('pppppppppppppppppppp', 'ada@people.example', 'Ada', 'none')",
  );
  const file = join(work, 'one.backup');
  // The bucket is made by whoever needs it first: here the backup itself, which then has no objects.
  const first = await command('backup', folders.from, file);
  expect(first.code, first.output).toBe(0);
  rmSync(file);
  const objects: [string, Uint8Array][] = [
    ['captures/a/original', randomBytes(100_000)],
    ['captures/a/1000/0.f32', randomBytes(7 * 1024 * 1024)],
    ['captures/a/empty', new Uint8Array(0)],
  ];
  for (const [key, body] of objects) await from.store.put(key, body);

  const made = await command('backup', folders.from, file);
  expect(made.code, made.output).toBe(0);
  expect(statSync(file).mode & 0o777).toBe(0o600);
  const again = await command('backup', folders.from, file);
  expect([again.code, again.output]).toEqual([1, expect.stringContaining('never overwrites')]);
  // A copy that runs is not restored into.
  const refused = await command('restore', folders.from, file);
  expect([refused.code, refused.output]).toEqual([1, expect.stringContaining('Stop it first')]);

  // One byte in the middle is another: nothing is touched.
  const damaged = join(work, 'damaged.backup');
  const bytes = readFileSync(file);
  bytes[Math.floor(bytes.length / 2)]! ^= 1;
  writeFileSync(damaged, bytes);
  const bad = await command('restore', folders.to, damaged);
  expect([bad.code, bad.output]).toEqual([
    1,
    expect.stringMatching(/damaged: objects\/.*Nothing was changed/s),
  ]);

  const restored = await command('restore', folders.to, file);
  expect(restored.code, restored.output).toBe(0);
  const to = await services(folders.to);
  const names = await to.pool.query('select name from workshop');
  expect(names.rows).toEqual([{ name: 'Grüße; drop table' }]);
  expect(await to.store.keys()).toEqual(await from.store.keys());
  for (const [key, body] of objects) expect(sha256(await to.store.get(key))).toBe(sha256(body));
  const seal = (folder: string) => JSON.parse(readFileSync(join(folder, 'secrets.json'), 'utf8')).seal;
  expect(seal(folders.to)).toBe(seal(folders.from));

  // A password by hand while the copy runs, and onto what is there no backup goes.
  const reset = await command('reset-password', folders.to, 'ADA@people.example');
  expect(reset.code, reset.output).toBe(0);
  const { rows } = await to.pool.query('select password_hash from person');
  expect(rows[0].password_hash).toMatch(/^\$argon2id\$/);
  const nobody = await command('reset-password', folders.to, 'eve@people.example');
  expect([nobody.code, nobody.output]).toEqual([1, expect.stringContaining('no account with this address')]);
  await to.pool.end();
  await stop(to.child);
  const full = await command('restore', folders.to, file);
  expect([full.code, full.output]).toEqual([1, expect.stringContaining('has a database already')]);
  await from.pool.end();
});
