import { describe, expect, it } from 'vitest';
import type { MeasurementsJson } from '../../contract/areas/captures.ts';
import { evenWheel } from '../plot/testing.ts';
import { stepsOf } from './steps-of.ts';

type Values = MeasurementsJson['signals'][number]['values'];

const measured = (values: Values): MeasurementsJson => ({
  capture: 'c',
  revision: 1,
  engine: '1',
  stale: false,
  signals: [{ index: 0, circuit: 'coil-primary-voltage', values, notices: [] }],
  relations: [],
});
const firing = (from: number) => ({ from, to: from + 0.01 });

describe('stepsOf()', () => {
  it('goes through the firings of a coil, each with its switch-off as the origin of time', () => {
    const [steps] = stepsOf(
      null,
      measured([
        { key: 'firing_count', value: 3, unit: '1', evidence: [firing(0.1), firing(0.4), firing(0.7)] },
        {
          key: 'dwell',
          value: 4,
          unit: 'ms',
          evidence: [0.1, 0.4, 0.7].map((from) => ({ from, to: from + 0.004 })),
        },
      ]),
    );
    expect(steps?.word).toBe('Firing');
    expect(steps?.stretches).toHaveLength(3);
    expect(steps?.originsS?.[1]).toBeCloseTo(0.404, 9);
  });

  it('names turns before firings, and says when a long list was thinned out', () => {
    const found = stepsOf(
      evenWheel({ turns: 3 }),
      measured([{ key: 'firing_count', value: 400, unit: '1', evidence: [firing(0.1), firing(0.2)] }]),
    );
    expect(found.map(({ word, total }) => [word, total])).toEqual([
      ['Turn', 3],
      ['Firing', 400],
    ]);
    expect(found[1]?.originsS).toBeNull();
  });

  it('finds nothing where nothing repeats', () => {
    expect(stepsOf(null, undefined)).toEqual([]);
    expect(
      stepsOf(null, measured([{ key: 'firing_count', value: 0, unit: '1', evidence: [{ from: 0, to: 1 }] }])),
    ).toEqual([]);
    expect(
      stepsOf(null, measured([{ key: 'pulse_count', value: null, unit: '1', reason: 'flat', evidence: [] }])),
    ).toEqual([]);
  });
});
