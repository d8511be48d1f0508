import { describe, expect, it } from 'vitest';
import type { DecodedWindow } from './decode-window.ts';
import { PLAIN_SETUP } from './lane-setup.ts';
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
    const [a, b] = layLanes([line(0), line(1)], 404, null, { ...PLAIN_SETUP, weights: new Map([[0, 3]]) });
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

  it('are turned over in a lane that stands upside down', () => {
    const [lane] = layLanes([line(0)], 200, null, { ...PLAIN_SETUP, inverted: new Set([0]) });
    expect(yOf(lane!, lane!.low)).toBe(0);
    expect(yOf(lane!, lane!.high)).toBe(200);
    expect(valueAtY(lane!, yOf(lane!, 0.25))).toBeCloseTo(0.25, 12);
  });
});

describe('layLanes() with an overview', () => {
  const overview: DecodedWindow = {
    layout: 'columns',
    from: 0,
    to: 1,
    count: 1,
    samplesVersion: 1,
    signals: new Map([
      [0, new Float32Array([0, -1, 1, 0])],
      [1, new Float32Array([0, -8, 10, 0])],
      [2, new Float32Array([0, 0, 100, 0])],
    ]),
  };
  const lines = [line(0), line(1), { ...line(2), signal: { ...line(2).signal, unit: 'A' } }];

  it('gives each lane its own scale, or lanes of one unit a common one', () => {
    const own = layLanes(lines, 900, overview);
    expect(own[0]!.high).toBeLessThan(2);
    const common = layLanes(lines, 900, overview, { ...PLAIN_SETUP, common: true });
    expect([common[0]!.low, common[0]!.high]).toEqual([common[1]!.low, common[1]!.high]);
    expect([common[1]!.low, common[1]!.high]).toEqual([own[1]!.low, own[1]!.high]);
    expect([common[2]!.low, common[2]!.high]).toEqual([own[2]!.low, own[2]!.high]);
  });
});
