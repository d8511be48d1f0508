import { gzipSync } from 'node:zlib';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ZipFile } from 'yazl';
import { type Desk, makeDesk, postForm, sampleCsv, settled } from './capture-kit.ts';
import { pool, send } from './security-kit.ts';

/** Originals that come packed, over HTTP on the running product: one file in them is a capture, anything else a clear sentence. */
let desk: Desk;
beforeAll(async () => {
  desk = await makeDesk();
});
afterAll(() => pool.end());

const text = sampleCsv(500);

async function upload(bytes: Buffer, name: string) {
  const { status, json } = await postForm(desk.headers, [['file', new Blob([new Uint8Array(bytes)]), name]]);
  expect(status).toBe(201);
  return { id: json.id as string, capture: await settled(desk, json.id) };
}

async function zipOf(files: Readonly<Record<string, string>>): Promise<Buffer> {
  const zip = new ZipFile();
  for (const [name, content] of Object.entries(files)) zip.addBuffer(Buffer.from(content), name);
  zip.end();
  const parts: Buffer[] = [];
  for await (const part of zip.outputStream) parts.push(Buffer.from(part));
  return Buffer.concat(parts);
}

/** Sets bit 0 of the general purpose flags, "encrypted", in local header and directory (PKWARE APPNOTE 4.4.4). */
function markedEncrypted(zip: Buffer): Buffer {
  const marked = Buffer.from(zip);
  marked[zip.indexOf(Buffer.from('PK\u0003\u0004')) + 6]! |= 1;
  marked[zip.indexOf(Buffer.from('PK\u0001\u0002')) + 8]! |= 1;
  return marked;
}

describe('a packed original', () => {
  it('is read from .gz and from a .zip of one CSV, and stays byte for byte what it was', async () => {
    for (const [bytes, name] of [
      [gzipSync(text), 'trace.csv.gz'],
      [await zipOf({ 'trace.csv': text }), 'trace.zip'],
    ] as const) {
      const { id, capture } = await upload(bytes, name);
      expect(capture).toMatchObject({ status: 'ready', samples: 500 });
      const original = await fetch(
        new URL(`/api/v1/captures/${id}/original`, process.env.GAPMARK_TEST_ORIGIN),
        desk,
      );
      expect(Buffer.from(await original.arrayBuffer()).equals(bytes)).toBe(true);
    }
  });

  it('is known by its first bytes, whatever its name says', async () => {
    expect((await upload(gzipSync(text), 'trace.csv')).capture).toMatchObject({
      status: 'ready',
      samples: 500,
    });
  });

  it('passes over folders, notes and what systems add beside the one CSV', async () => {
    const zip = await zipOf({
      'my scope/trace 1.csv': text,
      '__MACOSX/._trace 1.csv': 'x',
      'readme.pdf': 'x',
    });
    expect((await upload(zip, 'trace.zip')).capture).toMatchObject({ status: 'ready', samples: 500 });
  });

  it.each([
    ['several CSV files', async () => zipOf({ 'a.csv': text, 'b.csv': text }), /several files/],
    ['no file', async () => zipOf({}), /no file/],
    ['a password', async () => markedEncrypted(await zipOf({ 'a.csv': text })), /password/],
    ['half of itself', async () => (await zipOf({ 'a.csv': text })).subarray(0, 700), /damaged|not complete/],
    ['half of a gzip', async () => gzipSync(text).subarray(0, 900), /damaged|not complete/],
  ])('with %s fails with bad_archive and says what to do', async (_, make, message) => {
    const { capture } = await upload(await make(), 'trace.zip');
    expect(capture.status).toBe('failed');
    expect(capture.error).toMatchObject({ code: 'bad_archive' });
    expect(capture.error.message).toMatch(message);
    expect(capture.error.hint).toBeTruthy();
  });

  it('that unpacks to far more than a capture is not unpacked to its end', async () => {
    const head = Buffer.from('Sample interval: 0.0001 s\nA (V)\n');
    const bomb = gzipSync(Buffer.concat([head, Buffer.alloc(200_000_000, '0\n')]), { level: 9 });
    const { capture } = await upload(bomb, 'trace.csv.gz');
    expect(capture.status).toBe('failed');
    expect(capture.error.code).toBe('bad_archive');
    expect((await send('GET', '/api/v1/health', {})).status).toBe(200);
  });
});
