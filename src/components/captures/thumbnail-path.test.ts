import { describe, expect, it } from 'vitest';
import type { DecodedWindow } from '../plot/decode-window.ts';
import { thumbnailPath, valueRange } from './thumbnail-path.ts';

const frame = { width: 100, top: 0, height: 10 };
const columns = (values: number[]): DecodedWindow => ({
  layout: 'columns',
  from: 0,
  to: 1,
  count: values.length / 4,
  samplesVersion: 1,
  signals: new Map([[0, Float32Array.from(values)]]),
});
const samples = (times: number[], values: number[], holds = false): DecodedWindow => ({
  layout: 'samples',
  from: times[0] ?? 0,
  to: times.at(-1) ?? 0,
  count: times.length,
  samplesVersion: 1,
  holds,
  even: true,
  times: Float64Array.from(times),
  signals: new Map([[0, Float32Array.from(values)]]),
});

describe('thumbnailPath()', () => {
  it('keeps a one-sample spike: each column gives its four points', () => {
    const path = thumbnailPath(columns([0, 9, 0, 0, 0, 0, 0, 0]), 0, 1, frame);
    expect(path.match(/[ML]/g)).toHaveLength(8);
    expect(path).toContain(' 0.0');
  });
  it('fills the frame from lowest to highest', () => {
    expect(thumbnailPath(samples([0, 1], [2, 4]), 0, 1, frame)).toBe('M0.0 10.0L100.0 0.0');
  });
  it('turns over with a negative factor', () => {
    expect(thumbnailPath(samples([0, 1], [2, 4]), 0, -1, frame)).toBe('M0.0 0.0L100.0 10.0');
  });
  it('breaks the line at a hole', () => {
    expect(thumbnailPath(samples([0, 1, 2], [0, Number.NaN, 1]), 0, 1, frame).match(/M/g)).toHaveLength(2);
  });
  it('draws steps where values hold until the next row', () => {
    expect(thumbnailPath(samples([0, 1], [0, 1], true), 0, 1, frame)).toBe('M0.0 10.0L100.0 10.0L100.0 0.0');
  });
  it('lays a flat signal in the middle and draws nothing for holes, an unknown signal or no samples', () => {
    expect(thumbnailPath(samples([0, 1], [5, 5]), 0, 1, frame)).toBe('M0.0 5.0L100.0 5.0');
    expect(thumbnailPath(samples([0, 1], [Number.NaN, Number.NaN]), 0, 1, frame)).toBe('');
    expect(thumbnailPath(samples([0, 1], [1, 2]), 3, 1, frame)).toBe('');
    expect(thumbnailPath(samples([], []), 0, 1, frame)).toBe('');
  });
});

describe('valueRange()', () => {
  it('leaves holes out and says null when there is nothing else', () => {
    expect(valueRange(Float32Array.from([Number.NaN, -1, 3]))).toEqual({ low: -1, high: 3 });
    expect(valueRange(Float32Array.from([Number.NaN]))).toBeNull();
  });
});
