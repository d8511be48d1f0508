import { describe, expect, it } from 'vitest';
import { laneAtY, layLanes, stackHeight, valueAtY, yOf } from './lanes.ts';

const line = (index: number) => ({
  signal: { index, name: `s${index}`, circuit: 'other', unit: 'V', factor: 1, offset: 0 },
  role: 'other',
  dash: [],
});

describe('layLanes()', () => {
  it('shares the height and never goes under 96 px', () => {
    const two = layLanes([line(0), line(1)], 504, null);
    expect(two.map((lane) => lane.height)).toEqual([250, 250]);
    expect(stackHeight(two)).toBe(504);
    expect(stackHeight(layLanes([line(0), line(1), line(2)], 100, null))).toBe(3 * 96 + 8);
  });

  it('gives a heavier lane more', () => {
    const [a, b] = layLanes([line(0), line(1)], 404, null, new Map([[0, 3]]));
    expect(a!.height).toBe(300);
    expect(b!.height).toBe(100);
  });
});

describe('yOf() and valueAtY()', () => {
  it('are each other’s inverse', () => {
    const [, lane] = layLanes([line(0), line(1)], 504, null);
    expect(valueAtY(lane!, yOf(lane!, 0.25))).toBeCloseTo(0.25, 12);
    expect(laneAtY([lane!], yOf(lane!, 0))).toBe(lane);
  });
});
