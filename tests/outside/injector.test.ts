import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { measureInjectorCurrent } from '../../src/engine/circuits/injector-current.ts';
import { measureInjectorVoltage } from '../../src/engine/circuits/injector-voltage.ts';
import { every, INJECTOR, injectorVolts, type Recording, record } from './fixtures/simulate.ts';
import { codesOf, numberOf, valueFor } from './fixtures/values.ts';

const clean: Recording = { rateHz: 100_000, durationS: 0.55, noise: 0.05, seed: 8 };
const starts = every(4, 0.12, 0.06);
const measure = (recording: Recording, injector = INJECTOR, times = starts) =>
  measureInjectorVoltage(record('injector-voltage', 'V', recording, injectorVolts(injector, times)));

describe('measureInjectorVoltage()', () => {
  it('measures a clean trace within one sample and 0.2 % in time, 1 % of the span in level, counts exact', () => {
    const found = measure(clean);
    expect(numberOf(found, 'pulse_count')).toBe(4);
    expect(Math.abs(numberOf(found, 'pulse_width') - 8.3)).toBeLessThan(0.01 + 0.0166);
    expect(Math.abs(numberOf(found, 'clamp_peak') - 58)).toBeLessThan(0.58);
    expect(Math.abs(numberOf(found, 'supply_level') - 12.4)).toBeLessThan(0.12);
    expect(Math.abs(numberOf(found, 'on_level') - 0.5)).toBeLessThan(0.12);
    expect(valueFor(found, 'hump_time')).toMatchObject({
      value: null,
      reason: 'no hump stands out from the decay',
    });
    expect(codesOf(found)).toEqual([]);
  });
  it('finds the hump of the needle in the decay', () => {
    for (const humpS of [0.8e-3, 1.2e-3, 1.8e-3]) {
      const found = measure(clean, { ...INJECTOR, humpS, hump: 2 });
      expect(Math.abs(numberOf(found, 'hump_time') - humpS * 1000)).toBeLessThan(0.12);
    }
  });
  it('keeps its values with noise, hum and 8-bit steps', () => {
    for (const seed of [1, 2, 3, 4, 5]) {
      const found = measure({ ...clean, noise: 0.5, hum: 0.6, seed, eightBit: [-20, 100] });
      expect(numberOf(found, 'pulse_count')).toBe(4);
      expect(Math.abs(numberOf(found, 'pulse_width') - 8.3)).toBeLessThan(0.03);
      expect(Math.abs(numberOf(found, 'clamp_peak') - 58)).toBeLessThan(2.5);
    }
  });
  it('counts only pulses with both edges in the capture', () => {
    expect(numberOf(measure({ ...clean, startS: 0.062 }), 'pulse_count')).toBe(4 - 1);
    expect(numberOf(measure({ ...clean, durationS: 0.425 }), 'pulse_count')).toBe(3);
  });
  it('bridges a chopped hold and says so', () => {
    const chopped = (t: number) => {
      const start = starts.find((one) => t >= one && t < one + 8.3e-3);
      if (start === undefined) return injectorVolts(INJECTOR, starts)(t);
      const since = t - start;
      return since > 2e-3 && (since * 1e4) % 2 > 1.2 && since < 8.2e-3 ? 13.1 : 0.5;
    };
    const found = measureInjectorVoltage(record('injector-voltage', 'V', clean, chopped));
    expect(numberOf(found, 'pulse_count')).toBe(4);
    expect(Math.abs(numberOf(found, 'pulse_width') - 8.3)).toBeLessThan(0.03);
    expect(codesOf(found)).toContain('chopped');
  });
  it('notices a missing spike, a forgotten factor, AC coupling, a rail and a high on level', () => {
    expect(codesOf(measure(clean, { ...INJECTOR, clamp: 12.4 }))).toContain('no-kick');
    expect(codesOf(measure({ ...clean, noise: 0.01, factor: 0.1 }))).toContain('probe-factor');
    expect(codesOf(measure({ ...clean, offset: -12.9 }))).toContain('ac-coupled');
    expect(codesOf(measure(clean, { ...INJECTOR, on: 2.5 }))).toContain('high-on-level');
    const cut = record(
      'injector-voltage',
      'V',
      { ...clean, eightBit: [-5, 40] },
      injectorVolts(INJECTOR, starts),
    );
    expect(codesOf(measureInjectorVoltage({ ...cut, rail: { low: null, high: 40 } }))).toContain(
      'kick-lower-bound',
    );
  });
  it('counts 0 in a steady trace and gives its level; nothing from holes', () => {
    const found = measureInjectorVoltage(record('injector-voltage', 'V', clean, () => 12.1));
    expect(numberOf(found, 'pulse_count')).toBe(0);
    expect(numberOf(found, 'supply_level')).toBeCloseTo(12.1, 1);
    expect(codesOf(found)).toEqual(['flat-line']);
    const none = measureInjectorVoltage(record('injector-voltage', 'V', clean, () => Number.NaN));
    expect(none.values.every((value) => value.value === null && value.reason)).toBe(true);
  });
  it('is right for any width, clamp and seed, and keeps times when clock and scale change', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1.5, max: 15, noNaN: true }),
        fc.double({ min: 35, max: 90, noNaN: true }),
        fc.integer({ min: 1, max: 10_000 }),
        fc.double({ min: -20, max: 20, noNaN: true }),
        (widthMs, clamp, seed, shiftS) => {
          const injector = { ...INJECTOR, widthS: widthMs / 1000, clamp };
          const signal = record(
            'injector-voltage',
            'V',
            { ...clean, durationS: 0.3, seed },
            injectorVolts(injector, every(2, 0.12, 0.06)),
          );
          const found = measureInjectorVoltage(signal);
          expect(numberOf(found, 'pulse_count')).toBe(2);
          expect(Math.abs(numberOf(found, 'pulse_width') - widthMs)).toBeLessThan(0.01 + 0.002 * widthMs);
          expect(Math.abs(numberOf(found, 'clamp_peak') - clamp)).toBeLessThan(0.01 * clamp);
          const moved = measureInjectorVoltage({
            ...signal,
            values: signal.values.map((v) => v * 2),
            axis: { kind: 'even', startS: shiftS, stepS: 1e-5, count: signal.values.length },
          });
          expect(numberOf(moved, 'pulse_width')).toBeCloseTo(numberOf(found, 'pulse_width'), 6);
        },
      ),
      { numRuns: 20 },
    );
  });
});

describe('measureInjectorCurrent()', () => {
  // Peak 3.85 A and hold 0.94 A of the injector driver in the data sheet of TI LM1949 (SNLS349C).
  const peakAndHold = (t: number) => {
    const start = starts.find((one) => t >= one && t < one + 6e-3);
    if (start === undefined) return 0;
    const since = t - start;
    return since < 1.5e-3
      ? (3.85 * since) / 1.5e-3
      : Math.max(0.94, 3.85 - 2.91 * ((since - 1.5e-3) / 0.4e-3));
  };
  it('gives peak and hold of 3.85 A and 0.94 A', () => {
    const found = measureInjectorCurrent(
      record('injector-current', 'A', { ...clean, noise: 0.01 }, peakAndHold),
    );
    expect(numberOf(found, 'pulse_count')).toBe(4);
    expect(Math.abs(numberOf(found, 'pulse_width') - 6)).toBeLessThan(0.1);
    expect(Math.abs(numberOf(found, 'peak_current') - 3.85)).toBeLessThan(0.06);
    expect(Math.abs(numberOf(found, 'hold_current') - 0.94)).toBeLessThan(0.02);
  });
  // A saturated injector: 14 V over 14 Ω (over 12 Ω, the same data sheet), 2 ms time constant, a dent at 1.4 ms.
  const saturated = (dent: number) => (t: number) => {
    const start = starts.find((one) => t >= one && t < one + 8e-3);
    if (start === undefined) return 0;
    const since = t - start;
    return -Math.expm1(-since / 2e-3) - dent * Math.exp(-(((since - 1.4e-3) / 0.15e-3) ** 2));
  };
  it('gives peak, width and the time of the dent of a saturated injector, either way round', () => {
    for (const factor of [1, -1]) {
      const found = measureInjectorCurrent(
        record('injector-current', 'A', { ...clean, noise: 0.004, factor }, saturated(0.06)),
      );
      expect(numberOf(found, 'pulse_count')).toBe(4);
      expect(Math.abs(numberOf(found, 'pulse_width') - 8)).toBeLessThan(0.12);
      expect(Math.abs(numberOf(found, 'peak_current') - -Math.expm1(-4))).toBeLessThan(0.02);
      expect(Math.abs(numberOf(found, 'hump_time') - 1.4)).toBeLessThan(0.15);
      expect(valueFor(found, 'hold_current').value).toBeNull();
    }
  });
  it('finds no dent where there is none, and nothing in a flat trace', () => {
    const smooth = measureInjectorCurrent(
      record('injector-current', 'A', { ...clean, noise: 0.004 }, saturated(0)),
    );
    expect(valueFor(smooth, 'hump_time').value).toBeNull();
    const flat = measureInjectorCurrent(record('injector-current', 'A', { ...clean, noise: 0.01 }, () => 0));
    expect(numberOf(flat, 'pulse_count')).toBe(0);
    expect(codesOf(flat)).toEqual(['flat-line']);
  });
});
