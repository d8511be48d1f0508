import { describe, expect, it } from 'vitest';
import { reduceSpectrum } from './reduce.ts';

describe('reduceSpectrum()', () => {
  it('keeps a line of one step among a hundred thousand', () => {
    const amplitude = new Float64Array(100_001).fill(0.01);
    amplitude[61_803] = 5;
    const points = reduceSpectrum({ stepHz: 0.5, amplitude }, 0, 50_000, 800);
    expect(points.length).toBeLessThanOrEqual(1600);
    expect(points.some(([hz, value]) => hz === 61_803 * 0.5 && value === 5)).toBe(true);
    for (let i = 1; i < points.length; i += 1)
      expect(points[i]![0]).toBeGreaterThanOrEqual(points[i - 1]![0]);
  });

  it('gives the steps themselves where there are few, with one beyond each end', () => {
    const points = reduceSpectrum({ stepHz: 1, amplitude: Float64Array.from([0, 1, 2, 3, 4, 5]) }, 2, 3, 500);
    expect(points.map(([hz]) => hz)).toEqual([1, 2, 3, 4]);
  });
});
