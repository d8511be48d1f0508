import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  csv,
  type Desk,
  getCapture,
  makeDesk,
  postForm,
  sampleCsv,
  settled,
  simulated,
  uploadCsv,
} from './capture-kit.ts';
import { bearer, makeToken, pool, send } from './security-kit.ts';

/** What can be done with captures that are there, over HTTP on the running product. */
let desk: Desk;
beforeAll(async () => {
  desk = await makeDesk();
});
afterAll(() => pool.end());

const at = (id: string, rest = '') => `/api/v1/captures/${id}${rest}`;
const patch = (id: string, body: unknown, headers = {}) =>
  send('PATCH', at(id), { headers: { ...desk.headers, ...headers }, body });
const signals = ({ json }: { json: { signals: unknown[] } }) => json.signals;

describe('GET /captures', () => {
  it('gives keyset pages, newest first, each capture once', async () => {
    const own = await makeDesk();
    const ids: string[] = [];
    for (let k = 0; k < 5; k += 1) ids.unshift(await uploadCsv(own, sampleCsv(20), { title: `Trace ${k}` }));
    const seen: string[] = [];
    let cursor = '';
    do {
      const { json } = await send('GET', `/api/v1/captures?limit=2${cursor && `&cursor=${cursor}`}`, own);
      seen.push(...json.items.map((item: { id: string }) => item.id));
      cursor = json.nextCursor ?? '';
    } while (cursor !== '');
    expect(seen).toEqual(ids);
  });

  it('finds a part of the title in any case, and takes % and _ as letters', async () => {
    const own = await makeDesk();
    await uploadCsv(own, sampleCsv(20), { title: 'Kurbelwelle 100%_ok' });
    await uploadCsv(own, sampleCsv(20), { title: 'Something else' });
    const found = async (text: string) =>
      (await send('GET', `/api/v1/captures?search=${encodeURIComponent(text)}`, own)).json.items.length;
    expect([await found('WELLE'), await found('%_'), await found('0%k'), await found('nothing')]).toEqual([
      1, 1, 0, 0,
    ]);
  });

  it('filters by circuit and status and says the key values of each signal', async ({ skip }) => {
    const text = await simulated('crank-60-2-pickup.csv');
    if (text === null) return skip('../shared/captures is absent');
    const own = await makeDesk();
    await settled(own, await uploadCsv(own, text));
    const { json } = await send('GET', '/api/v1/captures?circuit=crank-vr&status=ready', own);
    expect(json.items).toHaveLength(1);
    expect(json.items[0].headline).toEqual([{ signal: 0, text: '60-2, 201.0 rpm' }]);
    expect((await send('GET', '/api/v1/captures?circuit=cam-hall', own)).json.items).toHaveLength(0);
  });
});

describe('PATCH /captures/{id}', () => {
  it('changes title and note without touching what was measured', async () => {
    const id = await uploadCsv(desk, sampleCsv(200));
    const before = await settled(desk, id);
    const { json } = await patch(id, { title: 'New title', note: 'A note' });
    expect(json).toMatchObject({
      title: 'New title',
      note: 'A note',
      status: 'ready',
      revision: before.revision,
    });
  });

  it('measures again with a factor, a circuit or cylinders, and keeps the samples', async () => {
    const id = await uploadCsv(desk, sampleCsv(5_000));
    const before = await settled(desk, id);
    const changed = await patch(id, {
      cylinders: 4,
      signals: [{ column: 2, circuit: 'other', factor: 10, unit: 'A' }],
    });
    expect(changed.json).toMatchObject({
      status: 'queued',
      revision: 2,
      samplesVersion: before.samplesVersion,
    });
    const after = await settled(desk, id);
    expect(after).toMatchObject({ status: 'ready', samplesVersion: before.samplesVersion, cylinders: 4 });
    expect(after.signals[1]).toMatchObject({ circuit: 'other', factor: 10, unit: 'A', circuitConfidence: 1 });
    const { json } = await send('GET', at(id, '/measurements'), desk);
    expect(json).toMatchObject({ revision: 2, stale: false });
    const highest = json.signals[1].values.find((value: { key: string }) => value.key === 'highest');
    expect(highest).toMatchObject({ value: 50, unit: 'A' });
  });

  it('reads again when the way of reading changes, under a higher samples version', async () => {
    const id = await uploadCsv(desk, sampleCsv(300));
    const before = await settled(desk, id);
    const changed = await patch(id, { reading: { timeUnit: 'ms' } });
    expect(changed.json).toMatchObject({ status: 'queued', revision: 2 });
    const stale = await send('GET', at(id, '/measurements'), desk);
    const after = await settled(desk, id);
    expect(after.samplesVersion).toBeGreaterThan(before.samplesVersion);
    expect(after.durationS).toBeCloseTo(before.durationS / 1000, 9);
    // What was asked for while it was read came from before, and said so (unless the worker was quicker).
    if (stale.json.revision === 1) expect(stale.json.stale).toBe(true);
    expect((await send('GET', at(id, '/measurements'), desk)).json).toMatchObject({
      revision: 2,
      stale: false,
    });
  });

  it('is 412 for the second of two who change the same edition', async () => {
    const id = await uploadCsv(desk, sampleCsv(50));
    await settled(desk, id);
    const etag = (await getCapture(desk, id)).headers.etag as string;
    const answers = await Promise.all(['a', 'b'].map((title) => patch(id, { title }, { 'if-match': etag })));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 412]);
  });

  it('refuses fields that it does not know and factors of nought', async () => {
    const id = await uploadCsv(desk, sampleCsv(50));
    expect((await patch(id, { colour: 'red' })).status).toBe(422);
    expect((await patch(id, { signals: [{ column: 1, factor: 0 }] })).status).toBe(422);
  });

  it('refuses a job that is not there instead of keeping its id', async () => {
    const id = await uploadCsv(desk, sampleCsv(20), { title: 'No job' });
    const answer = await patch(id, { jobId: 'abcdefghijklmnopqrst' });
    expect(answer.status).toBe(422);
    expect(answer.json.error.details).toEqual([{ path: 'jobId', message: 'there is no such job' }]);
  });
});

describe('hiding and bringing back', () => {
  it('DELETE hides a capture everywhere and restore brings it back whole', async () => {
    const id = await uploadCsv(desk, sampleCsv(60));
    await settled(desk, id);
    expect((await send('DELETE', at(id), desk)).status).toBe(204);
    expect((await getCapture(desk, id)).status).toBe(404);
    expect((await send('GET', at(id, '/original'), desk)).status).toBe(404);
    expect((await send('GET', at(id, '/window?from=0&to=1&columns=10'), desk)).status).toBe(404);
    const restored = await send('POST', at(id, '/restore'), desk);
    expect([restored.status, signals(restored).length]).toEqual([200, 2]);
    expect((await send('GET', at(id, '/original'), desk)).status).toBe(200);
  });
});

describe('POST /captures/{id}/cancel', () => {
  it('is 409 when nothing is being read', async () => {
    const id = await uploadCsv(desk, sampleCsv(60));
    await settled(desk, id);
    expect((await send('POST', at(id, '/cancel'), desk)).status).toBe(409);
  });
});

describe('GET /captures/{id}/preview', () => {
  it('shows the first lines and what the reader made of them', async () => {
    const id = await uploadCsv(desk, sampleCsv(60));
    await settled(desk, id);
    const { json } = await send('GET', at(id, '/preview'), desk);
    expect(json.lines[0]).toMatchObject({
      line: 1,
      role: 'names',
      cells: ['Time (s)', 'Pick-up (V)', 'Level (V)'],
    });
    expect(json.lines[1]).toMatchObject({ line: 2, role: 'numbers' });
  });
});

describe('GET /captures/{id}/export', () => {
  it('gives a CSV that our own reader takes back to the same float32 and the same times', async () => {
    const id = await uploadCsv(desk, sampleCsv(3_000));
    const first = await settled(desk, id);
    const text = (await send('GET', at(id, '/export'), desk)).text;
    expect(text.split('\n')[0]).toBe('Time (s),Pick-up (V),Level (V)');
    const again = await settled(desk, await uploadCsv(desk, text));
    expect(again).toMatchObject({ samples: 3_000, startS: first.startS, sampleRateHz: first.sampleRateHz });
    const whole = '/window?from=0&to=9&columns=8192';
    const [a, b] = await Promise.all([
      send('GET', at(id, whole), desk),
      send('GET', at(again.id, whole), desk),
    ]);
    expect(b.text).toBe(a.text);
  });

  it('gives only the stretch asked for', async () => {
    const id = await uploadCsv(desk, sampleCsv(3_000));
    await settled(desk, id);
    const lines = (await send('GET', at(id, '/export?from=0.1&to=0.1009'), desk)).text.trim().split('\n');
    expect(lines).toHaveLength(11);
    expect(lines[1]!.split(',')[0]).toBe('0.1');
  });

  it('guards names that a spreadsheet would take for a formula', async () => {
    const signals = JSON.stringify([{ column: 1, name: '=1+1', unit: 'V' }]);
    const { json } = await postForm(desk.headers, [['signals', signals], csv(sampleCsv(30))]);
    await settled(desk, json.id);
    const text = (await send('GET', at(json.id, '/export'), desk)).text;
    expect(text.split('\n')[0]).toBe("Time (s),'=1+1 (V),Level (V)");
  });
});

describe('a learner', () => {
  it('uploads an own practice capture that other technicians do not see and instructors do', async () => {
    const { workshop } = desk;
    const learner = bearer(await makeToken(workshop.learner, workshop.id, ['read', 'write']));
    const instructor = bearer(await makeToken(workshop.instructor, workshop.id, ['read']));
    const { status, json } = await postForm(learner, [csv(sampleCsv(30))]);
    expect(status).toBe(201);
    expect((await send('GET', at(json.id), { headers: learner })).status).toBe(200);
    expect((await send('GET', at(json.id), { headers: instructor })).status).toBe(200);
    expect((await send('GET', at(json.id), desk)).status).toBe(404);
  });
});
