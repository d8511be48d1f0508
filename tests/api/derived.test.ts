import { beforeAll, describe, expect, it } from 'vitest';
import { type Desk, getCapture, makeDesk, settled, uploadCsv } from './capture-kit.ts';
import { origin, send } from './security-kit.ts';

let desk: Desk;
let id: string;

beforeAll(async () => {
  desk = await makeDesk();
  const lines = ['Time (s),A (V),B (V)'];
  for (let i = 0; i < 2000; i += 1)
    lines.push(`${(i / 1000).toFixed(3)},${(i / 100).toFixed(2)},${i % 2 === 0 ? 1 : -1}`);
  id = await uploadCsv(desk, lines.join('\n'), { title: 'Ramp and zigzag' });
  await settled(desk, id);
});

async function derive(derived: unknown[]) {
  const { headers } = await getCapture(desk, id);
  return send('PATCH', `/api/v1/captures/${id}`, {
    headers: { ...desk.headers, 'if-match': headers.etag ?? '' },
    body: { derived },
  });
}

async function windowOf(signal: number): Promise<Float32Array> {
  const query = `from=0&to=1.999&columns=2000&signals=${signal}`;
  const answer = await fetch(new URL(`/api/v1/captures/${id}/window?${query}`, origin), {
    headers: desk.headers,
  });
  expect(answer.status).toBe(200);
  return new Float32Array(await answer.arrayBuffer());
}

describe('PATCH /captures/{id} with derived signals', () => {
  it('makes them beside the recorded ones, with how they were made; windows, numbers and export know them', async () => {
    const before = (await getCapture(desk, id)).json;
    const original = await windowOf(0);
    const answer = await derive([
      { kind: 'derivative', column: -1, of: 1 },
      { kind: 'difference', column: -2, of: 1, less: 2 },
      { kind: 'absolute', column: -3, of: -2 },
      { kind: 'speed', column: -4, of: 1 },
    ]);
    expect(answer.status).toBe(200);
    expect(answer.json.status).toBe('queued');
    const after = await settled(desk, id);
    expect(after.status).toBe('ready');
    expect(after.sha256).toBe(before.sha256);
    expect(after.samplesVersion).toBeGreaterThan(before.samplesVersion);
    expect(
      after.signals.map(({ name, unit, column }: { name: string; unit: string; column: number }) => [
        name,
        unit,
        column,
      ]),
    ).toEqual([
      ['A', 'V', 1],
      ['B', 'V', 2],
      ['A, change', 'V/s', -1],
      ['A − B', 'V', -2],
      ['A − B, without sign', 'V', -3],
      ['Speed from A', 'rpm', -4],
    ]);
    expect(after.signals[2].made).toBe('change of A a second');
    expect(after.signals[5].made).toMatch(/^not made: no trigger wheel/);
    expect(after.signals[0].made).toBeNull();
    expect(await windowOf(0)).toEqual(original);
    // The ramp climbs 10 V a second; float32 of two decimals is good to about a thousandth of that.
    for (const value of (await windowOf(2)).subarray(1, 1999))
      expect(Math.abs(value - 10)).toBeLessThan(0.01);
    expect((await windowOf(3))[100]).toBeCloseTo(0, 6);
    expect((await windowOf(3))[101]).toBeCloseTo(2.01, 5);
    expect([...(await windowOf(5))].every(Number.isNaN)).toBe(true);

    const measured = await send('GET', `/api/v1/captures/${id}/measurements`, { headers: desk.headers });
    expect(measured.json.signals).toHaveLength(6);
    const csv = await (
      await fetch(new URL(`/api/v1/captures/${id}/export?from=0.1&to=0.1`, origin), { headers: desk.headers })
    ).text();
    expect(csv.split('\n')[0]).toContain('A − B (V)');
  });

  it('follow the factor of what they are made from, and go again when taken off the list', async () => {
    const { headers } = await getCapture(desk, id);
    await send('PATCH', `/api/v1/captures/${id}`, {
      headers: { ...desk.headers, 'if-match': headers.etag ?? '' },
      body: { signals: [{ column: 1, factor: 3 }] },
    });
    await settled(desk, id);
    expect((await windowOf(2))[500]).toBeCloseTo(30, 1);
    await derive([]);
    const after = await settled(desk, id);
    expect(after.signals).toHaveLength(2);
    expect(after.derived).toEqual([]);
  });

  it.each([
    [[{ kind: 'absolute', column: -1, of: -2 }], 'derived.0.of'],
    [
      [
        { kind: 'absolute', column: -1, of: 1 },
        { kind: 'absolute', column: -1, of: 2 },
      ],
      'derived.1.column',
    ],
    [[{ kind: 'low-pass', column: -1, of: 1, cutoffHz: 0 }], 'derived.0.cutoffHz'],
    [[{ kind: 'sharpen', column: -1, of: 1 }], 'derived.0.kind'],
  ])('refuses %j and names the field', async (derived, path) => {
    const answer = await derive(derived);
    expect(answer.status).toBe(422);
    expect(answer.json.error.details[0].path).toBe(path);
  });
});
