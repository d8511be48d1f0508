import { describe, expect, it } from 'vitest';
import type { Value } from '../../engine/value.ts';
import { evenWheel } from '../plot/testing.ts';
import { numberRows } from './number-rows.ts';

const value = (over: Partial<Value>): Value => ({
  key: 'dwell',
  value: 4.583,
  unit: 'ms',
  evidence: [],
  ...over,
});

describe('numberRows()', () => {
  it('gives label, number, unit, count and spread', () => {
    const [row] = numberRows(value({ n: 11, min: 4.51, max: 4.66 }), null);
    expect(row).toMatchObject({ label: 'Dwell', text: '4.58', unit: 'ms', detail: 'n = 11, 4.51 to 4.66' });
  });

  it('says none with the reason, never a zero', () => {
    const [row] = numberRows(value({ value: null, reason: 'no burn line' }), null);
    expect(row).toMatchObject({ text: null, unit: '', detail: 'no burn line' });
  });

  it('leaves the spread out where it does not show in the digits', () => {
    expect(numberRows(value({ n: 3, min: 4.5831, max: 4.5832 }), null)[0]!.detail).toBe('n = 3');
  });

  it('sets a pattern with a true minus and a ratio with ×', () => {
    expect(numberRows(value({ key: 'wheel_pattern', value: '36-2-2-2', unit: '1' }), null)[0]!.text).toBe(
      '36−2−2−2',
    );
    expect(numberRows(value({ key: 'gap_ratio', value: 2.99, unit: '1' }), null)[0]).toMatchObject({
      text: '2.99',
      unit: '×',
    });
  });

  it('gives each cam edge its own row and evidence, counted from its zero', () => {
    const wheel = evenWheel({ rpm: 200, turns: 4, firstMarkS: 0.1 });
    // Edges at 57 and 297 degrees in two cycles: 0.3 s a turn.
    const at = (degrees: number) => 0.1 + (degrees / 360) * 0.3;
    const rows = numberRows(
      value({
        key: 'cam_rising_angles',
        value: [57, 297],
        unit: 'deg',
        n: 2,
        min: [56.99, 296.99],
        max: [57.01, 297],
        evidence: [57, 777, 297, 1017].map((degrees) => ({ from: at(degrees), to: at(degrees) })),
      }),
      wheel,
    );
    expect(rows.map(({ label }) => label)).toEqual(['Rising edge 1', 'Rising edge 2']);
    expect(rows[1]!.text).toBe('297.0');
    expect(rows[1]!.evidence).toHaveLength(2);
    expect(rows[0]!.evidence[0]!.from).toBeCloseTo(0.1, 9);
    expect(rows[0]!.evidence[0]!.to).toBeCloseTo(at(57), 9);
  });

  it('names irregular teeth, and gives no row where there are none', () => {
    const teeth = value({
      key: 'irregular_teeth',
      value: [{ tooth: 23, height_ratio: 0.31, spacing_ratio: null }],
      unit: '1',
      n: 4,
    });
    expect(numberRows(teeth, null)[0]).toMatchObject({ label: 'Short tooth', text: '23', look: true });
    expect(numberRows(value({ key: 'irregular_teeth', value: [], unit: '1' }), null)).toEqual([]);
  });
});
