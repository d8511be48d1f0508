import { describe, expect, it } from 'vitest';
import { shadeOf } from './shade-of.ts';

describe('shadeOf()', () => {
  it('takes the value farthest from half-way, so that a spike is not averaged away', () => {
    expect(shadeOf(0, 0, -1, 1)).toBe(0.5);
    expect(shadeOf(0, 1, -1, 1)).toBe(1);
    expect(shadeOf(-0.8, 0.5, -1, 1)).toBeCloseTo(0.1, 12);
  });

  it('is none without a value or a scale, and never leaves 0 to 1', () => {
    expect(shadeOf(Number.NaN, Number.NaN, 0, 1)).toBeNull();
    expect(shadeOf(1, 1, 1, 1)).toBeNull();
    expect(shadeOf(5, 9, 0, 1)).toBe(1);
  });
});
