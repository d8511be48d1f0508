import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  bearer,
  makeThings,
  makeToken,
  makeWorkshop,
  newId,
  pool,
  send,
  type Things,
  type Workshop,
} from './security-kit.ts';

let here: Workshop;
let things: Things;
beforeAll(async () => {
  here = await makeWorkshop();
  things = await makeThings(here.id, here.technician);
});
afterAll(() => pool.end());

const MARK = { kind: 'point', signal: 0, from: 0.1, to: null, value: null, text: 'once' };
const post = (key: string, body: unknown = MARK, headers = here.technician.browser, path = 'marks') =>
  send('POST', `/api/v1/captures/${things.capture}/${path}`, {
    headers: { ...headers, 'idempotency-key': key },
    body,
  });
const marks = async () => {
  const { rows } = await pool.query('select count(*)::int as n from mark where capture_id = $1', [
    things.capture,
  ]);
  return rows[0].n as number;
};

describe('Idempotency-Key', () => {
  it('answers the same again and makes nothing twice, whatever the order of the fields', async () => {
    const key = newId();
    const before = await marks();
    const first = await post(key);
    const again = await post(key, Object.fromEntries(Object.entries(MARK).reverse()));
    expect(first.status).toBe(201);
    expect(again.status).toBe(201);
    expect(again.text).toBe(first.text);
    expect(again.headers.etag).toBe(first.headers.etag);
    expect(await marks()).toBe(before + 1);
  });

  it('refuses other content with 409', async () => {
    const key = newId();
    await post(key);
    const other = await post(key, { ...MARK, text: 'twice' });
    expect(other.status).toBe(409);
    expect(other.json.error.code).toBe('key_reused');
  });

  it('lets one of many run that come at once; the others get its answer or 409 with Retry-After', async () => {
    const key = newId();
    const before = await marks();
    const answers = await Promise.all(Array.from({ length: 8 }, () => post(key)));
    expect(await marks()).toBe(before + 1);
    for (const answer of answers) {
      if (answer.status === 201) continue;
      expect(answer.json.error.code).toBe('still_running');
      expect(Number(answer.headers['retry-after'])).toBeGreaterThan(0);
    }
    expect(answers.some(({ status }) => status === 201)).toBe(true);
  });

  it('belongs to its caller and its path', async () => {
    const key = newId();
    const first = await post(key);
    const other = await post(key, MARK, here.owner.browser);
    expect(other.status).toBe(201);
    expect(other.json.id).not.toBe(first.json.id);
    const second = await makeThings(here.id, here.technician);
    const elsewhere = await send('POST', `/api/v1/captures/${second.capture}/marks`, {
      headers: { ...here.technician.browser, 'idempotency-key': key },
      body: MARK,
    });
    expect(elsewhere.json.id).not.toBe(first.json.id);
  });

  it('never shows a secret again: 409 already_made with the id', async () => {
    const key = newId();
    const first = await post(key, { question: 'q' }, here.technician.browser, 'share-links');
    expect(first.status).toBe(201);
    const again = await post(key, { question: 'q' }, here.technician.browser, 'share-links');
    expect(again.status).toBe(409);
    expect(again.json.error.code).toBe('already_made');
    expect(again.json.error.details).toEqual([{ path: 'id', message: first.json.id }]);
    expect(again.text).not.toContain(first.json.url);
  });

  it('keeps a refusal, since the same request would be refused again', async () => {
    const key = newId();
    const first = await post(key, { ...MARK, signal: 99 });
    const again = await post(key, { ...MARK, signal: 99 });
    expect([first.status, again.status]).toEqual([422, 422]);
    expect(again.text).toBe(first.text);
  });

  it('is free again after a day', async () => {
    const key = newId();
    const first = await post(key);
    await pool.query("update idempotency set created_at = created_at - interval '25 hours'");
    const later = await post(key, { ...MARK, text: 'the next day' });
    expect(later.status).toBe(201);
    expect(later.json.id).not.toBe(first.json.id);
  });

  it('is taken over from a request whose process died, not from one that may still run', async () => {
    const key = newId();
    await post(key);
    await pool.query(
      "update idempotency set state = 'running', status = null, body = null, created_at = now() - interval '1 minute'",
    );
    expect((await post(key)).json.error.code).toBe('still_running');
    await pool.query("update idempotency set created_at = now() - interval '3 minutes'");
    expect((await post(key)).status).toBe(201);
  });

  it('that cannot be a key is 422', async () => {
    expect((await post('x'.repeat(256))).status).toBe(422);
  });

  it('is the person’s, by whatever they call', async () => {
    const key = newId();
    const first = await post(key);
    const headers = bearer(await makeToken(here.technician, here.id, ['write']));
    const again = await send('POST', `/api/v1/captures/${things.capture}/marks`, {
      headers: { ...headers, 'idempotency-key': key },
      body: MARK,
    });
    expect(again.json.id).toBe(first.json.id);
  });
});
