import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Desk, makeDesk } from './capture-kit.ts';
import { origin, pool, send } from './security-kit.ts';

let desk: Desk;
let jobId: string;
beforeAll(async () => {
  desk = await makeDesk();
  const made = await send('POST', '/api/v1/jobs', { headers: desk.headers, body: { complaint: 'x' } });
  jobId = made.json.id;
});
afterAll(() => pool.end());

const picture = (width = 40, height = 30) =>
  sharp({ create: { width, height, channels: 3, background: '#a8442a' } });

async function post(bytes: Uint8Array, name = 'a.jpg', fields: Record<string, string> = {}, headers = {}) {
  const form = new FormData();
  for (const [key, value] of Object.entries(fields)) form.set(key, value);
  form.set('file', new File([new Uint8Array(bytes)], name));
  const answer = await fetch(`${origin}/api/v1/jobs/${jobId}/photos`, {
    method: 'POST',
    headers: { ...desk.headers, ...headers },
    body: form,
  });
  return { status: answer.status, json: await answer.json() };
}
const image = async (id: string, size = 'whole') => {
  const answer = await fetch(`${origin}/api/v1/photos/${id}/image?size=${size}`, { headers: desk.headers });
  return { status: answer.status, headers: answer.headers, bytes: Buffer.from(await answer.arrayBuffer()) };
};

describe('POST /jobs/{id}/photos', () => {
  it.each([
    ['jpeg', () => picture().jpeg()],
    ['png', () => picture().png()],
    ['webp', () => picture().webp()],
  ] as const)('keeps a %s as that, whole and small', async (format, make) => {
    const { status, json } = await post(await make().toBuffer(), `a.${format}`, { caption: 'The wheel' });
    expect(status).toBe(201);
    expect(json).toMatchObject({
      width: 40,
      height: 30,
      caption: 'The wheel',
      contentType: `image/${format}`,
    });
    const whole = await image(json.id);
    expect((await sharp(whole.bytes).metadata()).format).toBe(format);
    expect(whole.headers.get('content-type')).toBe(`image/${format}`);
    expect(whole.headers.get('x-content-type-options')).toBe('nosniff');
    expect(whole.headers.get('content-security-policy')).toContain("default-src 'none'");
    expect((await sharp((await image(json.id, 'small')).bytes).metadata()).format).toBe('jpeg');
  });

  it('writes it anew: upright, without EXIF and without what was hidden behind the picture', async () => {
    const sent = await picture(40, 30)
      .jpeg()
      .withExif({ IFD0: { Copyright: 'PRIVATE-OWNER' }, IFD3: { GPSLatitude: '48/1 12/1 0/1' } })
      .withMetadata({ orientation: 6 })
      .toBuffer();
    const { json } = await post(Buffer.concat([sent, Buffer.from('<script>HIDDEN</script>')]));
    expect(json).toMatchObject({ width: 30, height: 40 });
    const { bytes } = await image(json.id);
    const { exif, orientation } = await sharp(bytes).metadata();
    expect(exif).toBeUndefined();
    expect(orientation).toBeUndefined();
    expect(bytes.includes('PRIVATE-OWNER') || bytes.includes('HIDDEN')).toBe(false);
  });

  it('refuses in words an SVG with script, text named as a photo, a picture that breaks off, and nothing', async () => {
    const svg = '<svg xmlns="http://www.w3.org/2000/svg"><script>alert(1)</script></svg>';
    for (const text of [svg, `GIF89a${'x'.repeat(100)}`, 'not a picture', '%PDF-1.7']) {
      const { status, json } = await post(Buffer.from(text), 'photo.jpg');
      expect(status, text.slice(0, 10)).toBe(415);
      expect(json.error.message).toBe('This file is not a photo that can be kept here. Nothing was kept.');
      expect(json.error.hint).toContain('JPEG, PNG or WebP');
    }
    const noise = Buffer.from(Array.from({ length: 300 * 300 * 3 }, (_, i) => (i * 7919) % 251));
    const whole = await sharp(noise, { raw: { width: 300, height: 300, channels: 3 } })
      .jpeg()
      .toBuffer();
    const cut = await post(whole.subarray(0, whole.length / 2));
    expect(cut.status).toBe(415);
    expect(cut.json.error.message).toContain('damaged or broken off');
    expect((await post(Buffer.alloc(0))).status).toBe(400);
  });

  it('refuses a photo of 60 MB by its announced length, before it is read', async () => {
    const headers = {
      ...desk.headers,
      'content-type': 'multipart/form-data; boundary=x',
      'content-length': String(60 * 1024 * 1024),
      connection: 'close',
    };
    const answer = await send('POST', `/api/v1/jobs/${jobId}/photos`, { headers });
    expect(answer.status).toBe(413);
    expect(answer.json.error.message).toBe('The photo is larger than 25 MiB. Nothing was kept.');
  });

  it('refuses more than fifty megapixels, however few bytes they take', async () => {
    const wide = await picture(10_000, 5_100).png({ compressionLevel: 9 }).toBuffer();
    expect(wide.length).toBeLessThan(1_000_000);
    const { status, json } = await post(wide, 'a.png');
    expect(status).toBe(415);
    expect(json.error.message).toContain('51 megapixels');
  });

  it('keeps one photo when the same key sends it twice', async () => {
    const bytes = await picture(8, 8).png().toBuffer();
    const key = { 'idempotency-key': `photo-${Math.random()}` };
    const [first, second] = [await post(bytes, 'a.png', {}, key), await post(bytes, 'a.png', {}, key)];
    expect(second.json.id).toBe(first.json.id);
  });
});

describe('a photo', () => {
  it('is captioned, taken away, brought back and in the timeline; learners and others do not see it', async () => {
    const { json } = await post(await picture().jpeg().toBuffer());
    const call = (method: string, path: string, body?: unknown, headers = desk.headers) =>
      send(method, `/api/v1${path}`, { headers, body });
    const changed = await call('PATCH', `/photos/${json.id}`, { caption: 'Tooth 23' });
    expect(changed.json.caption).toBe('Tooth 23');
    expect((await call('DELETE', `/photos/${json.id}`)).status).toBe(204);
    expect((await image(json.id)).status).toBe(404);
    expect((await call('POST', `/photos/${json.id}/restore`)).status).toBe(200);
    expect((await image(json.id)).status).toBe(200);
    const line = await call('GET', `/jobs/${jobId}/timeline`);
    expect(line.text).toContain(json.id);
    const learner = desk.workshop.learner.browser;
    expect((await send('GET', `/api/v1/photos/${json.id}/image`, { headers: learner })).status).toBe(404);
  });
});
