import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildPyramid, summarize } from '../../../engine/signal/pyramid.ts';
import type { StoredAxis } from '../../db/schema.ts';
import { encodePyramid, encodeTimesPyramid, pyramidLayout } from '../../storage/pyramid-file.ts';
import { asFloat32, asFloat64 } from '../../storage/typed-bytes.ts';
import { buildWindow } from './build-window.ts';
import type { WindowSource } from './window-source.ts';

/** A source over arrays that goes through the files' bytes, as the store's does, and counts what is read of them. */
function memorySource(axis: StoredAxis, samples: Float32Array, timesS = new Float64Array(0)) {
  const places = pyramidLayout(samples.length);
  const pyramid = encodePyramid(samples.length, buildPyramid(samples));
  const times = encodeTimesPyramid(timesS);
  const read = { samples: 0, blocks: 0 };
  const source: WindowSource = {
    axis,
    async samples(_signal, from, to) {
      read.samples += to - from;
      return samples.subarray(from, to);
    },
    async blocks(_signal, level, from, to) {
      read.blocks += to - from;
      const { offset } = places[level]!;
      return asFloat32(pyramid.subarray(offset + from * 16, offset + to * 16));
    },
    async times(from, to) {
      return timesS.subarray(from, to);
    },
    async blockTimes(level, from, to) {
      const { timesOffset } = places[level]!;
      return asFloat64(times.subarray(timesOffset + from * 8, timesOffset + to * 8));
    },
  };
  return { source, read };
}

const even = (count: number, stepS = 0.001, startS = 0): StoredAxis => ({
  kind: 'even',
  startS,
  stepS,
  count,
});

const noise = (count: number, seed = 1) => {
  let state = seed;
  return Float32Array.from({ length: count }, () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32 - 0.5;
  });
};

const values = (body: Uint8Array) => asFloat32(body);

describe('buildWindow() on an even axis', () => {
  it('gives the samples themselves when there are fewer than four a column', async () => {
    const samples = noise(1000);
    const { source } = memorySource(even(1000), samples);
    const { headers, body } = await buildWindow(source, { from: 0.1, to: 0.2, columns: 50, signals: [0] });
    expect(headers).toMatchObject({
      'Gapmark-Layout': 'samples',
      'Gapmark-Count': '101',
      'Gapmark-Axis': 'even',
      'Gapmark-Start': '0.1',
      'Gapmark-Step': '0.001',
    });
    expect(values(body)).toEqual(samples.slice(100, 201));
  });

  it('gives each column the first, extremes in time order and last of exactly its samples below the pyramid', async () => {
    const samples = noise(1000);
    const { source } = memorySource(even(1000), samples);
    const { headers, body } = await buildWindow(source, { from: 0, to: 0.999, columns: 10, signals: [0] });
    expect(headers).toMatchObject({ 'Gapmark-Layout': 'columns', 'Gapmark-Count': '10' });
    for (let column = 0; column < 10; column += 1) {
      const expected = summarize(samples, column * 100, (column + 1) * 100);
      expect([...values(body).subarray(column * 4, column * 4 + 4)]).toEqual([...expected]);
    }
  });

  it('keeps every column’s one-sample spike at any window and width, and shows no value that is not in the samples', async () => {
    const samples = noise(200_000);
    const spikes = [0, 777, 70_001, 131_072, 199_999];
    for (const at of spikes) samples[at] = 100 + at / 1e6;
    const { source } = memorySource(even(200_000), samples);
    await fc.assert(
      fc.asyncProperty(
        fc.integer({ min: 0, max: 199_999 }),
        fc.integer({ min: 0, max: 199_999 }),
        fc.integer({ min: 1, max: 300 }),
        async (a, b, columns) => {
          const [low, high] = a < b ? [a, b] : [b, a];
          const request = { from: low * 0.001, to: high * 0.001, columns, signals: [0] };
          const { body } = await buildWindow(source, request);
          const stretch = samples.subarray(low, high + 1);
          const shown = values(body);
          const there = new Set(stretch);
          expect(shown.every((value) => there.has(value))).toBe(true);
          // Of spikes that share a column the highest is drawn; bounds of columns move by less than a column.
          const inside = spikes.filter((at) => at >= low && at <= high);
          const column = (high - low + 1) / columns;
          const higherNearby = (at: number) => inside.some((other) => other > at && other - at < 2 * column);
          for (const at of inside) if (!higherNearby(at)) expect(shown).toContain(samples[at]);
          // The outer ends are exact.
          expect(shown[0]).toBe(stretch[0]);
          expect(shown.at(-1)).toBe(stretch.at(-1));
        },
      ),
      { numRuns: 60 },
    );
  });

  it('reads a few blocks of the fittest level, and of the samples only the two ends', async () => {
    const count = 4_000_000;
    const { source, read } = memorySource(even(count), noise(count));
    await buildWindow(source, { from: 0.0125, to: 3_999.5, columns: 1000, signals: [0] });
    expect(read.samples).toBeLessThan(2 * 64);
    expect(read.blocks).toBeLessThan(1000 * 16 + 100);
  });

  it('says nothing outside of the capture and cuts at its ends', async () => {
    const samples = noise(100);
    const { source } = memorySource(even(100, 0.01, -0.5), samples);
    const outside = await buildWindow(source, { from: 5, to: 6, columns: 10, signals: [0] });
    expect([outside.headers['Gapmark-Count'], outside.body.length]).toEqual(['0', 0]);
    const over = await buildWindow(source, { from: -9, to: 9, columns: 100, signals: [0] });
    expect(over.headers).toMatchObject({
      'Gapmark-Count': '100',
      'Gapmark-Start': '-0.5',
      'Gapmark-From': '-0.5',
    });
    expect(values(over.body)).toEqual(samples);
  });

  it('keeps a hole a hole, and a column of nothing but holes four of them', async () => {
    const samples = noise(1000);
    samples.fill(Number.NaN, 100, 300);
    const { source } = memorySource(even(1000), samples);
    const { body } = await buildWindow(source, { from: 0, to: 0.999, columns: 10, signals: [0] });
    expect([...values(body).subarray(4, 12)].every(Number.isNaN)).toBe(true);
    expect(values(body)[12]).toBe(samples[300]);
  });

  it('gives one sample, and no samples, as what they are', async () => {
    const one = await buildWindow(memorySource(even(1), Float32Array.of(7)).source, {
      from: -1,
      to: 1,
      columns: 10,
      signals: [0],
    });
    expect([...values(one.body)]).toEqual([7]);
    const none = await buildWindow(memorySource(even(0), new Float32Array(0)).source, {
      from: -1,
      to: 1,
      columns: 10,
      signals: [0],
    });
    expect(none.headers['Gapmark-Count']).toBe('0');
  });
});

describe('buildWindow() on an uneven axis', () => {
  const timesS = Float64Array.from({ length: 3000 }, (_, i) => i ** 1.5 / 1000);
  const axis = (holds: boolean): StoredAxis => ({
    kind: 'uneven',
    holds,
    count: timesS.length,
    startS: timesS[0]!,
    endS: timesS.at(-1)!,
  });

  it('gives times and samples with one more on either side', async () => {
    const samples = noise(3000);
    const { source } = memorySource(axis(true), samples, timesS);
    const from = (timesS[10]! + timesS[11]!) / 2;
    const to = (timesS[14]! + timesS[15]!) / 2;
    const { headers, body } = await buildWindow(source, { from, to, columns: 100, signals: [0] });
    expect(headers).toMatchObject({ 'Gapmark-Axis': 'holds', 'Gapmark-Count': '6' });
    expect(asFloat64(body.slice(0, 48))).toEqual(timesS.slice(10, 16));
    expect(values(body.slice(48))).toEqual(samples.slice(10, 16));
  });

  it('holds the value before through a column without a change', async () => {
    const count = 400;
    const gap = Float64Array.from({ length: count }, (_, i) => (i < 200 ? i * 0.001 : 10 + i * 0.001));
    const samples = Float32Array.from({ length: count }, (_, i) => (i % 2 ? 5 : 0));
    const stored: StoredAxis = { kind: 'uneven', holds: true, count, startS: 0, endS: gap.at(-1)! };
    const { source } = memorySource(stored, samples, gap);
    const { body } = await buildWindow(source, { from: 0, to: gap.at(-1)!, columns: 20, signals: [0] });
    expect([...values(body).subarray(4 * 5, 4 * 5 + 4)]).toEqual([5, 5, 5, 5]);
  });

  it('gives every column the samples whose times lie in it', async () => {
    const samples = noise(3000);
    const { source } = memorySource(axis(false), samples, timesS);
    const to = timesS.at(-1)!;
    const { body } = await buildWindow(source, { from: 0, to, columns: 100, signals: [0] });
    const first = timesS.findIndex((time) => time >= to * 0.5);
    const end = timesS.findIndex((time) => time >= to * 0.51);
    expect([...values(body).subarray(200, 204)]).toEqual([...summarize(samples, first, end)]);
  });
});
