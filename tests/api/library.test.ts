import { readFile } from 'node:fs/promises';
import { setTimeout as sleep } from 'node:timers/promises';
import { beforeAll, describe, expect, it } from 'vitest';
import { type Desk, getWindow, makeDesk, sampleCsv, settled, uploadCsv } from './capture-kit.ts';
import { bearer, makeToken, origin, send } from './security-kit.ts';

const sample = (file: string) => readFile(new URL(`../../public/samples/${file}`, import.meta.url), 'utf8');

let desk: Desk;
let reviewer: Readonly<Record<string, string>>;
let good = '';
let late = '';

async function ready(text: string, title: string): Promise<string> {
  const id = await uploadCsv(desk, text, { title, cylinders: '4' });
  const { status } = await settled(desk, id);
  expect(status).toBe('ready');
  return id;
}

const api = (method: string, path: string, body?: unknown, headers = desk.headers) =>
  send(method, `/api/v1${path}`, { headers, body });

const proposal = (captureId: string, over: object = {}) => ({
  captureId,
  signals: [0, 1],
  engine: { make: 'Vellmar', model: 'Ostrin 1.4', code: 'VO14', year: 2010, yearTo: 2014 },
  condition: 'cranking',
  note: 'bench',
  provenance: 'Made for this test',
  instrument: 'computed',
  probe: 'none',
  confirmed: 'given',
  ...over,
});

async function published(captureId: string, over: object = {}): Promise<string> {
  const made = await api('POST', '/known-goods', proposal(captureId, over));
  expect(made.status, made.text).toBe(201);
  const review = await api('POST', `/known-goods/${made.json.id}/reviews`, { decision: 'publish' }, reviewer);
  expect(review.status, review.text).toBe(201);
  return made.json.id;
}

async function compared(captureId: string, body: object) {
  const made = await api('POST', `/captures/${captureId}/comparisons`, body);
  expect(made.status, made.text).toBe(201);
  return finished(made.json.id);
}

async function finished(id: string) {
  for (const end = Date.now() + 60_000; Date.now() < end; await sleep(150)) {
    const answer = await api('GET', `/comparisons/${id}`);
    if (answer.json.status === 'ready' || answer.json.status === 'failed') return answer;
  }
  throw new Error('the comparison did not come to an end');
}

beforeAll(async () => {
  desk = await makeDesk();
  reviewer = bearer(await makeToken(desk.workshop.instructor, desk.workshop.id, ['read', 'write']));
  good = await ready(await sample('crank-60-2-with-cam.csv'), 'In time');
  late = await ready(await sample('crank-60-2-cam-late.csv'), 'Late');
}, 120_000);

describe('known-goods', () => {
  it('keep a chosen stretch with its own samples, and the window gives them in the captures’ layout', async () => {
    const made = await api('POST', '/known-goods', proposal(good, { from: 0.2, to: 0.9 }));
    expect(made.status, made.text).toBe(201);
    expect(made.json.fromS).toBeCloseTo(0.2, 4);
    expect(made.json.signals[0].portrait.points.length).toBeGreaterThan(50);
    const theirs = await fetch(
      new URL(
        `/api/v1/known-goods/${made.json.id}/window?from=0.3&to=0.31&columns=100&signals=0&v=1`,
        origin,
      ),
      { headers: desk.headers },
    );
    expect(theirs.status).toBe(200);
    expect(theirs.headers.get('cache-control')).toContain('immutable');
    const own = await getWindow(desk, good, 'from=0.3&to=0.31&columns=100&signals=0');
    expect(theirs.headers.get('gapmark-layout')).toBe(own.layout);
    expect(new Uint8Array(await theirs.arrayBuffer())).toEqual(new Uint8Array(own.body));
    const wide = await api('GET', `/known-goods/${made.json.id}/window?from=0&to=2&columns=9000`);
    expect(wide.status).toBe(422);
    const other = await api('GET', `/known-goods/${made.json.id}/window?from=0&to=2&columns=50&signals=7`);
    expect(other.status).toBe(422);
  });

  it('are not reviewed by their author, and of two reviewers at once one is told', async () => {
    const own = await api('POST', '/known-goods', proposal(good), reviewer);
    const author = await api(
      'POST',
      `/known-goods/${own.json.id}/reviews`,
      { decision: 'publish' },
      reviewer,
    );
    expect(author.status).toBe(403);
    const made = await api('POST', '/known-goods', proposal(good));
    const both = await Promise.all(
      ['publish', 'return'].map((decision) =>
        api('POST', `/known-goods/${made.json.id}/reviews`, { decision, note: 'n' }, reviewer),
      ),
    );
    expect(both.filter(({ status }) => status === 201)).toHaveLength(1);
    expect([409, 412]).toContain(both.find(({ status }) => status !== 201)!.status);
  });

  it('are replaced by a newer version; the older one stays readable and comparable, and the line is told', async () => {
    const first = await published(good);
    const second = await api('POST', '/known-goods', proposal(good, { supersedes: first, note: 'again' }));
    expect(second.json.version).toBe(2);
    expect((await api('GET', `/known-goods/${first}`)).json.state).toBe('published');
    await api('POST', `/known-goods/${second.json.id}/reviews`, { decision: 'publish' }, reviewer);
    const older = (await api('GET', `/known-goods/${first}`)).json;
    expect(older).toMatchObject({ state: 'superseded', supersededBy: second.json.id });
    expect(
      older.versions.map(({ version, state }: { version: number; state: string }) => [version, state]),
    ).toEqual([
      [1, 'superseded'],
      [2, 'published'],
    ]);
    const third = await api('POST', '/known-goods', proposal(good, { supersedes: first }));
    expect(third.status).toBe(409);
    expect(third.json.error.message).toContain('version 2');
    const comparison = await compared(late, { signal: 1, knownGoodId: first });
    expect(comparison.json.status).toBe('ready');
  });

  it('refuse years that end before they begin', async () => {
    const refused = await api(
      'POST',
      '/known-goods',
      proposal(good, { engine: { make: 'A', model: 'B', year: 2014, yearTo: 2010 } }),
    );
    expect(refused.status).toBe(422);
    expect(refused.json.error.details[0].message).toContain('before the first');
  });

  it('outlive their capture', async () => {
    const capture = await ready(await sample('crank-60-2-with-cam.csv'), 'To be deleted');
    const id = await published(capture, { note: 'outlives' });
    expect((await api('DELETE', `/captures/${capture}`)).status).toBe(204);
    expect((await api('GET', `/known-goods/${id}`)).json.state).toBe('published');
    expect((await api('GET', `/known-goods/${id}/window?from=0&to=1&columns=10`)).status).toBe(200);
    expect((await compared(late, { signal: 1, knownGoodId: id })).json.status).toBe('ready');
  });
});

describe('finding', () => {
  it('forgives typing mistakes when nothing has the words as typed', async () => {
    await published(good, { engine: { make: 'Harroway', model: 'Pentle 2.0' }, note: 'typo' });
    const find = async (search: string) =>
      (await api('GET', `/known-goods?search=${encodeURIComponent(search)}`)).json.items.map(
        (item: { engine: { make: string } }) => item.engine.make,
      );
    expect(await find('harroway')).toEqual(['Harroway']);
    expect(await find('Harowai pentle')).toEqual(['Harroway']);
    expect(await find('zzzzqqq')).toEqual([]);
    expect(await find('100%_')).toEqual([]);
  });

  it('narrows by wheel, and puts first what fits the capture at hand, page by page', async () => {
    const level = await ready(sampleCsv(3000), 'Plain');
    await published(level, { signals: [0], engine: { make: 'Unlike', model: 'One' }, note: 'unlike' });
    const wheel = await api('GET', '/known-goods?wheel=60-2&limit=100');
    expect(wheel.json.items.length).toBeGreaterThan(0);
    for (const item of wheel.json.items) expect(item.wheelPattern).toBe('60-2');
    const seen: string[] = [];
    let cursor: string | null = null;
    do {
      const next: string = cursor === null ? '' : `&cursor=${cursor}`;
      const page = await api('GET', `/known-goods?state=published&limit=2&fit=${late}${next}`);
      expect(page.status, page.text).toBe(200);
      seen.push(...page.json.items.map((item: { id: string; engine: { make: string } }) => item.engine.make));
      cursor = page.json.nextCursor;
    } while (cursor !== null);
    expect(seen.at(-1)).toBe('Unlike');
    expect(
      (await api('GET', `/known-goods?cursor=${Buffer.from('["x","y"]').toString('base64url')}`)).status,
    ).toBe(422);
  });

  it('finds the nearest shapes with distance and reason, and says when a signal has none', async () => {
    const near = await api('POST', `/captures/${late}/nearest`, { signal: 0, limit: 3 });
    expect(near.status, near.text).toBe(200);
    expect(near.json.items.length).toBeGreaterThan(0);
    const distances = near.json.items.map((item: { distance: number }) => item.distance);
    expect(distances).toEqual([...distances].sort((a, b) => a - b));
    expect(near.json.items[0].why).toMatch(/Alike|Differs/);
    expect((await api('POST', `/captures/${late}/nearest`, { signal: 9 })).status).toBe(422);
    expect((await api('POST', `/captures/${late}/nearest`, { signal: 0, limit: 0 })).status).toBe(422);
  });
});

describe('comparisons', () => {
  it('say belt teeth, keep what is set by hand, and leave the rows as they were', async () => {
    const id = await published(good, { note: 'for teeth' });
    const first = await compared(late, { signal: 1, knownGoodId: id, sprocketTeeth: 20 });
    expect(first.json.text).toContain('1 tooth of the belt or chain at a crank sprocket of 20');
    expect(first.json.camShift.deg).toBeCloseTo(18, 0);
    expect(first.json.says.cannotTell).toMatch(/service information/);
    const patched = await api('PATCH', `/comparisons/${first.json.id}`, { shift: 18, axis: 'deg' });
    expect(patched.status, patched.text).toBe(200);
    const again = await finished(first.json.id);
    expect(again.json.alignment.byHand).toEqual({ shift: 18, axis: 'deg' });
    expect(again.json.rows).toEqual(first.json.rows);
    expect(again.json.shape.parts.length).toBeLessThan(first.json.shape.parts.length);
    const stale = await send('PATCH', `/api/v1/comparisons/${first.json.id}`, {
      headers: { ...desk.headers, 'if-match': '"1"' },
      body: { sprocketTeeth: 24 },
    });
    expect(stale.status).toBe(412);
    const unit = await api('PATCH', `/comparisons/${first.json.id}`, { shift: 3, axis: null });
    expect(unit.status).toBe(422);
    const list = await api('GET', `/comparisons?captureId=${late}`);
    expect(list.json.items.map((row: { id: string }) => row.id)).toContain(first.json.id);
  });

  it('refuse crank with coil, and a band of fewer than three', async () => {
    const coil = await ready(await sample('coil-primary-burn.csv'), 'Coil');
    const crossed = await api('POST', `/captures/${late}/comparisons`, { signal: 0, captureId: coil });
    expect(crossed.status).toBe(422);
    expect(crossed.json.error.details[0].message).toMatch(/holds no crank/);
    const band = await api('POST', `/captures/${coil}/comparisons`, {
      signal: 0,
      band: {
        engine: { make: 'Nobody', model: 'None' },
        circuit: 'coil-primary-voltage',
        condition: 'cranking',
      },
    });
    expect(band.status).toBe(409);
  });

  it('lay lowest and highest of a band over the degrees', async () => {
    const engine = { make: 'Banded', model: 'Three' };
    for (const note of ['a', 'b', 'c']) await published(good, { engine, note });
    const found = await compared(late, {
      signal: 1,
      band: { engine, circuit: 'cam-hall', condition: 'cranking' },
    });
    expect(found.json.other).toMatchObject({ kind: 'band', n: 3 });
    expect(found.json.overlay.low.length).toBe(found.json.overlay.here.length);
    expect(found.json.overlay.difference.length).toBe(found.json.overlay.here.length);
  });
});
