import { describe, expect, it } from 'vitest';
import type { SamplesWindow } from './decode-window.ts';
import { nearestEdge, nearestPeak, nearestTooth } from './snap.ts';
import { evenWheel } from './testing.ts';

const window = (values: number[], step = 0.1): SamplesWindow => ({
  layout: 'samples',
  from: 0,
  to: (values.length - 1) * step,
  count: values.length,
  samplesVersion: 1,
  holds: false,
  even: true,
  times: Float64Array.from(values, (_, i) => i * step),
  signals: new Map([[0, Float32Array.from(values)]]),
});

describe('nearestEdge()', () => {
  it('lies where the straight line between two samples passes half-way', () => {
    expect(nearestEdge(window([0, 0, 1, 4, 4, 0]), 0, 0.1)).toBeCloseTo(0.2 + 0.1 / 3, 12);
    expect(nearestEdge(window([0, 0, 1, 4, 4, 0]), 0, 0.5)).toBeCloseTo(0.45, 12);
  });

  it('is none on a flat trace, across a hole, or in a signal that is not there', () => {
    expect(nearestEdge(window([2, 2, 2]), 0, 0.1)).toBeNull();
    expect(nearestEdge(window([0, Number.NaN, 4]), 0, 0.1)).toBeNull();
    expect(nearestEdge(window([0, 4]), 7, 0.1)).toBeNull();
  });
});

describe('nearestPeak()', () => {
  it('is the farthest sample of the swing that holds the place, up or down', () => {
    const swing = window([0, 3, 5, 3, 0, -3, -4, -3, 0, 5, 0]);
    expect(nearestPeak(swing, 0, 0.15)).toBeCloseTo(0.2, 12);
    expect(nearestPeak(swing, 0, 0.5)).toBeCloseTo(0.6, 12);
    expect(nearestPeak(window([1, 1, 1]), 0, 0.1)).toBeNull();
  });
});

describe('nearestTooth()', () => {
  it('is the tooth event nearest in time', () => {
    const wheel = evenWheel({ rpm: 200, turns: 1 });
    expect(nearestTooth(wheel, 0.0274)).toBeCloseTo(0.025, 9);
    expect(nearestTooth({ ...wheel, teethS: [] }, 0)).toBeNull();
  });
});
