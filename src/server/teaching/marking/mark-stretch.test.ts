import { describe, expect, it } from 'vitest';
import { longestAllowedS, markStretch } from './mark-stretch.ts';

/** A tooth of 5 ms in two turns of a trace of 1.1 s. */
const teeth = [
  { from: 0.5, to: 0.505 },
  { from: 0.78, to: 0.785 },
];
const mark = (from: number, to: number, atMostS: number | null = null) =>
  markStretch({ from, to }, teeth, atMostS, 1.1);

describe('markStretch()', () => {
  it('is right for a stretch that holds the place in any turn', () => {
    expect(mark(0.49, 0.51).mark).toBe('right');
    expect(mark(0.77, 0.79).mark).toBe('right');
  });
  it('is right for half of the place and wrong for less', () => {
    expect(mark(0.5025, 0.51).mark).toBe('right');
    expect(mark(0.5026, 0.51).mark).toBe('wrong');
  });
  it('is wrong elsewhere, and says so', () => {
    expect(mark(0.6, 0.62)).toEqual({ mark: 'wrong', why: 'lies elsewhere' });
  });
  it('is wrong for a stretch over everything, which points at nothing', () => {
    expect(mark(0, 1.1).why).toMatch(/too long/);
    expect(mark(0.475, 0.526).why).toMatch(/too long/);
  });
  it('follows the author where they say how long is too long', () => {
    expect(mark(0.4, 0.6, 0.3).mark).toBe('right');
    expect(mark(0.49, 0.51, 0.01).mark).toBe('wrong');
  });
});

describe('longestAllowedS()', () => {
  it('lets a long answer be laid half as long again, and a short one ten times', () => {
    expect(longestAllowedS([{ from: 0, to: 0.005 }], 1)).toBeCloseTo(0.05);
    expect(longestAllowedS([{ from: 0, to: 0.1 }], 1)).toBeCloseTo(0.25);
    expect(longestAllowedS([{ from: 0, to: 0.6 }], 1)).toBeCloseTo(0.9);
  });
});
