import { describe, expect, it } from 'vitest';
import { evenWheel } from '../testing/even-wheel.ts';
import { degreesAt, lastAtOrBefore, timeAtDegrees, turnAt, turnSpeedRpm } from './degrees.ts';

// 60-2 at 200 rev/min: 5 ms a tooth period, 15 ms across the gap (arithmetic, ../shared/measurements.md).
const wheel = evenWheel({ rpm: 200, turns: 3, firstMarkS: 0.1 });

describe('degreesAt() and timeAtDegrees()', () => {
  it('give 6 degrees a tooth and 18 across the gap of a 60-2 wheel', () => {
    expect(degreesAt(wheel, 0.1)).toBeCloseTo(0, 9);
    expect(degreesAt(wheel, 0.105)).toBeCloseTo(6, 9);
    expect(degreesAt(wheel, 0.1 + 57 * 0.005)).toBeCloseTo(342, 9);
    expect(degreesAt(wheel, 0.1 + 57 * 0.005 + 0.0075)).toBeCloseTo(351, 9);
    expect(timeAtDegrees(wheel, 360)).toBeCloseTo(0.4, 9);
  });

  it('are each other’s inverse inside the tooth events', () => {
    for (let degrees = 0; degrees <= 1000; degrees += 13.7) {
      expect(degreesAt(wheel, timeAtDegrees(wheel, degrees)!)).toBeCloseTo(degrees, 7);
    }
  });

  it('are null where no tooth was seen, and for a wheel without teeth', () => {
    expect(degreesAt(wheel, 0.05)).toBeNull();
    expect(degreesAt(wheel, 5)).toBeNull();
    expect(degreesAt({ places: null, teethPerTurn: 0, marksS: [], teethS: [], teethDeg: [] }, 0)).toBeNull();
  });
});

describe('turnAt() and turnSpeedRpm()', () => {
  it('count complete turns from the first reference mark', () => {
    expect(turnAt(wheel, 0.09)).toBeNull();
    expect(turnAt(wheel, 0.1)).toBe(0);
    expect(turnAt(wheel, 0.45)).toBe(1);
    expect(turnAt(wheel, 1.0)).toBeNull();
    expect(turnSpeedRpm(wheel, 1)).toBeCloseTo(200, 9);
    expect(turnSpeedRpm(wheel, 3)).toBeNull();
  });
});

describe('lastAtOrBefore()', () => {
  it('finds the entry at or before x, -1 before the first', () => {
    expect(lastAtOrBefore([1, 2, 4], 0)).toBe(-1);
    expect(lastAtOrBefore([1, 2, 4], 2)).toBe(1);
    expect(lastAtOrBefore([1, 2, 4], 9)).toBe(2);
  });
});
