import { describe, expect, it } from 'vitest';
import type { ColumnsWindow, SamplesWindow } from './decode-window.ts';
import { nearestValue, spanStatistics, valueUnder } from './span-statistics.ts';
import type { PlotSignal } from './types.ts';

const signal: PlotSignal = { index: 0, name: 'Coil', circuit: 'other', unit: 'V', factor: 2, offset: 1 };
const ramp: SamplesWindow = {
  layout: 'samples',
  from: 0,
  to: 1,
  count: 11,
  samplesVersion: 1,
  holds: false,
  even: true,
  times: Float64Array.from({ length: 11 }, (_, i) => i / 10),
  signals: new Map([[0, Float32Array.from({ length: 11 }, (_, i) => i)]]),
};

describe('spanStatistics()', () => {
  it('gives count, mean, extremes and difference of a ramp in the signal’s unit', () => {
    const s = spanStatistics(ramp, signal, 0.2, 0.8);
    expect(s).toEqual({
      n: 7,
      lowest: 5,
      highest: 17,
      atStart: 5,
      atEnd: 17,
      mean: 11,
      difference: 12,
    });
  });

  it('leaves holes out of the mean and says nothing of an empty span', () => {
    const values = Float32Array.from([0, Number.NaN, 4]);
    const window = { ...ramp, count: 3, signals: new Map([[0, values]]) };
    expect(spanStatistics(window, signal, 0, 1)).toMatchObject({ n: 2, mean: 5 });
    expect(spanStatistics(window, signal, 0.6, 0.9)).toMatchObject({ n: 0, mean: null, lowest: null });
  });

  it('weighs by time where steps are uneven: held values as long as they hold, straight lines between points', () => {
    const plain = { ...signal, factor: 1, offset: 0 };
    const uneven: SamplesWindow = {
      ...ramp,
      even: false,
      to: 10,
      count: 3,
      times: Float64Array.from([0, 1, 10]),
      signals: new Map([[0, Float32Array.from([0, 10, 10])]]),
    };
    // 0 for 1 s, then 10 for 9 s; drawn straight: 5 on average over the first second.
    expect(spanStatistics({ ...uneven, holds: true }, plain, 0, 10).mean).toBeCloseTo(9, 12);
    expect(spanStatistics(uneven, plain, 0, 10).mean).toBeCloseTo(9.5, 12);
    expect(spanStatistics(uneven, plain, 0.5, 1).mean).toBeCloseTo(7.5, 12);
  });

  it('has no mean and no difference while only columns are at hand', () => {
    const columns: ColumnsWindow = {
      layout: 'columns',
      from: 0,
      to: 2,
      count: 2,
      samplesVersion: 1,
      signals: new Map([[0, Float32Array.from([0, -1, 3, 1, 1, 1, 2, 2])]]),
    };
    expect(spanStatistics(columns, signal, 0, 2)).toEqual({
      n: null,
      lowest: -1,
      highest: 7,
      atStart: null,
      atEnd: null,
      mean: null,
      difference: null,
    });
    expect(valueUnder(columns, signal, 0.5)).toEqual({ lowest: -1, highest: 7 });
  });
});

describe('nearestValue()', () => {
  it('takes the nearer sample, and the one before where values hold', () => {
    expect(nearestValue(ramp, signal, 0.26)).toBe(7);
    expect(nearestValue({ ...ramp, holds: true }, signal, 0.26)).toBe(5);
  });
});
