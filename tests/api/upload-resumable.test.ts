import { createHash } from 'node:crypto';
import { request } from 'node:http';
import { Upload } from 'tus-js-client';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Desk, getCapture, makeDesk, sampleCsv, settled } from './capture-kit.ts';
import { type Answer, bearer, makeToken, origin, pool, send } from './security-kit.ts';

/** tus 1.0 at /api/v1/uploads, spoken by hand and by the client that the pages use. */
let desk: Desk;
beforeAll(async () => {
  desk = await makeDesk();
});
afterAll(() => pool.end());

const TUS = { 'tus-resumable': '1.0.0' };
const meta = (fields: Record<string, string>) =>
  Object.entries(fields)
    .map(([key, value]) => `${key} ${Buffer.from(value).toString('base64')}`)
    .join(',');

const create = (
  length: number,
  fields: Record<string, string> = { filename: 'trace.csv' },
  headers = desk.headers,
) =>
  send('POST', '/api/v1/uploads', {
    headers: { ...headers, ...TUS, 'upload-length': String(length), 'upload-metadata': meta(fields) },
  });
const patch = (path: string, offset: number, body: string, headers = desk.headers): Promise<Answer> =>
  send('PATCH', path, {
    headers: {
      ...headers,
      ...TUS,
      'upload-offset': String(offset),
      'content-type': 'application/offset+octet-stream',
    },
    body,
  });
const head = async (path: string, headers = desk.headers) => {
  const answer = await fetch(new URL(path, origin), { method: 'HEAD', headers: { ...headers, ...TUS } });
  return { status: answer.status, headers: Object.fromEntries(answer.headers) as Record<string, string> };
};

const capturesOf = async (name: string) => {
  const { rows } = await pool.query('select id from capture where workshop_id = $1 and file_name = $2', [
    desk.workshop.id,
    name,
  ]);
  return rows.map((row) => row.id as string);
};

describe('creating', () => {
  it('gives a relative location on our own origin and allows no other origin', async () => {
    const answer = await create(10, { filename: 'a.csv' });
    expect(answer.status).toBe(201);
    expect(answer.headers.location).toMatch(/^\/api\/v1\/uploads\/[a-z2-7]{20}$/);
    expect(answer.headers['access-control-allow-origin']).toBeUndefined();
  });

  it('checks length and metadata before anything is made', async () => {
    const count = async () =>
      (await pool.query('select count(*)::int as n from upload where workshop_id = $1', [desk.workshop.id]))
        .rows[0].n;
    const before = await count();
    expect((await create(0)).json.error.code).toBe('empty_file');
    expect((await create(3 * 1024 ** 3)).status).toBe(413);
    expect((await create(10, { cylinders: 'many' })).json.error.details[0].path).toBe('cylinders');
    expect((await create(10, { title: 'x'.repeat(9_000) })).status).toBe(422);
    const deferred = await send('POST', '/api/v1/uploads', {
      headers: { ...desk.headers, ...TUS, 'upload-defer-length': '1' },
    });
    expect(deferred.status).toBe(422);
    expect(await count()).toBe(before);
  });

  it('takes only callers who may upload', async () => {
    const reader = await makeToken(desk.workshop.technician, desk.workshop.id, ['read']);
    expect((await create(10, {}, bearer(reader))).status).toBe(403);
    expect((await create(10, {}, {})).status).toBe(401);
  });
});

describe('an upload', () => {
  it('belongs to its maker: for everybody else HEAD, PATCH and DELETE are 404, and nobody can GET it', async () => {
    const path = (await create(4)).headers.location!;
    const other = bearer(await makeToken(desk.workshop.owner, desk.workshop.id, ['read', 'write']));
    expect((await head(path, other)).status).toBe(404);
    expect((await patch(path, 0, 'a,b\n', other)).status).toBe(404);
    expect((await send('DELETE', path, { headers: { ...other, ...TUS } })).status).toBe(404);
    expect((await send('GET', path, { headers: desk.headers })).status).toBe(405);
    expect((await head(path)).headers['upload-offset']).toBe('0');
  });

  it('becomes one capture, and its last answer can be asked for again and again', async () => {
    const text = sampleCsv(300);
    const path = (await create(text.length, { filename: 'once.csv', title: 'Once', cylinders: '4' })).headers
      .location!;
    const half = Math.floor(text.length / 2);
    const first = await patch(path, 0, text.slice(0, half));
    expect([first.status, first.headers['upload-offset']]).toEqual([204, String(half)]);
    expect((await head(path)).headers['gapmark-capture']).toBeUndefined();
    const last = await patch(path, half, text.slice(half));
    const id = last.headers['gapmark-capture'] as string;
    expect(last.status).toBe(204);
    const repeated = await patch(path, half, text.slice(half));
    expect([repeated.status, repeated.headers['upload-offset'], repeated.headers['gapmark-capture']]).toEqual(
      [204, String(text.length), id],
    );
    const asked = await head(path);
    expect([asked.headers['upload-offset'], asked.headers['gapmark-capture']]).toEqual([
      String(text.length),
      id,
    ]);
    expect(await capturesOf('once.csv')).toEqual([id]);
    const capture = await settled(desk, id);
    expect(capture).toMatchObject({
      status: 'ready',
      title: 'Once',
      cylinders: 4,
      samples: 300,
      bytes: text.length,
    });
    expect(capture.sha256).toBe(createHash('sha256').update(text).digest('hex'));
    const original = await send('GET', `/api/v1/captures/${id}/original`, { headers: desk.headers });
    expect(original.text).toBe(text);
  });

  it('becomes one capture when the last bytes come twice at the same time', async () => {
    const text = sampleCsv(200);
    const path = (await create(text.length, { filename: 'race.csv' })).headers.location!;
    const answers = await Promise.all(Array.from({ length: 4 }, () => patch(path, 0, text)));
    const named = answers.map(({ headers }) => headers['gapmark-capture']).filter(Boolean);
    expect(named.length).toBeGreaterThan(0);
    const id = (await head(path)).headers['gapmark-capture'] as string;
    expect(new Set(named)).toEqual(new Set([id]));
    expect(await capturesOf('race.csv')).toEqual([id]);
    expect((await settled(desk, id)).samples).toBe(200);
  });

  it('keeps what came before a connection broke', async () => {
    const text = sampleCsv(60_000);
    const path = (await create(text.length, { filename: 'broken.csv' })).headers.location!;
    await new Promise<void>((resolve) => {
      const headers = {
        ...desk.headers,
        ...TUS,
        'upload-offset': '0',
        'content-type': 'application/offset+octet-stream',
        'content-length': String(text.length),
      };
      const outgoing = request(new URL(path, origin), { method: 'PATCH', headers });
      outgoing.on('error', () => resolve());
      outgoing.write(text.slice(0, 700_000), () => setTimeout(() => outgoing.destroy(), 300));
    });
    const offset = Number((await head(path)).headers['upload-offset']);
    expect(offset).toBeGreaterThan(0);
    expect(offset).toBeLessThan(text.length);
    const last = await patch(path, offset, text.slice(offset));
    const capture = await settled(desk, last.headers['gapmark-capture'] as string);
    expect(capture.samples).toBe(60_000);
    expect(capture.sha256).toBe(createHash('sha256').update(text).digest('hex'));
  });

  it('can be given up before it is finished, and not after', async () => {
    const path = (await create(8)).headers.location!;
    await patch(path, 0, 'a,b\n');
    expect((await send('DELETE', path, { headers: { ...desk.headers, ...TUS } })).status).toBe(204);
    expect((await head(path)).status).toBe(404);
    const text = sampleCsv(20);
    const done = (await create(text.length)).headers.location!;
    const id = (await patch(done, 0, text)).headers['gapmark-capture'] as string;
    expect((await send('DELETE', done, { headers: { ...desk.headers, ...TUS } })).status).toBe(409);
    const original = await send('GET', `/api/v1/captures/${id}/original`, { headers: desk.headers });
    expect(original.text).toBe(text);
  });

  it('refuses bytes beyond the announced length and a wrong offset', async () => {
    const path = (await create(8)).headers.location!;
    expect((await patch(path, 0, 'x'.repeat(20))).status).toBe(413);
    expect((await patch(path, 4, 'abcd')).status).toBe(409);
    expect((await head(path)).headers['upload-offset']).toBe('0');
  });
});

describe('the client of the pages', () => {
  it('sends a file in chunks and learns the capture', async () => {
    const text = sampleCsv(100_000);
    const id = await new Promise<string>((resolve, reject) => {
      let captureId: string | undefined;
      new Upload(Buffer.from(text), {
        endpoint: new URL('/api/v1/uploads', origin).href,
        headers: { ...desk.headers },
        chunkSize: 512 * 1024,
        metadata: { filename: 'chunks.csv', title: 'Größe' },
        onAfterResponse: (_request, response) => {
          captureId ??= response.getHeader('Gapmark-Capture') ?? undefined;
        },
        onError: reject,
        onSuccess: () =>
          captureId === undefined ? reject(new Error('no capture named')) : resolve(captureId),
      }).start();
    });
    expect(await settled(desk, id)).toMatchObject({ title: 'Größe', samples: 100_000 });
    expect((await getCapture(desk, id)).json.sha256).toBe(createHash('sha256').update(text).digest('hex'));
  });
});
