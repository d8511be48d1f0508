import { describe, expect, it } from 'vitest';
import { timeScale } from './time-scale.ts';

describe('timeScale()', () => {
  it('labels seconds far from zero and milliseconds near it', () => {
    expect(timeScale({ from: 1, to: 2 }, 800).labels[0]!.text).toBe('1.0 s');
    expect(timeScale({ from: -0.005, to: 0.004 }, 900).labels.map((label) => label.text)).toContain('0 ms');
  });

  it('stands labels at least 70 px apart and fills the width with fields', () => {
    for (const span of [1e-5, 0.003, 0.7, 12, 4000]) {
      const { labels, fields } = timeScale({ from: 3, to: 3 + span }, 800);
      for (let i = 1; i < labels.length; i += 1)
        expect(labels[i]!.at - labels[i - 1]!.at).toBeGreaterThan(70);
      expect(fields[0]!.from).toBeCloseTo(0, 6);
      expect(fields.at(-1)!.to).toBeCloseTo(800, 6);
    }
  });
});
