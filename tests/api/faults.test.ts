import { createHash, randomBytes } from 'node:crypto';
import { readFileSync, writeFileSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { sampleCsv } from './capture-kit.ts';
import { openStage, type Process, type Stage, until } from './faults-kit.ts';

vi.setConfig({ testTimeout: 240_000 });

/** What happens when things are taken away: workers, web processes, the store, the database. On services of its own. */
let stage: Stage;
let web: Process;
let headers: Record<string, string>;
const TUS = { 'tus-resumable': '1.0.0' };
const id20 = () => randomBytes(16).toString('hex').slice(0, 20);

beforeAll(async () => {
  stage = await openStage();
  web = await stage.web();
  const [workshop, person] = [id20(), id20()];
  const secret = `gapmark_${randomBytes(32).toString('base64url')}`;
  await stage.pool.query("insert into workshop (id, name) values ($1, 'Faults')", [workshop]);
  await stage.pool.query(
    "insert into person (id, email, name, password_hash) values ($1, $1 || '@people.example', 'Tester', '-')",
    [person],
  );
  await stage.pool.query(
    "insert into membership (person_id, workshop_id, role) values ($1, $2, 'technician')",
    [person, workshop],
  );
  await stage.pool.query(
    `insert into token (id, person_id, workshop_id, name, hash, scopes, expires_at)
     values ($1, $2, $3, 'test', $4, '{read,write}', now() + interval '1 day')`,
    [id20(), person, workshop, createHash('sha256').update(secret).digest('hex')],
  );
  headers = { authorization: `Bearer ${secret}` };
}, 240_000);
afterAll(() => stage?.close(), 60_000);

const get = async (path: string, at = web) => (await fetch(at.origin + path, { headers })).json();
const capture = (id: string) => get(`/api/v1/captures/${id}`);
const statusIs = (id: string, ...statuses: string[]) =>
  until(async () => statuses.includes((await capture(id)).status), 180);

async function postForm(text: string, at = web) {
  const form = new FormData();
  form.append('file', new Blob([text]), 'trace.csv');
  const answer = await fetch(`${at.origin}/api/v1/captures`, { method: 'POST', headers, body: form });
  return { status: answer.status, retryAfter: answer.headers.get('retry-after'), json: await answer.json() };
}

async function createUpload(length: number, at = web): Promise<string> {
  const answer = await fetch(`${at.origin}/api/v1/uploads`, {
    method: 'POST',
    headers: { ...headers, ...TUS, 'upload-length': String(length) },
  });
  return answer.headers.get('location')!;
}

async function patchUpload(path: string, offset: number, body: string | Buffer, at = web) {
  return fetch(at.origin + path, {
    method: 'PATCH',
    headers: {
      ...headers,
      ...TUS,
      'upload-offset': String(offset),
      'content-type': 'application/offset+octet-stream',
    },
    body: body as BodyInit,
  });
}

/** Sends a text in parts through the processes in turn; gives the capture's id. */
async function uploadInTurn(text: string, processes: readonly Process[], part: number): Promise<string> {
  const bytes = Buffer.from(text);
  const path = await createUpload(bytes.length, processes[0]);
  let answer: Response | undefined;
  for (let at = 0, turn = 0; at < bytes.length; at += part, turn += 1) {
    answer = await patchUpload(path, at, bytes.subarray(at, at + part), processes[turn % processes.length]);
    expect(answer.status).toBe(204);
  }
  return answer!.headers.get('gapmark-capture')!;
}

const big = sampleCsv(2_900_000);
/** Long enough to be stopped in the middle of. */
const middling = big.slice(0, 15_000_000);
const bigSha256 = createHash('sha256').update(big).digest('hex');

describe('a worker', () => {
  it('that is killed while it reads 50 MB is taken up again by another, and nothing is doubled', async () => {
    expect(big.length).toBeGreaterThan(50e6);
    const first = await stage.worker();
    const id = await uploadInTurn(big, [web], 16 * 1024 * 1024);
    await until(async () => {
      const { status, progress } = await capture(id);
      return status === 'reading' && progress > 0.05;
    }, 120);
    await first.end('SIGKILL');
    const second = await stage.worker();
    await statusIs(id, 'ready', 'failed');
    expect(await capture(id)).toMatchObject({
      status: 'ready',
      samples: 2_900_000,
      sha256: bigSha256,
      samplesVersion: 1002,
    });
    expect(second.log()).toContain('took back');
    const { rows } = await stage.pool.query(
      'select count(*)::int as n from measurement where capture_id = $1',
      [id],
    );
    expect(rows[0].n).toBe(1);
    await second.end('SIGTERM');
  });

  it('that is told to stop gives back what it cannot finish and ends within ten seconds', async () => {
    const first = await stage.worker();
    const id = await uploadInTurn(middling, [web], 16 * 1024 * 1024);
    await statusIs(id, 'reading');
    expect(await first.end('SIGTERM')).toBeLessThan(11);
    expect(first.child.exitCode).toBe(0);
    const second = await stage.worker();
    await statusIs(id, 'ready', 'failed');
    expect((await capture(id)).status).toBe('ready');
    await second.end('SIGTERM');
  });

  it('stops at once when the capture is cancelled; reading can be asked for again', async () => {
    const worker = await stage.worker();
    const id = await uploadInTurn(middling, [web], 16 * 1024 * 1024);
    await statusIs(id, 'reading');
    const cancel = await fetch(`${web.origin}/api/v1/captures/${id}/cancel`, { method: 'POST', headers });
    expect((await cancel.json()).status).toBe('cancelled');
    await until(() => worker.log().includes('capture was stopped or changed'), 60, worker.log);
    expect((await capture(id)).status).toBe('cancelled');
    const again = await fetch(`${web.origin}/api/v1/captures/${id}`, {
      method: 'PATCH',
      headers: { ...headers, 'content-type': 'application/json' },
      body: JSON.stringify({ reading: {} }),
    });
    expect(await again.json()).toMatchObject({ status: 'queued', revision: 2 });
    await statusIs(id, 'ready', 'failed');
    expect((await capture(id)).samplesVersion).toBe(2001);
    await worker.end('SIGTERM');
  });

  it('waits for a store that is away, and reads when it is back', async () => {
    const id = (await postForm(sampleCsv(1_000))).json.id;
    await stage.store.shut();
    const worker = await start503Worker();
    await stage.store.open();
    await statusIs(id, 'ready', 'failed');
    expect((await capture(id)).status).toBe('ready');
    await worker.end('SIGTERM');
  });

  async function start503Worker(): Promise<Process> {
    // It cannot become ready while the store is away: it says what it waits for.
    const starting = stage.worker();
    await new Promise((done) => setTimeout(done, 3_000));
    await stage.store.open();
    return starting.finally(() => stage.store.shut().catch(() => {}));
  }
});

describe('two web processes and two workers', () => {
  it('act like one: parts through either, every capture read once', async () => {
    const other = await stage.web();
    const workers = await Promise.all([stage.worker(), stage.worker()]);
    const text = sampleCsv(40_000);
    const ids = await Promise.all([
      ...Array.from({ length: 3 }, () => uploadInTurn(text, [web, other], 100_000)),
      ...[web, other, web, other].map(async (at) => (await postForm(sampleCsv(2_000), at)).json.id as string),
    ]);
    expect(new Set(ids).size).toBe(7);
    for (const id of ids) await statusIs(id, 'ready', 'failed');
    for (const id of ids)
      expect(await get(`/api/v1/captures/${id}`, other)).toMatchObject({
        status: 'ready',
        samplesVersion: 1001,
      });
    const { rows } = await stage.pool.query(
      `select state::text, count(*)::int as n from pgboss.job where name = 'read-capture' and data->>'captureId' = any($1) group by 1`,
      [ids],
    );
    expect(rows).toEqual([{ state: 'completed', n: 7 }]);
    await Promise.all([...workers, other].map((one) => one.end('SIGTERM')));
  });

  it('make one capture of an upload whose last bytes both get', async () => {
    const other = await stage.web();
    const text = sampleCsv(500);
    const path = await createUpload(text.length);
    const answers = await Promise.all([web, other, web, other].map((at) => patchUpload(path, 0, text, at)));
    const named = new Set(answers.map((answer) => answer.headers.get('gapmark-capture')).filter(Boolean));
    expect(named.size).toBe(1);
    const { rows } = await stage.pool.query(
      'select count(*)::int as n from capture where original_key = $1',
      [path.split('/').at(-1)],
    );
    expect(rows[0].n).toBe(1);
    await other.end('SIGTERM');
  });

  it('keep an upload whose web process is killed in the middle of it', async () => {
    const other = await stage.web();
    const bytes = Buffer.from(big.slice(0, 20_000_000));
    const path = await createUpload(bytes.length, other);
    expect((await patchUpload(path, 0, bytes.subarray(0, 9_000_000), other)).status).toBe(204);
    const cut = patchUpload(path, 9_000_000, bytes.subarray(9_000_000), other).catch(() => null);
    await new Promise((done) => setTimeout(done, 150));
    await other.end('SIGKILL');
    await cut;
    const head = await fetch(web.origin + path, { method: 'HEAD', headers: { ...headers, ...TUS } });
    const offset = Number(head.headers.get('upload-offset'));
    if (offset < bytes.length) {
      const last = await patchUpload(path, offset, bytes.subarray(offset));
      expect(last.headers.get('gapmark-capture')).toMatch(/^[a-z2-7]{20}$/);
    }
    const done = await fetch(web.origin + path, { method: 'HEAD', headers: { ...headers, ...TUS } });
    const id = done.headers.get('gapmark-capture')!;
    const original = await fetch(`${web.origin}/api/v1/captures/${id}/original`, { headers });
    expect(Buffer.from(await original.arrayBuffer()).equals(bytes)).toBe(true);
  });
});

describe('a service that is away', () => {
  const uploads = async () =>
    (await stage.pool.query('select count(*)::int as n from capture')).rows[0].n as number;

  it('store: uploads answer 503 with Retry-After, keep nothing, and work again when it is back', async () => {
    const before = await uploads();
    await stage.store.shut();
    const refused = await postForm(sampleCsv(100));
    expect([refused.status, refused.json.error.code]).toEqual([503, 'service_away']);
    expect(Number(refused.retryAfter)).toBeGreaterThan(0);
    const create = await fetch(`${web.origin}/api/v1/uploads`, {
      method: 'POST',
      headers: { ...headers, ...TUS, 'upload-length': '100' },
    });
    expect(create.status).toBe(503);
    expect(await uploads()).toBe(before);
    await stage.store.open();
    expect((await postForm(sampleCsv(100))).status).toBe(201);
  });

  it('database: everything answers 503, and works again when it is back', async () => {
    const before = await uploads();
    await stage.database.shut();
    const refused = await postForm(sampleCsv(100));
    expect([refused.status, refused.json.error.code]).toEqual([503, 'service_away']);
    expect(JSON.stringify(refused.json)).not.toMatch(/ECONN|5432|postgres|select/i);
    expect(await uploads()).toBe(before);
    await stage.database.open();
    await until(async () => (await postForm(sampleCsv(100))).status === 201, 60);
  });
});

describe('memory of the web process', () => {
  it('stays under 150 MB over idle while 200 MB come in', async () => {
    const { pid } = web.child;
    const peak = () => Number(/VmHWM:\s+(\d+)/.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1]) / 1024;
    const now = () => Number(/VmRSS:\s+(\d+)/.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1]) / 1024;
    const part = Buffer.alloc(25_000_000, '0.0001,1.2345,0\n');
    writeFileSync(`/proc/${pid}/clear_refs`, '5');
    const idle = now();
    const path = await createUpload(part.length * 8);
    for (let k = 0; k < 8; k += 1) expect((await patchUpload(path, k * part.length, part)).status).toBe(204);
    const over = peak() - idle;
    process.stderr.write(
      `web process: ${idle.toFixed(0)} MB idle, ${over.toFixed(0)} MB over it with 200 MB coming in\n`,
    );
    expect(over).toBeLessThan(150);
  });
});
