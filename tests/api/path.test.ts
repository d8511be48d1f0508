import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { makeThings, makeWorkshop, pool, send, type Things, type Workshop } from './security-kit.ts';

let here: Workshop;
let elsewhere: Workshop;
let things: Things;
beforeAll(async () => {
  [here, elsewhere] = await Promise.all([makeWorkshop(), makeWorkshop('Elsewhere')]);
});
beforeEach(async () => {
  things = await makeThings(here.id, here.technician);
});
afterAll(() => pool.end());

const get = (path: string) => send('GET', `/api/v1${path}`, { headers: here.technician.browser });
const put = (check: string, body: unknown, ifMatch?: string) =>
  send('PUT', `/api/v1/jobs/${things.job}/checks/${check}`, {
    headers: { ...here.technician.browser, ...(ifMatch === undefined ? {} : { 'if-match': ifMatch }) },
    body,
  });
const next = async () => (await get(`/jobs/${things.job}/next`)).json;
type Named = { cause: string; state: string; because: { effect: string; text: string }[] };
const causeOf = (json: { causes: Named[] }, cause: string) => json.causes.find((one) => one.cause === cause);

describe('GET /checks and /causes', () => {
  it('list every check with cost, sources, cautions and what each finding settles, and every cause with its proof', async () => {
    const checks = (await get('/checks')).json.items;
    const spark = checks.find(({ check }: { check: string }) => check === 'spark');
    expect(spark).toMatchObject({ minutes: 5, risk: 2, cranks: true });
    expect(spark.cautions.length).toBeGreaterThan(3);
    const causes = (await get('/causes')).json.items;
    expect(causes.every(({ provedBy }: { provedBy: unknown[] }) => provedBy.length > 0)).toBe(true);
  });
});

describe('PUT /jobs/{id}/checks/{check}', () => {
  it('keeps result, readings, codes and note with who said it, and the path follows', async () => {
    const answer = await put('battery-rest', {
      result: 'good',
      finding: 'charged',
      readings: [{ what: 'rest', value: '12,6', unit: 'V' }],
      note: 'new battery',
    });
    expect(answer.status).toBe(200);
    expect(answer.json.record).toMatchObject({
      readings: [{ what: 'rest', value: 12.6, unit: 'V' }],
      author: here.technician.name,
    });
    expect((await next()).steps[0]).toMatchObject({ check: 'battery-rest', says: 'charged', by: 'person' });
  });

  it.each([['12.6'], ['12,6'], [12.6]])('reads %s as 12.6', async (value) => {
    const answer = await put('battery-rest', {
      result: 'good',
      readings: [{ what: 'rest', value, unit: 'V' }],
    });
    expect(answer.json.record.readings[0].value).toBe(12.6);
  });

  it('asks what 1,234 means and keeps nothing', async () => {
    const answer = await put('battery-rest', {
      result: 'good',
      readings: [{ what: 'rest', value: '1,234', unit: 'V' }],
    });
    expect(answer.status).toBe(422);
    expect(answer.json.error.details[0]).toEqual({
      path: 'readings.0.value',
      message: 'can mean 1.234 or 1234: write one of them',
    });
    expect((await get(`/jobs/${things.job}/checks/battery-rest`)).json.record).toBeNull();
  });

  it('refuses in words a unit that cannot be, a finding of another check or result, and a capture that is not here', async () => {
    const stranger = await makeThings(elsewhere.id, elsewhere.technician);
    const pathOf = async (check: string, body: unknown) => {
      const answer = await put(check, body);
      expect(answer.status).toBe(422);
      return answer.json.error.details[0].path;
    };
    expect(
      await pathOf('battery-rest', { result: 'good', readings: [{ what: 'rest', value: 12, unit: 'kPa' }] }),
    ).toBe('readings.0.unit');
    expect(await pathOf('spark', { result: 'bad', finding: 'charged' })).toBe('finding');
    expect(await pathOf('spark', { result: 'bad', finding: 'good' })).toBe('finding');
    expect(await pathOf('spark', { result: 'perhaps' })).toBe('result');
    expect(await pathOf('spark', { result: 'good', captureIds: [stranger.capture] })).toBe('captureIds');
  });

  it('takes a bar where the data say kilopascal', async () => {
    expect(
      (
        await put('rail-pressure', {
          result: 'good',
          readings: [{ what: 'pressure', value: '3,5', unit: 'bar' }],
        })
      ).status,
    ).toBe(200);
  });

  it('has no check and no cause that is not in the list', async () => {
    expect((await put('polish-the-chrome', { result: 'good' })).status).toBe(404);
    expect((await get(`/jobs/${things.job}/checks/polish-the-chrome`)).status).toBe(404);
    const answer = await send('PUT', `/api/v1/jobs/${things.job}/causes/gremlins`, {
      headers: here.technician.browser,
      body: { decision: 'set aside', why: 'x' },
    });
    expect(answer.status).toBe(404);
  });

  it('tells the second of two writers, and overwrites nothing', async () => {
    const first = await put('spark', { result: 'bad', finding: 'none' }, '"0"');
    expect(first.status).toBe(200);
    expect((await put('spark', { result: 'good', finding: 'good' }, '"0"')).status).toBe(412);
    expect((await get(`/jobs/${things.job}/checks/spark`)).json.record.finding).toBe('none');
    expect((await put('spark', { result: 'good', finding: 'good' }, first.json.record.etag)).status).toBe(
      200,
    );
  });

  it('keeps an unknown code as it was typed and titles a known one', async () => {
    await put('codes', { result: 'bad', finding: 'stored', codes: ['p0335', 'Blink 4-2'] });
    expect((await next()).codes).toMatchObject([
      { code: 'P0335', title: 'Crankshaft Position Sensor A Circuit' },
      { code: 'Blink 4-2', title: null },
    ]);
  });
});

describe('GET /jobs/{id}/next', () => {
  it('proposes the safe and cheap first, says why, and no cranking before it is known to be safe', async () => {
    const json = await next();
    expect(json.checks.length).toBeGreaterThan(3);
    expect(json.checks[0].why).not.toBe('');
    const checks = json.checks.map(({ check }: { check: string }) => check);
    expect(checks).not.toContain('spark');
    expect(checks).toContain('high-voltage');
  });

  it('rules out with the reason, and lets a person put back and set aside with theirs', async () => {
    await put('spark', { result: 'good', finding: 'good' });
    expect(causeOf(await next(), 'coil')?.state).toBe('ruled out');
    const overrule = (body: unknown) =>
      send('PUT', `/api/v1/jobs/${things.job}/causes/coil`, { headers: here.technician.browser, body });
    expect((await overrule({ decision: 'put back' })).status).toBe(422);
    const back = await overrule({ decision: 'put back', why: 'fails hot' });
    expect(causeOf(back.json, 'coil')).toMatchObject({ state: 'possible' });
    expect(causeOf(back.json, 'coil')?.because.at(-1)).toMatchObject({
      effect: 'put back',
      text: `${here.technician.name}: fails hot`,
    });
    expect(causeOf((await overrule({ decision: null })).json, 'coil')?.state).toBe('ruled out');
  });

  it('names results that cannot both be true', async () => {
    await put('spark', { result: 'good', finding: 'good' });
    await put('crank-trace', { result: 'bad', finding: 'none' });
    expect((await next()).contradictions[0]).toMatchObject({
      kind: 'cannot both be true',
      checks: ['spark', 'crank-trace'],
    });
  });

  it('fills readings from a linked capture and says from which', async () => {
    await pool.query('update capture set job_id = $1 where id = $2', [things.job, things.capture]);
    await pool.query(
      `insert into measurement (capture_id, revision, samples_version, engine, signals, relations)
       select id, revision, 1, 't', $2::jsonb, '[]'::jsonb from capture where id = $1
       on conflict (capture_id) do update set signals = excluded.signals, revision = excluded.revision`,
      [
        things.capture,
        JSON.stringify([
          {
            index: 0,
            circuit: 'crank-vr',
            notices: [],
            values: [{ key: 'rpm_mean', value: 205, unit: 'rpm', evidence: [] }],
          },
        ]),
      ],
    );
    const answer = await get(`/jobs/${things.job}/checks/cranking`);
    expect(answer.json.measured[0]).toMatchObject({
      reading: 'speed',
      value: 205,
      unit: 'rpm',
      captureId: things.capture,
      finding: 'usual',
    });
    const typed = await put('cranking', { result: 'bad', finding: 'slow' });
    expect(typed.status).toBe(200);
    expect((await next()).contradictions[0].kind).toBe('measured against result');
    await put('cranking', { result: 'bad', finding: 'slow', stands: 'recorded after the repair' });
    expect((await next()).contradictions).toEqual([]);
  });
});
