/** Simulated captures with their truth (../shared/captures/truth.json), not made by this project. Skipped where absent. */
import { describe, expect, test } from 'vitest';
import type { CaptureFindings } from '../../src/engine/capture.ts';
import { column, evenAxis, measure, number, sharedFile, table, value } from './crank-support.ts';

interface Truth {
  readonly file: string;
  readonly signals: ReadonlyArray<Record<string, unknown>>;
}

const capture = (file: string, check: (text: string, truth: Record<string, unknown>[]) => void) =>
  test(file, (context) => {
    const text = sharedFile('captures', file);
    const truth = sharedFile('captures', 'truth.json');
    if (text === null || truth === null) return context.skip('skipped: captures not present');
    const entry = (JSON.parse(truth) as Truth[]).find((t) => t.file === file)!;
    check(text, [...entry.signals]);
  });

function expectCrank(found: CaptureFindings, truth: Record<string, unknown>, stepS: number): void {
  for (const key of ['wheel_pattern', 'teeth_present', 'teeth_missing', 'rev_count', 'polarity']) {
    if (truth[key] !== undefined) expect(value(found, key).value, key).toBe(truth[key]);
  }
  const rpm = truth.rpm_mean as number;
  expect(Math.abs(number(found, 'rpm_mean') / rpm - 1)).toBeLessThan(0.001);
  expect(Math.abs(found.wheel!.marksS[0]! - (truth.first_reference_mark_s as number))).toBeLessThan(
    2 * stepS,
  );
  expect(value(found, 'irregular_teeth').value).toEqual([]);
}

describe('measureCapture() against the truth of simulated captures', () => {
  capture('crank-60-2-pickup.csv', (text, [truth]) => {
    const rows = table(text, ',');
    expectCrank(measure(evenAxis(rows), [['crank-vr', column(rows, 1)]]), truth!, 2e-5);
  });

  capture('crank-36-1-pickup-reversed.csv', (text, [truth]) => {
    const rows = table(text, ';');
    expectCrank(measure(evenAxis(rows, 1e-3), [['crank-vr', column(rows, 1)]]), truth!, 2.5e-5);
  });

  capture('crank-36-2-three-wire.csv', (text, [truth]) => {
    const rows = table(text, ',');
    const found = measure(evenAxis(rows), [['crank-hall', column(rows, 1)]]);
    expectCrank(found, truth!, 2e-5);
    const span = (truth!.level_high_v as number) - (truth!.level_low_v as number);
    expect(Math.abs(number(found, 'level_low') - (truth!.level_low_v as number))).toBeLessThan(0.01 * span);
    expect(Math.abs(number(found, 'level_high') - (truth!.level_high_v as number))).toBeLessThan(0.01 * span);
  });

  capture('crank-60-2-and-cam.csv', (text, [crank, cam]) => {
    const rows = table(text, '\t');
    const found = measure(evenAxis(rows, 1e-6), [
      ['crank-vr', column(rows, 1)],
      ['cam-hall', column(rows, 2)],
    ]);
    expectCrank(found, crank!, 2e-5);
    expect(number(found, 'edges_per_cycle')).toBe(cam!.edges_per_cycle);
    for (const [key, expected] of [
      ['cam_rising_angles', cam!.rising_angles_mod360],
      ['cam_falling_angles', cam!.falling_angles_mod360],
    ] as const) {
      const got = (value(found, key).value as number[]).map((angle) => angle % 360).sort((a, b) => a - b);
      const wanted = [...(expected as number[])].sort((a, b) => a - b);
      expect(got).toHaveLength(wanted.length);
      got.forEach((angle, k) => {
        expect(Math.abs(angle - wanted[k]!)).toBeLessThan(0.2);
      });
    }
    // The first rising edge after the zero mark comes sooner than after the other one.
    const first = (value(found, 'cam_rising_angles').value as number[])[0]!;
    expect(first).toBeLessThan(360);
  });
});
