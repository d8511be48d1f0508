/**
 * Real recordings, decoded as their README says (../shared/recordings/README.md). Source: FOME-Tech/fome-fw, commit
 * a2ea8b936c, unit_tests/tests/trigger/resources. Read in place; skipped with a message where the folder is absent.
 */
import { describe, expect, test } from 'vitest';
import { changesOnly, column, evenAxis, measure, number, sharedFile, table, value } from './crank-support.ts';

const recording = (title: string, file: string, check: (rows: number[][]) => void) =>
  test(title, (context) => {
    const text = sharedFile('recordings', file);
    if (text === null) return context.skip('skipped: recordings not present');
    check(table(text, ','));
  });

describe('measureCapture() decodes real recordings', () => {
  recording(
    'a two-wire 60-2 pick-up in volts: 58 teeth, 15 to 16 turns, 160 to 161.5 rev/min',
    'vr-60-2-volts-a.csv',
    (rows) => {
      const found = measure(evenAxis(rows), [['crank-vr', column(rows, 1)]]);
      expect(value(found, 'wheel_pattern').value).toBe('60-2');
      expect(number(found, 'teeth_present')).toBe(58);
      expect(number(found, 'rev_count')).toBeGreaterThanOrEqual(15);
      expect(number(found, 'rev_count')).toBeLessThanOrEqual(16);
      expect(number(found, 'rpm_mean')).toBeGreaterThan(160);
      expect(number(found, 'rpm_mean')).toBeLessThan(161.5);
      // 3.4 to 3.6 periods on the tooth's own edge, 2.0 to 2.1 on the other.
      expect(number(found, 'gap_ratio')).toBeGreaterThan(3.4);
      expect(number(found, 'gap_ratio')).toBeLessThan(3.6);
    },
  );

  recording(
    'the same with the leads swapped has the other polarity and the same turns',
    'vr-60-2-volts-a.csv',
    (rows) => {
      const volts = column(rows, 1);
      const plain = measure(evenAxis(rows), [['crank-vr', volts]]);
      const turned = measure(evenAxis(rows), [['crank-vr', volts.map((v) => -v)]]);
      expect(new Set([value(plain, 'polarity').value, value(turned, 'polarity').value])).toEqual(
        new Set(['normal', 'inverted']),
      );
      expect(number(turned, 'rev_count')).toBe(number(plain, 'rev_count'));
      expect(number(turned, 'rpm_mean')).toBeCloseTo(number(plain, 'rpm_mean'), 3);
    },
  );

  recording(
    'eight logic lines: 43 turns of 60-2, 259 to 263 while cranking, near 1689 at the end',
    'edges-60-2-eight-lines.csv',
    (rows) => {
      const found = measure(changesOnly(rows), [['crank-hall', column(rows, 1)]]);
      expect(value(found, 'wheel_pattern').value).toBe('60-2');
      expect(number(found, 'rev_count')).toBe(43);
      const marks = found.wheel!.marksS;
      const speeds = marks.slice(1).map((mark, k) => 60 / (mark - marks[k]!));
      const cranking = speeds.filter((rpm) => rpm >= 259 && rpm <= 263);
      expect(cranking.length).toBeGreaterThan(3);
      expect(speeds.at(-1)!).toBeGreaterThan(1680);
      expect(speeds.at(-1)!).toBeLessThan(1698);
    },
  );

  recording(
    '36-2-1 with its cam: 33 teeth, gaps of 3.0 and 2.0, 1402 to 1436 rev/min',
    'edges-36-2-1-cam.csv',
    (rows) => {
      const found = measure(changesOnly(rows), [
        ['crank-hall', column(rows, 1)],
        ['cam-hall', column(rows, 2)],
      ]);
      expect(value(found, 'wheel_pattern').value).toBe('36-2-1');
      expect(number(found, 'teeth_present')).toBe(33);
      const ratios = [...(value(found, 'gap_ratio').value as number[])].sort();
      expect(ratios[0]).toBeCloseTo(2, 1);
      expect(ratios[1]).toBeCloseTo(3, 1);
      const speed = value(found, 'rpm_mean');
      expect(speed.min).toBeGreaterThan(1401);
      expect(speed.max).toBeLessThan(1437);
      expect(number(found, 'edges_per_cycle')).toBe(2);
    },
  );

  recording(
    '12 + 1 teeth without spark plugs: 13 edges a turn at 188.6 rev/min',
    'edges-12-plus-1.csv',
    (rows) => {
      const found = measure(changesOnly(rows), [['crank-hall', column(rows, 1)]]);
      expect(value(found, 'wheel_pattern').value).toBe('12+1');
      expect(number(found, 'teeth_present')).toBe(13);
      expect(number(found, 'teeth_missing')).toBe(0);
      expect(number(found, 'rpm_mean')).toBeCloseTo(188.6, 1);
    },
  );

  recording(
    '4 crank teeth and 3 cam lobes: 8 crank and 3 cam rising edges in 720 degrees',
    'edges-4-tooth-cam-3.csv',
    (rows) => {
      const found = measure(changesOnly(rows), [
        ['crank-hall', column(rows, 1)],
        ['cam-hall', column(rows, 2)],
      ]);
      expect(value(found, 'wheel_pattern').value).toBe('4');
      expect(number(found, 'teeth_present')).toBe(4);
      expect(value(found, 'cam_rising_angles').value).toHaveLength(3);
    },
  );

  recording(
    'the 4 teeth without the cam are not counted: a reason instead',
    'edges-4-tooth-cam-3.csv',
    (rows) => {
      const found = measure(changesOnly(rows), [['crank-hall', column(rows, 1)]]);
      expect(value(found, 'wheel_pattern').value).toBeNull();
      expect(value(found, 'wheel_pattern').reason).toBeTruthy();
      expect(value(found, 'rpm_mean').value).toBeNull();
    },
  );

  recording('36-2 with noise: 34 teeth a turn, mean 316.5 rev/min', 'edges-36-2-noisy.csv', (rows) => {
    const found = measure(changesOnly(rows), [['crank-hall', column(rows, 1)]]);
    expect(value(found, 'wheel_pattern').value).toBe('36-2');
    expect(number(found, 'teeth_present')).toBe(34);
    expect(number(found, 'rpm_mean')).toBeCloseTo(316.5, 1);
  });
});
