import { describe, expect, it } from 'vitest';
import { circularDifference, pairAngles } from './circular.ts';

describe('circularDifference()', () => {
  it('takes the short way round the 720 degree cycle', () => {
    expect(circularDifference(5, 715)).toBe(10);
    expect(circularDifference(715, 5)).toBe(-10);
    expect(circularDifference(360, 0)).toBe(360);
  });
});

describe('pairAngles()', () => {
  const reference = [57, 297, 537];

  it('pairs equal lists without a difference', () => {
    expect(pairAngles(reference, reference)?.map((pair) => pair.difference)).toEqual([0, 0, 0]);
  });

  it('gives one shift for a cam that slipped back past the mark and so begins with another edge', () => {
    const early = [5, 245, 485].map((angle) => (angle - 18 + 720) % 720).sort((a, b) => a - b);
    expect(pairAngles(early, [5, 245, 485])?.map((pair) => pair.difference)).toEqual([-18, -18, -18]);
  });

  it('undoes a cycle counted from the other mark', () => {
    const other = reference.map((angle) => (angle + 360 + 3) % 720).sort((a, b) => a - b);
    expect(pairAngles(other, reference)?.map((pair) => Math.round(pair.difference))).toEqual([3, 3, 3]);
  });

  it('is null for lists of different length and for empty ones', () => {
    expect(pairAngles([1, 2], [1])).toBeNull();
    expect(pairAngles([], [])).toBeNull();
  });
});
