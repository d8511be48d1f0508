import { randomBytes } from 'node:crypto';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import pg from 'pg';
import type * as TestCopy from '../scripts/lib/test-copy.mjs';
import { compare } from '../src/engine/comparison/compare.ts';
import type { Side } from '../src/engine/comparison/types.ts';
import { nearestShapes } from '../src/server/library/nearest-shapes.ts';

/**
 * The library's ratios, each against a yardstick of the same run. Limits: shape search in 100,000 at most 3 × a plain pass over
 * the same numbers; comparing two signals of a million samples at most 4 × reading them from files; word search p95 at most
 * 0.1 × a scan without the index; a page at depth 50,000 at most 2 × the first. The last two need a database: they run
 * against `DATABASE_URL`'s or a copy of their own, in a transaction that is rolled back.
 */
const SHAPES = 100_000;
const LENGTH = 128;
const SAMPLES = 1_000_000;
const ROWS = 100_000;

const say = (line: string) => process.stdout.write(`${line}\n`);

async function median(times: number, work: () => unknown): Promise<number> {
  const all: number[] = [];
  for (let i = 0; i < times; i++) {
    const began = performance.now();
    await work();
    all.push(performance.now() - began);
  }
  return all.sort((a, b) => a - b)[times >> 1]!;
}

async function shapes(): Promise<void> {
  const numbers = Float32Array.from({ length: SHAPES * LENGTH }, () => Math.random());
  const wanted = numbers.slice(777 * LENGTH, 778 * LENGTH).map((value) => value + 0.05 * Math.random());
  let kept = 0;
  const pass = () => {
    let sum = 0;
    for (let i = 0; i < numbers.length; i++) sum += numbers[i]!;
    kept += sum;
  };
  pass();
  nearestShapes(numbers, wanted, 5);
  const plain = await median(9, pass);
  const search = await median(9, () => nearestShapes(numbers, wanted, 5));
  say(
    `shape search in ${SHAPES}: ${(search / plain).toFixed(2)} × a plain pass (limit 3); ${search.toFixed(1)} ms`,
  );
  if (kept === 0.5) say('');
}

function coil(seed: number): Float32Array {
  const values = new Float32Array(SAMPLES);
  for (let i = 0; i < SAMPLES; i++) {
    const at = (i + seed) % 100_000;
    values[i] = (at < 4000 ? 1 : at < 4020 ? 280 : at < 5400 ? 33 : 12) + Math.sin(i * 12.9898 + seed) * 0.1;
  }
  return values;
}

const sideOf = (values: Float32Array, seed: number): Side => ({
  name: 'Coil',
  circuit: 'coil-primary-voltage',
  unit: 'V',
  axis: { kind: 'even', startS: 0, stepS: 1e-6, count: SAMPLES },
  values,
  wheel: null,
  measured: [
    {
      key: 'dwell',
      value: 4,
      unit: 'ms',
      evidence: [{ from: (100_000 - seed) * 1e-6, to: (104_000 - seed) * 1e-6 }],
    },
  ],
});

async function comparing(): Promise<void> {
  const folder = await mkdtemp(join(tmpdir(), 'gapmark-bench-'));
  try {
    const files = [join(folder, 'a.f32'), join(folder, 'b.f32')];
    const signals = [coil(0), coil(300)];
    for (const [k, file] of files.entries()) await writeFile(file, new Uint8Array(signals[k]!.buffer));
    const read = async () => {
      let sum = 0;
      for (const file of files) {
        const bytes = await readFile(file);
        const values = new Float32Array(bytes.buffer, bytes.byteOffset, bytes.byteLength >> 2);
        for (let i = 0; i < values.length; i++) sum += values[i]!;
      }
      return sum;
    };
    await read();
    const reading = await median(9, read);
    const sides = signals.map((values, k) => sideOf(values, k * 300));
    compare(sides[0]!, [sides[1]!]);
    const ours = await median(9, () => compare(sides[0]!, [sides[1]!]));
    say(
      `comparing two signals of ${SAMPLES}: ${(ours / reading).toFixed(2)} × reading them (limit 4); ${ours.toFixed(1)} ms`,
    );
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

async function database(): Promise<void> {
  const given = process.env.DATABASE_URL;
  const script = pathToFileURL(join(process.cwd(), 'scripts/lib/test-copy.mjs'));
  const copy =
    given === undefined ? await ((await import(script.href)) as typeof TestCopy).startTestCopy(say) : null;
  const client = new pg.Client({ connectionString: given ?? copy?.env.DATABASE_URL ?? '' });
  try {
    await client.connect();
    await client.query('begin');
    await fill(client);
    await words(client);
    await depth(client);
  } finally {
    await client.query('rollback').catch(() => {});
    await client.end();
    await copy?.stop();
  }
}

const workshopId = randomBytes(12).toString('hex');
const personId = randomBytes(12).toString('hex');

async function fill(client: pg.Client): Promise<void> {
  await client.query("insert into workshop (id, name, time_zone) values ($1, 'Bench', 'UTC')", [workshopId]);
  await client.query(
    "insert into person (id, email, name, password_hash, current_workshop_id) values ($1, $1 || '@bench.example', 'B', '', $2)",
    [personId, workshopId],
  );
  await client.query(
    `insert into known_good (id, workshop_id, created_by, state, make, model, code, condition, note, provenance, from_s, to_s, axis,
       engine_version, findings, created_at)
     select md5('k' || i), $1, $2, 'published', initcap(substr(md5('m' || i % 900), 1, 7)), initcap(substr(md5('o' || i % 7000), 1, 6)),
       upper(substr(md5('c' || i), 1, 6)), 'cranking', 'vehicle ' || i, 'bench', 0, 1, '{}', '1', '{}', now() - i * interval '1 second'
     from generate_series(1, $3::int) i`,
    [workshopId, personId, ROWS],
  );
  await client.query('analyze known_good');
}

const timed = async (client: pg.Client, text: string, values: unknown[]) => {
  const began = performance.now();
  await client.query(text, values);
  return performance.now() - began;
};
const p95 = (times: number[]) => times.sort((a, b) => a - b)[Math.floor(times.length * 0.95)]!;

async function words(client: pg.Client): Promise<void> {
  const { rows } = await client.query<{ model: string }>(
    'select model from known_good where workshop_id = $1 order by md5(id) limit 40',
    [workshopId],
  );
  const search = `select id from known_good where workshop_id = $1 and words ilike $2 order by created_at desc, id desc limit 26`;
  const run = async () => {
    const times: number[] = [];
    for (const { model } of rows) times.push(await timed(client, search, [workshopId, `%${model}%`]));
    return p95(times);
  };
  await run();
  const indexed = await run();
  await client.query('savepoint plain');
  await client.query('drop index known_good_words');
  await client.query('drop index known_good_workshop');
  const scanned = await run();
  await client.query('rollback to plain');
  say(
    `word search in ${ROWS}: p95 ${(indexed / scanned).toFixed(3)} × a scan without the index (limit 0.1); ${indexed.toFixed(1)} ms`,
  );
}

async function depth(client: pg.Client): Promise<void> {
  const first = 'select id from known_good where workshop_id = $1 order by created_at desc, id desc limit 26';
  const next =
    'select id from known_good where workshop_id = $1 and (created_at, id) < ($2, $3) order by created_at desc, id desc limit 26';
  const { rows } = await client.query<{ created_at: Date; id: string }>(
    'select created_at::text, id from known_good where workshop_id = $1 order by created_at desc, id desc offset 50000 limit 1',
    [workshopId],
  );
  const at = rows[0]!;
  const times = { first: [] as number[], deep: [] as number[] };
  for (let i = 0; i < 60; i++) {
    times.first.push(await timed(client, first, [workshopId]));
    times.deep.push(await timed(client, next, [workshopId, at.created_at, at.id]));
  }
  const middle = (all: number[]) => all.sort((a, b) => a - b)[all.length >> 1]!;
  say(`page at depth 50,000: ${(middle(times.deep) / middle(times.first)).toFixed(2)} × the first (limit 2)`);
}

await shapes();
await comparing();
await database();
