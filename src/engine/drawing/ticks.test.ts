import { describe, expect, it } from 'vitest';
import { laneRange, multiples, niceStep, valueTicks } from './ticks.ts';

describe('niceStep()', () => {
  it('rises in 1, 2, 5 and takes exact powers as they are', () => {
    expect(niceStep(0.3)).toBeCloseTo(0.5, 12);
    expect(niceStep(1)).toBe(1);
    expect(niceStep(1.1)).toBe(2);
    expect(niceStep(6)).toBe(10);
    expect(niceStep(1e-6)).toBeCloseTo(1e-6, 18);
    expect(niceStep(Number.NaN)).toBe(1);
  });
});

describe('multiples()', () => {
  it('gives integer multiples without drift and a true zero', () => {
    const ticks = multiples(-0.3, 0.3, 0.1);
    expect(ticks).toHaveLength(7);
    expect(Object.is(ticks[3], 0)).toBe(true);
    expect(ticks[6]).toBeCloseTo(0.3, 15);
  });
});

describe('valueTicks()', () => {
  it('stays near the number wanted for volts of pick-ups, logic and kicks', () => {
    for (const [low, high] of [
      [-1.1, 1.1],
      [0, 5.2],
      [-10, 250],
      [11.4, 12.9],
      [-1e30, 1e30],
    ] as const) {
      const { ticks } = valueTicks(low, high);
      expect(ticks.length).toBeGreaterThanOrEqual(2);
      expect(ticks.length).toBeLessThanOrEqual(4);
    }
  });
});

describe('laneRange()', () => {
  it('leaves room, takes zero in when near, and gives a flat line a height', () => {
    expect(laneRange(-1, 1).high).toBeGreaterThan(1);
    expect(laneRange(1, 5).low).toBeLessThan(0);
    expect(laneRange(100, 101).low).toBeGreaterThan(99);
    const flat = laneRange(12, 12);
    expect(flat.high).toBeGreaterThan(12);
    expect(flat.low).toBeLessThan(0);
    expect(laneRange(Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY)).toEqual({ low: -1, high: 1 });
  });
});
