import { describe, expect, it } from 'vitest';
import type { Value } from '../value.ts';
import { rowsOf } from './rows.ts';

const value = (key: string, measured: Value['value'], unit = '1'): Value =>
  measured === null
    ? {
        key,
        value: null,
        unit,
        reason: key === 'burn_time' ? 'no burn line' : 'no reference mark',
        evidence: [],
      }
    : { key, value: measured, unit, evidence: [] };

describe('rowsOf()', () => {
  it('calls a speed undecided, since it depends on battery and oil', () => {
    const [row] = rowsOf([value('rpm_mean', 140, 'rpm')], [[value('rpm_mean', 210, 'rpm')]]);
    expect(row?.verdict).toBe('undecided');
  });

  it('gives a row an angle, with the shift of one belt tooth outside', () => {
    const rows = rowsOf(
      [value('cam_rising_angles', [75, 315, 555], 'deg')],
      [[value('cam_rising_angles', [57, 297, 537], 'deg')]],
    );
    expect(rows.map((row) => [row.part, row.verdict])).toEqual([
      [1, 'outside'],
      [2, 'outside'],
      [3, 'outside'],
    ]);
  });

  it('does not decide between two and five degrees on one reference', () => {
    const [row] = rowsOf(
      [value('cam_rising_angles', [60], 'deg')],
      [[value('cam_rising_angles', [57], 'deg')]],
    );
    expect(row?.verdict).toBe('undecided');
  });

  it('says that a missing burn line is outside where the reference burns', () => {
    const [row] = rowsOf([value('burn_time', null, 'ms')], [[value('burn_time', 1.3, 'ms')]]);
    expect(row).toMatchObject({ here: null, reference: 1.3, verdict: 'outside' });
  });

  it('does not decide about another value that is missing here', () => {
    const [row] = rowsOf([value('gap_ratio', null)], [[value('gap_ratio', 3)]]);
    expect(row).toMatchObject({ verdict: 'undecided', why: 'Not had here: no reference mark.' });
  });

  it('names the irregular tooth that no reference has', () => {
    const tooth = [{ tooth: 23, height_ratio: 0.3, spacing_ratio: 1 }];
    const [row] = rowsOf([value('irregular_teeth', tooth)], [[value('irregular_teeth', [])]]);
    expect(row).toMatchObject({ here: '23', reference: 'none', verdict: 'outside' });
  });

  it('makes a band of three references, never of two', () => {
    const good = (level: number) => [value('level_high', level, 'V')];
    const two = rowsOf([value('level_high', 5, 'V')], [good(4.9), good(5)]);
    expect(two[0]).toMatchObject({ low: null, high: null, n: 2 });
    const three = rowsOf([value('level_high', 3, 'V')], [good(4.9), good(5), good(5.1)]);
    expect(three[0]).toMatchObject({ n: 3, verdict: 'outside' });
    expect(three[0]?.low).toBeGreaterThan(4);
  });

  it('leaves out what only counts what happened to be in the capture', () => {
    expect(rowsOf([value('rev_count', 3)], [[value('rev_count', 9)]])).toEqual([]);
  });

  it('does not pair lists of different length', () => {
    const rows = rowsOf(
      [value('cam_rising_angles', [10], 'deg')],
      [[value('cam_rising_angles', [10, 200], 'deg')]],
    );
    expect(rows).toHaveLength(1);
    expect(rows[0]?.verdict).toBe('undecided');
  });
});
