import { describe, expect, it } from 'vitest';
import { bandBar, rowText } from './row-text.ts';

const row = {
  key: 'cam_rising_angles',
  part: 1,
  unit: 'deg',
  here: 72,
  reference: 57,
  low: 56.1,
  high: 58,
  n: 6,
  verdict: 'outside' as const,
  why: '',
};

describe('rowText()', () => {
  it('names the part and signs the difference', () => {
    expect(rowText(row)).toMatchObject({
      label: 'Rising edge 1',
      here: '72.0',
      band: '56.1 to 58.0',
      difference: '+15.0',
      unit: '°',
    });
  });

  it('takes angles the shorter way round 720 degrees', () => {
    expect(rowText({ ...row, here: 5, reference: 712 }).difference).toBe('+13.0');
    expect(rowText({ ...row, here: 712, reference: 5 }).difference).toBe('−13.0');
  });

  it('says none and leaves the difference out where a side has no number', () => {
    expect(rowText({ ...row, here: null })).toMatchObject({ here: 'none', difference: '' });
    expect(rowText({ ...row, key: 'wheel_pattern', part: null, here: '60-2', reference: '36-1' }).here).toBe(
      '60−2',
    );
  });
});

describe('bandBar()', () => {
  it('puts here beside the band in order, and gives none without a band', () => {
    const bar = bandBar(row)!;
    expect(bar.low).toBeLessThan(bar.high);
    expect(bar.high).toBeLessThan(bar.here);
    expect(bandBar({ ...row, low: null })).toBeNull();
  });
});
