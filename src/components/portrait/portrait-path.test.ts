import { describe, expect, it } from 'vitest';
import { portraitPath, scaleOfBoth } from './portrait-path.ts';

const box = { width: 100, height: 24 };

describe('portraitPath()', () => {
  it('runs from left to right, the highest at the top', () => {
    const path = portraitPath({ from: 0, to: 1, low: 0, high: 5, points: [0, 255, 0] }, box);
    expect(path).toBe('M0.0 22.0L50.0 2.0L100.0 22.0');
  });

  it('lifts the pen at a hole and lays a flat signal in the middle', () => {
    expect(portraitPath({ from: 0, to: 1, low: 2, high: 2, points: [0, null, 0] }, box)).toBe(
      'M0.0 12.0M100.0 12.0',
    );
  });

  it('draws two on one scale, so that a lower one lies lower', () => {
    const scale = scaleOfBoth({ low: 0, high: 10 }, { low: 0, high: 5 });
    expect(portraitPath({ from: 0, to: 1, low: 0, high: 5, points: [255] }, box, scale)).toBe('M0.0 12.0');
  });
});
