import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { summarize } from '../../src/engine/signal/pyramid.ts';
import { type Desk, getWindow, makeDesk, sampleCsv, settled, simulated, uploadCsv } from './capture-kit.ts';
import { pool, send } from './security-kit.ts';

/** GET /captures/{id}/window over HTTP, decoded by what the OpenAPI text says and compared with the file's own numbers. */
let desk: Desk;
beforeAll(async () => {
  desk = await makeDesk();
});
afterAll(() => pool.end());

const at = (id: string, query: string) => `/api/v1/captures/${id}/window?${query}`;
const columnOf = (text: string, column: number) =>
  Float32Array.from(
    text
      .trim()
      .split('\n')
      .slice(1)
      .map((line) => Number(line.split(',')[column])),
  );

describe('GET /captures/{id}/window', () => {
  it('gives the samples of the file, and four values a column that are those of its samples', async () => {
    const text = (await simulated('crank-60-2-pickup.csv')) ?? sampleCsv(69_999);
    const id = await uploadCsv(desk, text);
    const { samples, sampleRateHz } = await settled(desk, id);
    const near = await getWindow(desk, id, `from=0.1&to=${0.1 + 99.5 / sampleRateHz}&columns=50`);
    const start = Math.round(0.1 * sampleRateHz);
    expect([near.layout, near.count]).toEqual(['samples', 100]);
    near.signals.forEach((signal, k) => {
      expect(signal).toEqual(columnOf(text, k + 1).slice(start, start + 100));
    });
    const whole = await getWindow(desk, id, 'from=-1&to=99&columns=1000&signals=0');
    expect([whole.layout, whole.count, whole.signals.length]).toEqual(['columns', 1000, 1]);
    const file = columnOf(text, 1);
    expect(file).toHaveLength(samples);
    for (let column = 0; column < 1000; column += 1) {
      // Below a column of 256 samples the bounds are exact.
      const bound = (c: number) => (c === 1000 ? samples : Math.round(c * (samples / 1000)));
      const expected = summarize(file, bound(column), bound(column + 1));
      expect([...whole.signals[0]!.subarray(column * 4, column * 4 + 4)]).toEqual([...expected]);
    }
  });

  it('is immutable only with the samples version, and answers an old one with 409', async () => {
    const id = await uploadCsv(desk, sampleCsv(500));
    const { samplesVersion } = await settled(desk, id);
    const query = 'from=0&to=1&columns=10';
    const named = await getWindow(desk, id, `${query}&v=${samplesVersion}`);
    expect(named.headers.get('cache-control')).toBe('private, max-age=31536000, immutable');
    const plain = await send('GET', at(id, query), desk);
    expect(plain.headers['cache-control']).toBe('private, no-cache');
    const headers = { ...desk.headers, 'if-none-match': plain.headers.etag as string };
    expect((await send('GET', at(id, query), { headers })).status).toBe(304);
    const old = await send('GET', at(id, `${query}&v=${samplesVersion - 1}`), desk);
    expect([old.status, old.json.error.code]).toEqual([409, 'samples_changed']);
  });

  it('refuses columns of 0, -1 and 1e9, signals that are not there, and more than 64 of them', async () => {
    const id = await uploadCsv(desk, sampleCsv(100));
    await settled(desk, id);
    for (const columns of ['0', '-1', '1e9', '1.5', 'x', '']) {
      expect((await send('GET', at(id, `from=0&to=1&columns=${columns}`), desk)).status).toBe(422);
    }
    expect((await send('GET', at(id, 'from=0&to=1&columns=10&signals=7'), desk)).status).toBe(422);
    const many = Array.from({ length: 65 }, () => 0).join();
    expect((await send('GET', at(id, `from=0&to=1&columns=10&signals=${many}`), desk)).status).toBe(422);
    expect((await send('GET', at(id, 'from=nan&to=1&columns=10'), desk)).status).toBe(422);
  });

  it('says 409 before there are samples, and nothing outside of the capture', async () => {
    const id = await uploadCsv(desk, sampleCsv(100));
    await settled(desk, id);
    const outside = await getWindow(desk, id, 'from=50&to=60&columns=10');
    expect([outside.count, outside.body.byteLength]).toEqual([0, 0]);
    await pool.query('update capture set axis = null, samples_version = 0 where id = $1', [id]);
    const early = await send('GET', at(id, 'from=0&to=1&columns=10'), desk);
    expect([early.status, early.json.error.code]).toEqual([409, 'not_ready']);
  });

  it('gives an uneven file its times as exact doubles', async () => {
    const times = [0, 0.001, 0.0035, 0.1, 0.10000001, 2.5, 2.75, 3];
    const text = `Time (s),Level (V)\n${times.map((time, k) => `${time},${k % 2}`).join('\n')}\n`;
    const id = await uploadCsv(desk, text);
    expect((await settled(desk, id)).axis).not.toBe('even');
    const window = await getWindow(desk, id, 'from=0&to=3&columns=100');
    expect([...window.times]).toEqual(times);
    expect([...window.signals[0]!]).toEqual(times.map((_, k) => k % 2));
  });

  it('stops at the next request when membership, token or session end, and when the role changes', async () => {
    const own = await makeDesk();
    const id = await uploadCsv(own, sampleCsv(100));
    await settled(own, id);
    const { technician } = own.workshop;
    const query = at(id, 'from=0&to=1&columns=10');
    const status = async (headers: Readonly<Record<string, string>>) =>
      (await send('GET', query, { headers })).status;
    const twice = async (headers: Readonly<Record<string, string>>) => [
      await status(headers),
      await status(headers),
    ];
    expect(await twice(own.headers)).toEqual([200, 200]);
    expect(await twice(technician.browser)).toEqual([200, 200]);
    const role = (name: string) =>
      pool.query('update membership set role = $2 where person_id = $1', [technician.id, name]);
    await role('learner');
    expect([await status(own.headers), await status(technician.browser)]).toEqual([404, 404]);
    await role('technician');
    expect(await twice(own.headers)).toEqual([200, 200]);
    await pool.query('delete from token where person_id = $1', [technician.id]);
    expect(await status(own.headers)).toBe(401);
    await pool.query('update session set expires_at = now() where user_id = $1', [technician.id]);
    expect(await status(technician.browser)).toBe(401);
    const other = own.workshop.instructor;
    expect(await twice(other.browser)).toEqual([200, 200]);
    await pool.query('delete from membership where person_id = $1', [other.id]);
    expect([401, 404]).toContain(await status(other.browser));
  });
});
