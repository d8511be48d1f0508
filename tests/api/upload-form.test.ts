import { createHash } from 'node:crypto';
import { request } from 'node:http';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  csv,
  type Desk,
  getCapture,
  makeDesk,
  postForm,
  sampleCsv,
  settled,
  uploadCsv,
} from './capture-kit.ts';
import { newId, origin, pool, send } from './security-kit.ts';

/** POST /captures over HTTP on the running product. */
let desk: Desk;
beforeAll(async () => {
  desk = await makeDesk();
});
afterAll(() => pool.end());

const rowsOf = async () => {
  const { rows } = await pool.query('select count(*)::int as n from capture where workshop_id = $1', [
    desk.workshop.id,
  ]);
  return rows[0].n as number;
};
const openUploads = async () => {
  const { rows } = await pool.query(
    'select count(*)::int as n from upload where workshop_id = $1 and capture_id is null',
    [desk.workshop.id],
  );
  return rows[0].n as number;
};
/** Nothing is left of a refused upload: no capture, no upload. */
async function expectNothingMade(before: number) {
  expect(await rowsOf()).toBe(before);
  expect(await openUploads()).toBe(0);
}

describe('POST /captures', () => {
  it('keeps the bytes as they came, names their SHA-256 and gives them back as an attachment', async () => {
    const text = sampleCsv(2_000);
    const id = await uploadCsv(desk, text, { title: 'Pick-up at cranking' });
    const capture = await settled(desk, id);
    expect(capture).toMatchObject({
      status: 'ready',
      title: 'Pick-up at cranking',
      samples: 2_000,
      bytes: text.length,
    });
    expect(capture.sha256).toBe(createHash('sha256').update(text).digest('hex'));
    const original = await send('GET', `/api/v1/captures/${id}/original`, { headers: desk.headers });
    expect(original.text).toBe(text);
    expect(original.headers['content-disposition']).toMatch(/^attachment; filename="trace.csv"/);
    expect(original.headers['content-type']).toBe('application/octet-stream');
    expect(original.headers['x-content-type-options']).toBe('nosniff');
  });

  it('takes the fields in any order', async () => {
    const parts = [['cylinders', '4'], csv(sampleCsv(500)), ['title', 'After the file']] as const;
    const answers = await Promise.all([
      postForm(desk.headers, parts),
      postForm(desk.headers, [...parts].reverse()),
    ]);
    for (const { status, json } of answers) {
      expect(status).toBe(201);
      expect((await getCapture(desk, json.id)).json).toMatchObject({ title: 'After the file', cylinders: 4 });
    }
  });

  it('reads signals as the person asks, over what the program would propose', async () => {
    const signals = JSON.stringify([
      { column: 1, name: 'Amps', circuit: 'coil-primary-current', unit: 'A', factor: 10, offset: -0.5 },
    ]);
    const capture = await settled(desk, await uploadCsv(desk, sampleCsv(500), { signals }));
    expect(capture.signals[0]).toMatchObject({
      name: 'Amps',
      circuit: 'coil-primary-current',
      circuitConfidence: 1,
      unit: 'A',
      factor: 10,
      offset: -0.5,
    });
  });

  it('refuses an empty file with 400 and keeps nothing', async () => {
    const before = await rowsOf();
    const { status, json } = await postForm(desk.headers, [csv('')]);
    expect([status, json.error.code]).toEqual([400, 'empty_file']);
    await expectNothingMade(before);
  });

  it('refuses a form without a file, a wrong field and another media type', async () => {
    const before = await rowsOf();
    const noFile = await postForm(desk.headers, [['title', 'no file']]);
    expect([noFile.status, noFile.json.error.code]).toEqual([400, 'no_file']);
    const wrong = await postForm(desk.headers, [['cylinders', 'four'], csv(sampleCsv(10))]);
    expect([wrong.status, wrong.json.error.details[0].path]).toEqual([422, 'cylinders']);
    const notAFile = await postForm(desk.headers, [['signals', '{'], csv(sampleCsv(10))]);
    expect([notAFile.status, notAFile.json.error.details[0].path]).toEqual([422, 'signals']);
    const json = await send('POST', '/api/v1/captures', { headers: desk.headers, body: { file: 'x' } });
    expect(json.status).toBe(415);
    await expectNothingMade(before);
  });

  it('answers 413 with a hint at once when Content-Length says too much', async () => {
    const before = await rowsOf();
    const answer = await new Promise<{ status: number; text: string }>((resolve, reject) => {
      const headers = {
        ...desk.headers,
        'content-type': 'multipart/form-data; boundary=x',
        'content-length': String(40 * 1024 ** 2),
      };
      // Not one byte of the body is sent: the answer must come all the same.
      const outgoing = request(
        new URL('/api/v1/captures', origin),
        { method: 'POST', headers },
        (incoming) => {
          let text = '';
          incoming.on('data', (chunk) => {
            text += chunk;
          });
          incoming.on('end', () => {
            outgoing.destroy();
            resolve({ status: incoming.statusCode ?? 0, text });
          });
        },
      );
      outgoing.on('error', reject);
      outgoing.flushHeaders();
    });
    expect(answer.status).toBe(413);
    expect(JSON.parse(answer.text).error.hint).toContain('/api/v1/uploads');
    await expectNothingMade(before);
  });

  it('answers 413 when the limit is passed without an announced length', async () => {
    const before = await rowsOf();
    const boundary = 'gapmark-test';
    const head = `--${boundary}\r\nContent-Disposition: form-data; name="file"; filename="big.csv"\r\n\r\n`;
    const answer = await new Promise<{ status: number; text: string }>((resolve, reject) => {
      const headers = { ...desk.headers, 'content-type': `multipart/form-data; boundary=${boundary}` };
      const outgoing = request(
        new URL('/api/v1/captures', origin),
        { method: 'POST', headers },
        (incoming) => {
          let text = '';
          incoming.on('data', (chunk) => {
            text += chunk;
          });
          incoming.on('end', () => resolve({ status: incoming.statusCode ?? 0, text }));
        },
      );
      let answered = false;
      outgoing.on('response', () => {
        answered = true;
      });
      outgoing.on('error', (error) => answered || reject(error));
      outgoing.write(head);
      const chunk = Buffer.alloc(1024 * 1024, '1,2\n');
      const more = () => {
        if (answered || outgoing.destroyed) return;
        outgoing.write(chunk, () => setImmediate(more));
      };
      more();
    });
    expect(answer.status).toBe(413);
    await expectNothingMade(before);
  });

  it('leaves nothing half made when the connection drops in the middle', async () => {
    const before = await rowsOf();
    const boundary = 'gapmark-test';
    await new Promise<void>((resolve) => {
      const headers = { ...desk.headers, 'content-type': `multipart/form-data; boundary=${boundary}` };
      const outgoing = request(new URL('/api/v1/captures', origin), { method: 'POST', headers });
      outgoing.on('error', () => resolve());
      outgoing.write(
        `--${boundary}\r\nContent-Disposition: form-data; name="file"; filename="a.csv"\r\n\r\n`,
      );
      outgoing.write(Buffer.alloc(6 * 1024 * 1024, '1,2\n'), () => setTimeout(() => outgoing.destroy(), 100));
    });
    await expect.poll(openUploads, { timeout: 10_000 }).toBe(0);
    await expectNothingMade(before);
  });

  it('makes one capture of a repeated Idempotency-Key, and refuses other content under it', async () => {
    const before = await rowsOf();
    const headers = { ...desk.headers, 'idempotency-key': newId() };
    const form = [csv(sampleCsv(100)), ['title', 'Once']] as const;
    const first = await postForm(headers, form);
    const again = await postForm(headers, [...form].reverse());
    expect([first.status, again.status]).toEqual([201, 201]);
    expect(again.json).toEqual(first.json);
    const other = await postForm(headers, [csv(sampleCsv(101)), ['title', 'Once']]);
    expect([other.status, other.json.error.code]).toEqual([409, 'key_reused']);
    await expectNothingMade(before + 1);
    // The object of the repeat is gone, the first one's stays.
    const original = await send('GET', `/api/v1/captures/${first.json.id}/original`, {
      headers: desk.headers,
    });
    expect(original.text).toBe(sampleCsv(100));
  });

  it('takes a file name and a title that are HTML as plain text', async () => {
    const name = '<img src=x onerror=alert(1)>.csv';
    const { json } = await postForm(desk.headers, [['file', new Blob([sampleCsv(50)]), name]]);
    const capture = (await getCapture(desk, json.id)).json;
    expect(capture.title).toBe('<img src=x onerror=alert(1)>');
    const original = await send('GET', `/api/v1/captures/${json.id}/original`, { headers: desk.headers });
    expect(original.headers['content-disposition']).toContain("filename*=UTF-8''%3Cimg%20src%3Dx");
  });
});

describe('files that cannot be read', () => {
  it.each([
    [
      'a picture renamed .csv',
      Buffer.from('89504e470d0a1a0a0000000d49484452', 'hex').toString('latin1'),
      /not.*text|picture|binary/i,
    ],
    ['a header and no rows', 'Time (s),Crank (V)\n', /number|row/i],
    ['one column', 'Crank (V)\n1\n2\n3\n4\n', /./],
  ])('%s ends as failed with a sentence, and the file is kept', async (_name, text, words) => {
    const { json } = await postForm(desk.headers, [
      ['file', new Blob([Buffer.from(text, 'latin1')]), 'x.csv'],
    ]);
    const capture = await settled(desk, json.id);
    expect(capture.status).toBe('failed');
    expect(capture.error.message).toMatch(words);
    expect(capture.error.hint.length).toBeGreaterThan(10);
    const original = await send('GET', `/api/v1/captures/${json.id}/original`, { headers: desk.headers });
    expect(original.status).toBe(200);
  });
});
