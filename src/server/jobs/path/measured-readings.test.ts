import { describe, expect, it } from 'vitest';
import type { Value } from '../../../engine/value.ts';
import { type MeasuredCapture, measuredReadings } from './measured-readings.ts';

const value = (key: string, one: Value['value'], unit: string): Value => ({
  key,
  value: one,
  unit,
  evidence: [],
  ...(one === null ? { reason: 'no event' } : {}),
});
const capture = (
  circuit: MeasuredCapture['signals'][number]['circuit'],
  values: Value[],
  comparisons: MeasuredCapture['comparisons'] = [],
): MeasuredCapture => ({
  captureId: 'c1',
  title: 'Cranking',
  signals: [{ name: 'A', circuit, values }],
  comparisons,
});

describe('measuredReadings()', () => {
  it('fills cranking speed and says from which capture, signal and key', () => {
    const [speed] = measuredReadings([capture('crank-vr', [value('rpm_mean', 205, 'rpm')])]);
    expect(speed).toMatchObject({
      check: 'cranking',
      reading: 'speed',
      value: 205,
      unit: 'rpm',
      captureId: 'c1',
      from: 'Cranking, A: rpm_mean',
      finding: 'usual',
    });
  });

  it('takes the speed of a running engine for no cranking speed', () => {
    const filled = measuredReadings([capture('crank-vr', [value('rpm_mean', 850, 'rpm')])]);
    expect(filled.filter(({ check }) => check === 'cranking')).toEqual([]);
  });

  it('leaves a value that is null empty', () => {
    expect(measuredReadings([capture('supply-voltage', [value('rest_level', null, 'V')])])).toEqual([]);
  });

  it('sees pulses, but does not judge a flat line', () => {
    expect(measuredReadings([capture('coil-command', [value('pulse_count', 11, '1')])])[0]?.finding).toBe(
      'pulses',
    );
    expect(measuredReadings([capture('coil-command', [value('pulse_count', 0, '1')])])[0]).toMatchObject({
      finding: null,
      remark: expect.stringContaining('flat line'),
    });
  });

  it('calls a wheel with an irregular tooth irregular, a clean one regular', () => {
    const wheel = (teeth: Value['value']) =>
      measuredReadings([
        capture('crank-vr', [
          value('wheel_pattern', '60-2', ''),
          value('irregular_teeth', teeth, ''),
          value('rpm_mean', 200, 'rpm'),
        ]),
      ]);
    expect(wheel([]).find(({ check }) => check === 'crank-trace')?.finding).toBe('regular');
    expect(
      wheel([{ tooth: 23, height_ratio: 0.31, spacing_ratio: null }]).find(
        ({ check }) => check === 'crank-trace',
      )?.finding,
    ).toBe('irregular');
  });

  it('takes the shift of the cam from a comparison, round the cycle', () => {
    const rows = [{ key: 'cam_rising_angles', verdict: 'outside', here: 5, reference: 715, unit: 'deg' }];
    expect(measuredReadings([capture('cam-hall', [], [{ rows }])])[0]).toMatchObject({
      check: 'cam-phase',
      value: 10,
      finding: 'outside',
    });
  });
});
