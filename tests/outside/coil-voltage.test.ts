import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { measureCoilPrimaryVoltage } from '../../src/engine/circuits/coil-primary-voltage.ts';
import { burnTimeOf, COIL, coilVolts, every, type Recording, record } from './fixtures/simulate.ts';
import { codesOf, numberOf, valueFor } from './fixtures/values.ts';

const clean: Recording = { rateHz: 500_000, durationS: 0.35, noise: 0.1, seed: 3 };
const offs = every(5, 0.06, 0.05);
const measure = (recording: Recording, coil = COIL, times = offs) =>
  measureCoilPrimaryVoltage(record('coil-primary-voltage', 'V', recording, coilVolts(coil, times)));

describe('measureCoilPrimaryVoltage()', () => {
  it('measures a clean trace within one sample and 0.2 % in time, 1 % of the span in level, counts exact', () => {
    const found = measure(clean);
    expect(numberOf(found, 'firing_count')).toBe(5);
    expect(numberOf(found, 'firing_interval')).toBeCloseTo(60, 2);
    expect(Math.abs(numberOf(found, 'dwell') - 4.2)).toBeLessThan(0.002 + 0.0084);
    expect(Math.abs(numberOf(found, 'supply_level') - 12.2)).toBeLessThan(0.114);
    expect(Math.abs(numberOf(found, 'on_level') - 1.25)).toBeLessThan(0.114);
    expect(Math.abs(numberOf(found, 'kick_peak') - 260)).toBeLessThan(2.6);
    expect(Math.abs(numberOf(found, 'burn_time') - burnTimeOf(COIL) * 1000)).toBeLessThan(0.002 + 0.0028);
    expect(Math.abs(numberOf(found, 'burn_level') - 42)).toBeLessThan(0.42);
    expect(Math.abs(numberOf(found, 'on_level_slope') - 0.9 / 4.2)).toBeLessThan(0.02);
    expect(numberOf(found, 'missed_firings')).toBe(0);
    expect(codesOf(found)).toEqual([]);
    for (const value of found.values) {
      expect(value.evidence.length).toBeGreaterThan(0);
      for (const { from, to } of value.evidence) expect(to).toBeGreaterThanOrEqual(from);
    }
  });

  it('counts the half swings of the ring above four times the noise', () => {
    const found = measure(clean);
    // Extremes at t = k / (2 f), height 14.9 V · e^(−t/τ): above 0.4 V up to t = τ ln(14.9 / 0.4) = 1.81 ms, k = 11.
    expect(Math.abs(numberOf(found, 'ring_count') - 11)).toBeLessThanOrEqual(1);
  });

  it('keeps its values with noise, hum and 8-bit steps', () => {
    for (const seed of [1, 2, 3, 4]) {
      const found = measure({ ...clean, noise: 0.6, hum: 0.5, seed, eightBit: [-100, 400] });
      expect(numberOf(found, 'firing_count')).toBe(5);
      expect(Math.abs(numberOf(found, 'dwell') - 4.2)).toBeLessThan(0.02);
      expect(Math.abs(numberOf(found, 'burn_time') - burnTimeOf(COIL) * 1000)).toBeLessThan(0.02);
      expect(Math.abs(numberOf(found, 'kick_peak') - 260)).toBeLessThan(5);
    }
  });

  it('finds no burn line and a flat top where the gap does not break down', () => {
    const found = measure(clean, { ...COIL, burnS: 0, kick: 380, flatS: 60e-6 });
    expect(numberOf(found, 'firing_count')).toBe(5);
    expect(numberOf(found, 'dwell')).toBeCloseTo(4.2, 1);
    expect(valueFor(found, 'burn_time')).toMatchObject({ value: null, reason: 'no burn line' });
    expect(valueFor(found, 'burn_level')).toMatchObject({ value: null, reason: 'no burn line' });
    expect(Math.abs(numberOf(found, 'kick_peak') - 380)).toBeLessThan(3.8);
    expect(codesOf(found)).toEqual(expect.arrayContaining(['kick-flat-top', 'no-burn-line']));
    expect(numberOf(found, 'ring_count')).toBeGreaterThan(8);
  });

  it('tells missing firings from the time between those seen', () => {
    const found = measure(
      { ...clean, durationS: 0.8 },
      COIL,
      every(12, 0.06, 0.05).filter((_, k) => k !== 4 && k !== 8 && k !== 9),
    );
    expect(numberOf(found, 'firing_count')).toBe(9);
    expect(numberOf(found, 'missed_firings')).toBe(3);
    expect(codesOf(found)).toContain('missed-firings');
  });

  it('does not take an engine running up for missing firings', () => {
    const times = [0.05, 0.2, 0.3, 0.37, 0.43, 0.49, 0.55, 0.61];
    expect(numberOf(measure({ ...clean, durationS: 0.7 }, COIL, times), 'missed_firings')).toBe(0);
  });

  it('leaves out what the ends of the capture cut', () => {
    const cutStart = measure({ ...clean, startS: 0.048 });
    expect(numberOf(cutStart, 'firing_count')).toBe(5);
    expect(valueFor(cutStart, 'dwell').n).toBe(4);
    expect(valueFor(cutStart, 'burn_time').n).toBe(5);
    const cutEnd = measure({ ...clean, durationS: 0.2905 });
    expect(numberOf(cutEnd, 'firing_count')).toBe(5);
    expect(valueFor(cutEnd, 'burn_time').n).toBe(4);
    expect(numberOf(measure({ ...clean, durationS: 0.289 }), 'firing_count')).toBe(4);
  });

  it('measures a single firing filling the capture', () => {
    const found = measure({ ...clean, startS: 0.045, durationS: 0.012 });
    expect(numberOf(found, 'firing_count')).toBe(1);
    expect(Math.abs(numberOf(found, 'dwell') - 4.2)).toBeLessThan(0.01);
    expect(Math.abs(numberOf(found, 'supply_level') - 12.2)).toBeLessThan(0.12);
    expect(valueFor(found, 'firing_interval').value).toBeNull();
    expect(valueFor(found, 'missed_firings').value).toBeNull();
  });

  it('keeps times and says so where a probe factor is forgotten', () => {
    const found = measure({ ...clean, noise: 0.02, factor: 0.1 });
    expect(Math.abs(numberOf(found, 'dwell') - 4.2)).toBeLessThan(0.01);
    expect(codesOf(found)).toContain('probe-factor');
    expect(found.notices.find((notice) => notice.code === 'probe-factor')?.text).toContain('10:1');
  });

  it('gives no level from an AC-coupled input, but times', () => {
    const found = measure({ ...clean, offset: -12.6 });
    expect(valueFor(found, 'supply_level').value).toBeNull();
    expect(valueFor(found, 'kick_peak').value).toBeNull();
    expect(Math.abs(numberOf(found, 'dwell') - 4.2)).toBeLessThan(0.01);
    expect(codesOf(found)).toContain('ac-coupled');
  });

  it('measures nothing from a trace that is upside down', () => {
    const found = measure({ ...clean, factor: -1 });
    expect(codesOf(found)).toEqual(['upside-down']);
    expect(found.values.every((value) => value.value === null)).toBe(true);
  });

  it('says that a kick is a lower bound at the rail and when too few samples catch it', () => {
    const signal = record(
      'coil-primary-voltage',
      'V',
      { ...clean, eightBit: [-10, 200] },
      coilVolts(COIL, offs),
    );
    expect(codesOf(measureCoilPrimaryVoltage({ ...signal, rail: { low: null, high: 200 } }))).toContain(
      'kick-lower-bound',
    );
    expect(codesOf(measure({ ...clean, rateHz: 50_000 }))).toContain('kick-undersampled');
  });

  it('gives counts of 0, a level and a notice for a steady trace', () => {
    for (const level of [0.02, 12.3]) {
      const found = measureCoilPrimaryVoltage(
        record('coil-primary-voltage', 'V', { ...clean, hum: 0.1 }, () => level),
      );
      expect(numberOf(found, 'firing_count')).toBe(0);
      expect(numberOf(found, 'supply_level')).toBeCloseTo(level, 1);
      expect(valueFor(found, 'dwell').reason).toBeTruthy();
      expect(codesOf(found)).toEqual(['flat-line']);
    }
  });

  it('says nothing from holes and from no samples', () => {
    for (const values of [new Float32Array(), new Float32Array(5000).fill(Number.NaN)]) {
      const found = measureCoilPrimaryVoltage({
        circuit: 'coil-primary-voltage',
        name: '',
        unit: 'V',
        values,
        rail: null,
        axis: { kind: 'even', startS: 0, stepS: 1e-5, count: values.length },
      });
      expect(found.values.every((value) => value.value === null && value.reason)).toBe(true);
    }
  });

  it('measures the release at the jump where the driver limits the current before it', () => {
    const volts = coilVolts(COIL, offs);
    const limited = (t: number) => {
      const off = offs.find((one) => t < one && t >= one - 1.2e-3);
      return off === undefined ? volts(t) : 7.4;
    };
    const found = measureCoilPrimaryVoltage(record('coil-primary-voltage', 'V', clean, limited));
    expect(numberOf(found, 'firing_count')).toBe(5);
    expect(Math.abs(numberOf(found, 'dwell') - 4.2)).toBeLessThan(0.02);
  });

  it('moves with the clock and scales with the volts, and knows no other units', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -50, max: 50, noNaN: true }),
        fc.constantFrom(0.25, 0.5, 2),
        fc.integer({ min: 1, max: 1000 }),
        fc.double({ min: 2, max: 6, noNaN: true }),
        (shiftS, scale, seed, dwellMs) => {
          const coil = { ...COIL, dwellS: dwellMs / 1000 };
          const signal = record(
            'coil-primary-voltage',
            'V',
            { rateHz: 200_000, durationS: 0.2, noise: 0.15, seed },
            coilVolts(coil, every(3, 0.06, 0.03)),
          );
          const plain = measureCoilPrimaryVoltage(signal);
          const moved = measureCoilPrimaryVoltage({
            ...signal,
            values: signal.values.map((value) => value * scale),
            axis: { kind: 'even', startS: shiftS, stepS: 1 / 200_000, count: signal.values.length },
          });
          expect(Math.abs(numberOf(plain, 'dwell') - dwellMs)).toBeLessThan(0.005 + 0.002 * dwellMs);
          expect(valueFor(moved, 'ring_count').value).toEqual(valueFor(plain, 'ring_count').value);
          for (const key of ['firing_count', 'dwell', 'burn_time']) {
            expect(numberOf(moved, key)).toBeCloseTo(numberOf(plain, key), 6);
          }
          for (const key of ['supply_level', 'on_level', 'kick_peak', 'burn_level']) {
            expect(numberOf(moved, key) / scale).toBeCloseTo(numberOf(plain, key), 3);
          }
          expect(valueFor(moved, 'dwell').evidence[0]!.from - shiftS).toBeCloseTo(
            valueFor(plain, 'dwell').evidence[0]!.from,
            6,
          );
        },
      ),
      { numRuns: 15 },
    );
  });
});
