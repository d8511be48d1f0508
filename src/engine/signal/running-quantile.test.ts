import { describe, expect, test } from 'vitest';
import { random } from '../testing/random.ts';
import { runningQuantile } from './running-quantile.ts';

describe('runningQuantile()', () => {
  test('gives the order statistic of the window about each place, whole at the ends', () => {
    const rng = random(3);
    const values = Float64Array.from({ length: 200 }, () => Math.round(rng.between(0, 20)));
    for (const [arm, q] of [
      [3, 0.5],
      [8, 0.75],
      [0, 0.5],
    ] as const) {
      const got = runningQuantile(values, arm, q);
      const width = 2 * arm + 1;
      values.forEach((_, k) => {
        const from = Math.min(Math.max(0, k - arm), values.length - width);
        const window = Array.from(values.slice(from, from + width)).sort((a, b) => a - b);
        expect(got[k]).toBe(window[Math.floor((width - 1) * q)]);
      });
    }
  });

  test('of fewer numbers than the window is the same everywhere, of none is empty', () => {
    expect(Array.from(runningQuantile(Float64Array.from([3, 1, 2]), 5, 0.5))).toEqual([2, 2, 2]);
    expect(runningQuantile(new Float64Array(0), 5, 0.5)).toHaveLength(0);
  });
});
