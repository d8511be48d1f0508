import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { makeThings, makeWorkshop, pool, send, type Things, type Workshop } from './security-kit.ts';

let here: Workshop;
let things: Things;
beforeAll(async () => {
  here = await makeWorkshop();
  things = await makeThings(here.id, here.technician);
});
afterAll(() => pool.end());

const POINT = { kind: 'point', signal: 0, from: 0.25, to: null, value: null, text: 'the short tooth' };
const headers = () => here.technician.browser;
const create = (body: unknown) =>
  send('POST', `/api/v1/captures/${things.capture}/marks`, { headers: headers(), body });
const patch = (id: string, body: unknown, ifMatch?: string) =>
  send('PATCH', `/api/v1/marks/${id}`, {
    headers: { ...headers(), ...(ifMatch === undefined ? {} : { 'if-match': ifMatch }) },
    body,
  });

describe('marks', () => {
  it('keep trace coordinates to the last bit and name their author', async () => {
    const from = 0.1 + 0.2;
    const made = await create({ ...POINT, kind: 'range', from, to: 1 / 3 + 0.1 });
    expect(made.status).toBe(201);
    expect(made.json).toMatchObject({
      from,
      to: 1 / 3 + 0.1,
      author: here.technician.name,
      fromAnswer: false,
    });
    expect(made.headers.etag).toBe(made.json.etag);
    const list = await send('GET', `/api/v1/captures/${things.capture}/marks`, { headers: headers() });
    expect(list.json.items).toContainEqual(made.json);
    const times = list.json.items.map((item: { from: number }) => item.from);
    expect(times).toEqual([...times].sort((a, b) => a - b));
  });

  it('are refused in words when they are not whole or name a signal that is not there', async () => {
    const paths = async (body: unknown) => {
      const answer = await create(body);
      expect(answer.status).toBe(422);
      return answer.json.error.details.map((detail: { path: string }) => detail.path);
    };
    expect(await paths({ ...POINT, kind: 'range', to: 0.1 })).toEqual(['to']);
    expect(await paths({ ...POINT, kind: 'level' })).toEqual(['value']);
    expect(await paths({ ...POINT, signal: 7 })).toEqual(['signal']);
    expect(await paths({ ...POINT, text: 'x'.repeat(2_001) })).toEqual(['text']);
    expect(await paths({ ...POINT, from: 'soon' })).toEqual(['from']);
  });

  it('change only for who holds the present edition: a stale If-Match is 412 and overwrites nothing', async () => {
    const made = await create(POINT);
    const first = await patch(made.json.id, { text: 'first' }, made.json.etag);
    expect(first.status).toBe(200);
    expect(first.json.etag).not.toBe(made.json.etag);
    const late = await patch(made.json.id, { text: 'late' }, made.json.etag);
    expect(late.status).toBe(412);
    expect(late.json.error.code).toBe('stale');
    expect((await patch(made.json.id, { from: 0.75 }, first.json.etag)).json.text).toBe('first');
  });

  it('let one of two win that come at once with the same edition', async () => {
    const made = await create(POINT);
    const answers = await Promise.all(
      ['a', 'b', 'c', 'd'].map((text) => patch(made.json.id, { text }, made.json.etag)),
    );
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
    expect(answers.filter(({ status }) => status === 412)).toHaveLength(3);
  });

  it('stay whole when a change would make them half', async () => {
    const made = await create(POINT);
    const answer = await patch(made.json.id, { kind: 'level' });
    expect(answer.status).toBe(422);
    expect(answer.json.error.details[0].path).toBe('value');
    expect((await patch(made.json.id, { colour: 'red' })).status).toBe(422);
  });

  it('that were taken away come back, and a stale taking away is 412', async () => {
    const made = await create(POINT);
    const remove = (ifMatch: string) =>
      send('DELETE', `/api/v1/marks/${made.json.id}`, { headers: { ...headers(), 'if-match': ifMatch } });
    expect((await remove('"99"')).status).toBe(412);
    expect((await remove(made.json.etag)).status).toBe(204);
    expect((await patch(made.json.id, { text: 'x' })).status).toBe(404);
    const back = await send('POST', `/api/v1/marks/${made.json.id}/restore`, { headers: headers() });
    expect(back.json.text).toBe(POINT.text);
    expect((await patch(made.json.id, { text: 'x' }, back.json.etag)).status).toBe(200);
  });

  it('are bounded: a capture takes a thousand', async () => {
    const full = await makeThings(here.id, here.technician);
    await pool.query(
      `insert into mark (id, capture_id, created_by, author, kind, from_s, text)
       select 'mark' || n || $1, $1, $2, 'a', 'point', n, '' from generate_series(1, 999) n`,
      [full.capture, here.technician.id],
    );
    const path = `/api/v1/captures/${full.capture}/marks`;
    expect((await send('POST', path, { headers: headers(), body: POINT })).status).toBe(409);
  });
});
