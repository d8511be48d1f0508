import { describe, expect, it } from 'vitest';
import { evenWheel } from '../plot/testing.ts';
import { whereOf } from './where-of.ts';

const wheel = evenWheel({ rpm: 200, turns: 3, firstMarkS: 0.1 });

describe('whereOf()', () => {
  it('says turn and angle where a wheel is known, else seconds, and how long a range is', () => {
    const point = { kind: 'point' as const, from: 0.51, to: null };
    expect(whereOf(point, wheel)).toBe('turn 2 at 132°');
    expect(whereOf(point, null)).toBe('0.5100 s');
    expect(whereOf({ kind: 'range', from: 0.02, to: 0.03 }, wheel)).toBe('0.0200 s, 10.0 ms long');
    expect(whereOf({ kind: 'level', from: 0, to: null }, wheel)).toBe('level');
  });
});
