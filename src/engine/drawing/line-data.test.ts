import { describe, expect, it } from 'vitest';
import { buildPyramid, summarize } from '../../engine/signal/pyramid.ts';
import type { ColumnsWindow, SamplesWindow } from './decode-window.ts';
import { extentOf, lineData } from './line-data.ts';
import type { PlotSignal } from './types.ts';

const volts: PlotSignal = { index: 0, name: 'Crank', circuit: 'crank-vr', unit: 'V', factor: 1, offset: 0 };
const columns = (values: number[], from = 0, to = values.length / 4): ColumnsWindow => ({
  layout: 'columns',
  from,
  to,
  count: values.length / 4,
  samplesVersion: 1,
  signals: new Map([[0, Float32Array.from(values)]]),
});
const samples = (times: number[], values: number[], holds = false): SamplesWindow => ({
  layout: 'samples',
  from: times[0] ?? 0,
  to: times[times.length - 1] ?? 0,
  count: times.length,
  samplesVersion: 1,
  holds,
  even: true,
  times: Float64Array.from(times),
  signals: new Map([[0, Float32Array.from(values)]]),
});

describe('lineData()', () => {
  it('draws four points a column in time order, first and last at its ends', () => {
    const { xs, ys } = lineData(columns([0, -1, 5, 2, 2, 2, 3, 3]), volts, false);
    expect(ys).toEqual([0, -1, 5, 2, 2, 2, 3, 3]);
    expect(xs[0]).toBe(0);
    expect(xs[3]).toBe(1);
    expect(xs[4]).toBe(1);
    expect(xs.every((x, i) => i === 0 || x >= xs[i - 1]!)).toBe(true);
  });

  it('keeps a one-sample spike at every zoom', () => {
    const recorded = new Float32Array(100_000);
    recorded[54_321] = 9;
    for (const count of [10, 100, 1000]) {
      const each = recorded.length / count;
      const values = Array.from({ length: count }, (_, c) => [
        ...summarize(recorded, c * each, (c + 1) * each),
      ]).flat();
      expect(Math.max(...(lineData(columns(values), volts, false).ys as number[]))).toBe(9);
    }
    expect(Math.max(...buildPyramid(recorded).at(-1)!.values)).toBe(9);
  });

  it('applies factor and offset, also a negative factor', () => {
    const inverted = { ...volts, factor: -10, offset: 1 };
    expect(lineData(samples([0, 1], [0.5, -0.5]), inverted, false).ys).toEqual([-4, 6]);
    expect(extentOf(samples([0, 1], [0.5, -0.5]), inverted)).toEqual({ lowest: -4, highest: 6 });
  });

  it('breaks the line at a hole, but holds through a column without rows of a changes-only capture', () => {
    const nan = Number.NaN;
    const window = columns([1, 1, 1, 1, nan, nan, nan, nan, 2, 2, 2, 2]);
    expect(lineData(window, volts, false).ys).toEqual([1, 1, 1, 1, null, 2, 2, 2, 2]);
    expect(lineData(window, volts, true).ys).toEqual([1, 1, 1, 1, 2, 2, 2, 2]);
    expect(lineData(samples([0, 1, 2], [1, nan, 2]), volts, false).ys).toEqual([1, null, 2]);
  });

  it('gives nothing for a signal that the window does not hold', () => {
    expect(lineData(columns([]), { ...volts, index: 9 }, false)).toEqual({ xs: [], ys: [] });
  });
});

describe('extentOf()', () => {
  it('finds lowest and highest in all or in a stretch, null where all is holes', () => {
    const window = columns([0, -1, 5, 2, 2, 2, 3, 3]);
    expect(extentOf(window, volts)).toEqual({ lowest: -1, highest: 5 });
    expect(extentOf(window, volts, 1.1, 1.9)).toEqual({ lowest: 2, highest: 3 });
    expect(extentOf(samples([0, 1], [Number.NaN, Number.NaN]), volts)).toBeNull();
  });
});
