import { describe, expect, it } from 'vitest';
import type { MeasurementsJson } from '../../contract/areas/captures.ts';
import { evenWheel } from '../plot/testing.ts';
import { crankSpeed } from './crank-speed.ts';

const measured = (value: number | null): MeasurementsJson => ({
  capture: 'c',
  revision: 1,
  engine: '1',
  stale: false,
  signals: [
    {
      index: 0,
      circuit: 'starter-current',
      values: [{ key: 'rpm_mean', value, unit: 'rpm', evidence: [] }],
      notices: [],
    },
  ],
  relations: [],
});

describe('crankSpeed()', () => {
  it('comes from the teeth of the stretch, else from the measured mean', () => {
    const wheel = evenWheel({ rpm: 240, turns: 3 });
    expect(crankSpeed(wheel, undefined, { from: -1, to: 9 })?.hz).toBeCloseTo(4, 9);
    expect(crankSpeed(null, measured(195), { from: 0, to: 1 })).toEqual({ hz: 3.25, from: 'numbers' });
  });

  it('is not told from less than half a turn, or from nothing', () => {
    const wheel = evenWheel({ rpm: 240, turns: 3 });
    expect(crankSpeed(wheel, undefined, { from: 0, to: 0.1 })).toBeNull();
    expect(crankSpeed(null, measured(null), { from: 0, to: 1 })).toBeNull();
  });
});
