import { createHash } from 'node:crypto';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join as joinPath } from 'node:path';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { ZipFile } from 'yazl';
import { openZip } from '../../src/server/backup/zip-reader.ts';
import { openArchive } from '../../src/server/workshop/archive/read-archive.ts';
import { EXPORTED, LEFT_OUT } from '../../src/server/workshop/archive/tables.ts';
import { ownedTables } from '../../src/server/workshop/owned-tables.ts';
import { sampleCsv } from './capture-kit.ts';
import {
  makeThings,
  makeToken,
  makeWorkshop,
  newId,
  origin,
  type Person,
  pool,
  storeSamples,
  type Workshop,
} from './security-kit.ts';

vi.setConfig({ testTimeout: 180_000 });
const work = mkdtempSync(joinPath(tmpdir(), 'gapmark-archive-'));
afterAll(async () => {
  rmSync(work, { recursive: true, force: true });
  await pool.end();
});

let shop: Workshop;
let zip: Buffer;
let captureId: string;
const csv = sampleCsv(2_000);

const headersOf = (person: Person) => ({ ...person.browser });

async function upload(person: Person): Promise<string> {
  const form = new FormData();
  form.append('file', new Blob([csv]), 'private-name.csv');
  form.append('title', 'Cranks, does not start');
  const answer = await fetch(`${origin}/api/v1/captures`, {
    method: 'POST',
    headers: headersOf(person),
    body: form,
  });
  expect(answer.status).toBe(201);
  return ((await answer.json()) as { id: string }).id;
}

async function get(person: Person, path: string) {
  const answer = await fetch(`${origin}/api/v1${path}`, { headers: headersOf(person) });
  return { status: answer.status, json: await answer.json() };
}

async function ready(person: Person, id: string) {
  for (let tries = 0; tries < 600; tries += 1) {
    const { json } = await get(person, `/captures/${id}`);
    if (['ready', 'failed'].includes(json.status)) return json;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error('it was not measured');
}

async function exported(person: Person): Promise<Buffer> {
  const answer = await fetch(`${origin}/api/v1/workshop/export`, { headers: headersOf(person) });
  expect(answer.status).toBe(200);
  expect(answer.headers.get('content-type')).toBe('application/zip');
  return Buffer.from(await answer.arrayBuffer());
}

async function imported(person: Person, bytes: Buffer) {
  const form = new FormData();
  form.append('file', new Blob([new Uint8Array(bytes)]), 'workshop.zip');
  const answer = await fetch(`${origin}/api/v1/workshops/import`, {
    method: 'POST',
    headers: headersOf(person),
    body: form,
  });
  return { status: answer.status, json: await answer.json() };
}

/** The parts of a zip, unpacked. */
async function partsOf(bytes: Buffer): Promise<Map<string, Buffer>> {
  const path = joinPath(work, `${newId()}.zip`);
  writeFileSync(path, bytes);
  const reader = await openZip(path, 10_000);
  const parts = new Map<string, Buffer>();
  for (const name of reader.entries.keys()) {
    const chunks: Buffer[] = [];
    for await (const chunk of await reader.read(name)) chunks.push(chunk as Buffer);
    parts.set(name, Buffer.concat(chunks));
  }
  reader.close();
  return parts;
}

/** A zip of such parts. */
async function zipOf(parts: ReadonlyMap<string, Buffer>, rename: (name: string) => string = (name) => name) {
  const file = new ZipFile();
  for (const [name, bytes] of parts) file.addBuffer(bytes, name);
  file.end();
  const chunks: Buffer[] = [];
  for await (const chunk of file.outputStream) chunks.push(chunk as Buffer);
  const bytes = Buffer.concat(chunks);
  // Names that the package does not write are put in afterwards, in their own length, in both places.
  for (const name of parts.keys())
    for (let at = bytes.indexOf(name); at >= 0 && rename(name) !== name; at = bytes.indexOf(name, at + 1))
      bytes.write(rename(name), at);
  return bytes;
}

beforeAll(async () => {
  shop = await makeWorkshop('Bench “3”');
  captureId = await upload(shop.technician);
  const made = await ready(shop.technician, captureId);
  expect(made.status).toBe('ready');
  const headers = { ...headersOf(shop.technician), 'content-type': 'application/json' };
  const mark = {
    kind: 'point',
    signal: 0,
    from: made.startS,
    to: null,
    value: null,
    text: 'look <b>here</b>',
  };
  await fetch(`${origin}/api/v1/captures/${captureId}/marks`, {
    method: 'POST',
    headers,
    body: JSON.stringify(mark),
  });
  await makeToken(shop.owner, shop.id, ['read']);
  zip = await exported(shop.owner);
}, 180_000);

describe('the archive of a workshop', () => {
  it('is read back as a new workshop with new ids, measured again to the same values', async () => {
    const other = await makeWorkshop('Elsewhere');
    const answer = await imported(other.technician, zip);
    expect(answer.status, JSON.stringify(answer.json)).toBe(201);
    expect(answer.json).toMatchObject({ name: 'Bench “3”', captures: 1 });
    expect(answer.json.id).not.toBe(shop.id);
    const { rows } = await pool.query('select id, original_key from capture where workshop_id = $1', [
      answer.json.id,
    ]);
    const [{ id }] = rows;
    expect(id).not.toBe(captureId);
    expect((await ready(other.technician, id)).status).toBe('ready');
    const [before, after] = [
      await get(shop.technician, `/captures/${captureId}/measurements`),
      await get(other.technician, `/captures/${id}/measurements`),
    ];
    expect(after.json.signals).toEqual(before.json.signals);
    expect(after.json.relations).toEqual(before.json.relations);
    const marks = await get(other.technician, `/captures/${id}/marks`);
    expect(marks.json.items).toMatchObject([{ text: 'look <b>here</b>', author: shop.technician.name }]);
    const original = await fetch(`${origin}/api/v1/captures/${id}/original`, {
      headers: headersOf(other.technician),
    });
    expect(await original.text()).toBe(csv);
    const { json } = await get(other.technician, '/me');
    expect(json.workshops).toContainEqual({ id: answer.json.id, name: 'Bench “3”', role: 'owner' });
    // Nobody signs in as the names that came along, and the first workshop is as it was.
    const people = await pool.query("select password_hash from person where email like '%@imported.invalid'");
    expect(new Set(people.rows.map((row) => row.password_hash))).toEqual(new Set(['none']));
    expect((await get(shop.technician, `/captures/${captureId}`)).status).toBe(200);
  });

  it('holds known-goods, links’ answers and comparisons too, and goes through twice', async () => {
    const rich = await makeWorkshop('Rich');
    const things = await makeThings(rich.id, rich.technician);
    await storeSamples(things.capture);
    await pool.query('update capture set sha256 = $2 where id = $1', [
      things.capture,
      createHash('sha256').update('time,A,B\n0,0,0\n').digest('hex'),
    ]);
    const once = await imported(rich.owner, await exported(rich.owner));
    expect(once.status, JSON.stringify(once.json)).toBe(201);
    const count = async (id: string) => {
      const { rows } = await pool.query(
        `select (select count(*) from known_good where workshop_id = $1)::int as goods,
           (select count(*) from comparison where workshop_id = $1)::int as comparisons,
           (select count(*) from answer a join capture c on c.id = a.capture_id where c.workshop_id = $1)::int as answers,
           (select count(*) from share_link l join capture c on c.id = l.capture_id
             where c.workshop_id = $1 and l.withdrawn_at is null)::int as open_links`,
        [id],
      );
      return rows[0];
    };
    expect(await count(once.json.id)).toEqual({ ...(await count(rich.id)), open_links: 0 });
  });

  it('holds no hashes, sessions, tokens, link secrets or e-mail addresses', async () => {
    const secrets = await pool.query(
      `select secret_hash as text from share_link union select hash from token union select id from session
       union select email from person where id = any($1) union select password_hash from person where length(password_hash) > 20`,
      [[shop.owner.id, shop.technician.id]],
    );
    const parts = await partsOf(zip);
    const text = [...parts]
      .filter(([name]) => !name.startsWith('objects/'))
      .map(([, part]) => part.toString('utf8'))
      .join();
    expect(secrets.rows.length).toBeGreaterThan(3);
    for (const { text: secret } of secrets.rows) expect(text.includes(secret)).toBe(false);
    expect([...parts.keys()].sort()).toEqual(
      [...parts.keys()]
        .filter((name) => /^(manifest\.json|rows\/[a-z_]+\.json|objects\/\d{8})$/.test(name))
        .sort(),
    );
  });

  it('knows of every table of a workshop whether it goes in', async () => {
    const tables = (await ownedTables(pool)).map(({ name }) => name);
    expect(tables.length).toBeGreaterThan(10);
    for (const name of tables) expect(name in EXPORTED || name in LEFT_OUT, name).toBe(true);
  });

  it('is for owners in their own browser: no token exports', async () => {
    const token = await makeToken(shop.owner, shop.id, ['read', 'write', 'manage']);
    const path = `${origin}/api/v1/workshop/export`;
    expect((await fetch(path, { headers: { authorization: `Bearer ${token}` } })).status).toBe(403);
    expect((await fetch(path, { headers: headersOf(shop.instructor) })).status).toBe(403);
  });
});

describe('an archive that is not as it should be', () => {
  const workshops = async () => (await pool.query('select count(*)::int as n from workshop')).rows[0].n;

  async function refuses(bytes: Buffer, words: RegExp) {
    const before = await workshops();
    const answer = await imported(shop.owner, bytes);
    expect([answer.status, answer.json.error.message]).toEqual([400, expect.stringMatching(words)]);
    expect(await workshops()).toBe(before);
  }

  it('is refused when it is no zip, empty, or cut short', async () => {
    await refuses(Buffer.from('no zip at all'), /no archive/);
    await refuses(zip.subarray(0, zip.length - 40), /no archive/);
    await refuses(await zipOf(new Map([['a', Buffer.from('b')]])), /manifest\.json is missing/);
  });

  it('is refused when a part was changed, is missing or was added', async () => {
    const parts = await partsOf(zip);
    const marks = parts.get('rows/mark.json') ?? Buffer.alloc(0);
    const changed = Buffer.from(marks.toString('utf8').replace('look', 'LOOK'));
    await refuses(await zipOf(new Map([...parts, ['rows/mark.json', changed]])), /mark was changed/);
    await refuses(
      await zipOf(new Map([...parts, ['objects/00000000', Buffer.from('other')]])),
      /was changed/,
    );
    await refuses(
      await zipOf(new Map([...parts].filter(([name]) => name !== 'rows/mark.json'))),
      /is missing/,
    );
    await refuses(
      await zipOf(new Map([...parts, ['rows/token.json', Buffer.from('[]')]])),
      /does not belong/,
    );
  });

  it('is refused when a path leads outside', async () => {
    const parts = await partsOf(zip);
    const outside = new Map([...parts, ['xx/xx/escaped', Buffer.from('x')]]);
    await refuses(await zipOf(outside, (name) => name.replace('xx/xx/', '../../')), /no archive/);
    const absolute = new Map([...parts, ['x/etc/escaped', Buffer.from('x')]]);
    await refuses(
      await zipOf(absolute, (name) => (name.startsWith('x/') ? `/${name.slice(2)}/` : name)),
      /no archive/,
    );
  });

  it('is refused when it unpacks to far more than it is: a zip bomb is not unpacked', async () => {
    const bomb = await zipOf(new Map([['manifest.json', Buffer.alloc(30 * 1024 * 1024)]]));
    expect(bomb.length).toBeLessThan(100_000);
    await refuses(bomb, /200 times/);
  });

  it('is refused when rows do not fit together, with nothing left in table or store', async () => {
    const parts = await partsOf(zip);
    const rows = Buffer.from((parts.get('rows/mark.json') ?? '').toString().replaceAll(captureId, newId()));
    const manifest = JSON.parse((parts.get('manifest.json') ?? '').toString());
    for (const table of manifest.tables)
      if (table.table === 'mark') table.sha256 = createHash('sha256').update(rows).digest('hex');
    const bytes = await zipOf(
      new Map([...parts, ['rows/mark.json', rows], ['manifest.json', Buffer.from(JSON.stringify(manifest))]]),
    );
    await refuses(bytes, /do not fit together/);
  });
});

describe('openArchive()', () => {
  const limits = { parts: 200, bytes: 1024 ** 3, rowsBytes: 1024 ** 2, ratio: 200 };
  const file = () => {
    const path = joinPath(work, `${newId()}.zip`);
    writeFileSync(path, zip);
    return path;
  };

  it('holds to its limits of count, size and length', async () => {
    const good = await openArchive(file(), limits);
    good.zip.close();
    await expect(openArchive(file(), { ...limits, parts: 3 })).rejects.toThrow(/more than 3 parts/);
    await expect(openArchive(file(), { ...limits, bytes: 1_000 })).rejects.toThrow(
      /larger than what is taken/,
    );
    await expect(openArchive(file(), { ...limits, rowsBytes: 10 })).rejects.toThrow(/too long/);
  });
});
