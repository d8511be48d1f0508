import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { measureCoilPrimaryCurrent } from '../../src/engine/circuits/coil-primary-current.ts';
import { type Charging, coilAmperes, every, type Recording, record } from './fixtures/simulate.ts';
import { codesOf, numberOf, valueFor } from './fixtures/values.ts';

const clean: Recording = { rateHz: 100_000, durationS: 0.35, noise: 0.03, seed: 5 };
const offs = every(5, 0.06, 0.05);
const measure = (recording: Recording, charging: Charging, times = offs) =>
  measureCoilPrimaryCurrent(record('coil-primary-current', 'A', recording, coilAmperes(charging, times)));

describe('coil current: L/R charge at 13.5 V, 0.510 Ω, 7 mH', () => {
  // Supply, resistance and inductance of the test conditions in the data sheet of ST VB027BSP. i = U/R (1 − e^(−tR/L)),
  // so t = −L/R ln(1 − iR/U): 3 A at 1.651 ms, 5 A at 2.873 ms, 7 A at 4.215 ms; i(4 ms) = 6.692 A.
  const sheet = { finalA: 13.5 / 0.51, tauS: 7e-3 / 0.51 };
  it.each([
    [1.651, 3],
    [2.873, 5],
    [4.215, 7],
    [4, 6.692],
  ])('gives %f ms of dwell and %f A', (dwellMs, amperes) => {
    const found = measure({ ...clean, rateHz: 500_000 }, { ...sheet, dwellS: dwellMs / 1000 });
    expect(Math.abs(numberOf(found, 'dwell') - dwellMs)).toBeLessThan(0.002 + 0.002 * dwellMs);
    expect(Math.abs(numberOf(found, 'peak_current') - amperes)).toBeLessThan(0.01 * amperes);
  });
  it('gives L/R = 13.73 ms as the time constant where noise allows, and otherwise no number', () => {
    const quiet = measure({ ...clean, rateHz: 500_000, noise: 0.002 }, { ...sheet, dwellS: 6e-3 });
    expect(Math.abs(numberOf(quiet, 'time_constant') - 13.725)).toBeLessThan(0.3);
    const rough = measure({ ...clean, noise: 0.5 }, { ...sheet, dwellS: 2e-3 });
    expect(valueFor(rough, 'time_constant').value).toBeNull();
  });
});

describe('measureCoilPrimaryCurrent()', () => {
  const usual: Charging = { finalA: 15, tauS: 4e-3, dwellS: 3.5e-3 };
  const peak = 15 * -Math.expm1(-3.5 / 4);

  it('fits the rise and says that nothing is limited', () => {
    const found = measure(clean, usual);
    expect(numberOf(found, 'firing_count')).toBe(5);
    expect(Math.abs(numberOf(found, 'dwell') - 3.5)).toBeLessThan(0.01 + 0.007);
    expect(Math.abs(numberOf(found, 'peak_current') - peak)).toBeLessThan(0.01 * peak);
    expect(Math.abs(numberOf(found, 'time_constant') - 4)).toBeLessThan(0.12);
    expect(valueFor(found, 'current_limited').value).toBe(false);
    expect(codesOf(found)).toEqual([]);
  });
  it('takes the zero of the clamp off and turns a reversed clamp round', () => {
    const shifted = measure({ ...clean, offset: 0.8 }, usual);
    expect(Math.abs(numberOf(shifted, 'peak_current') - peak)).toBeLessThan(0.01 * peak);
    expect(codesOf(shifted)).toContain('clamp-zero');
    const turned = measure({ ...clean, factor: -1 }, usual);
    expect(Math.abs(numberOf(turned, 'peak_current') - peak)).toBeLessThan(0.01 * peak);
    expect(numberOf(turned, 'firing_count')).toBe(5);
    expect(codesOf(turned)).toContain('clamp-reversed');
  });
  it('gives the mean of the flat where the driver holds the current', () => {
    const found = measure({ ...clean, noise: 0.08 }, { ...usual, dwellS: 5e-3, limitA: 7.5 });
    expect(valueFor(found, 'current_limited').value).toBe(true);
    expect(Math.abs(numberOf(found, 'peak_current') - 7.5)).toBeLessThan(0.05);
    expect(Math.abs(numberOf(found, 'dwell') - 5)).toBeLessThan(0.02);
    expect(codesOf(found)).toContain('current-limited');
  });
  it('tells a curve that has run up to its own end from a limiter', () => {
    const found = measure(clean, { finalA: 4, tauS: 0.8e-3, dwellS: 6e-3 });
    expect(valueFor(found, 'current_limited').value).toBe(true);
    expect(codesOf(found)).toContain('early-flat');
    expect(codesOf(found)).not.toContain('current-limited');
  });
  it('notices a step at the start, and measures the dwell from it', () => {
    const found = measure(clean, { ...usual, stepA: 3 });
    expect(codesOf(found)).toContain('current-step');
    expect(Math.abs(numberOf(found, 'dwell') - 3.5)).toBeLessThan(0.02);
  });
  it('does not take a spike at the switch-off for the peak', () => {
    const signal = record('coil-primary-current', 'A', clean, coilAmperes(usual, offs));
    for (const off of offs) signal.values[Math.round(off * 100_000) - 1] = 14;
    expect(Math.abs(numberOf(measureCoilPrimaryCurrent(signal), 'peak_current') - peak)).toBeLessThan(
      0.01 * peak,
    );
  });
  it('leaves the dwell of a charge out that the capture does not show from its start', () => {
    const found = measure({ ...clean, startS: 0.048 }, usual);
    expect(numberOf(found, 'firing_count')).toBe(5);
    expect(valueFor(found, 'dwell').n).toBe(4);
    expect(numberOf(measure({ ...clean, durationS: 0.289 }, usual), 'firing_count')).toBe(4);
  });
  it('measures one charge that fills the capture', () => {
    const found = measure({ ...clean, startS: 0.0455, durationS: 0.006 }, usual);
    expect(numberOf(found, 'firing_count')).toBe(1);
    expect(Math.abs(numberOf(found, 'dwell') - 3.5)).toBeLessThan(0.02);
  });
  it('counts nothing in a flat trace and in holes', () => {
    const flat = measure({ ...clean, hum: 0.03 }, { ...usual, finalA: 0 });
    expect(numberOf(flat, 'firing_count')).toBe(0);
    expect(codesOf(flat)).toEqual(['flat-line']);
    const holes = measureCoilPrimaryCurrent({
      ...record('coil-primary-current', 'A', clean, () => Number.NaN),
    });
    expect(holes.values.every((value) => value.value === null && value.reason)).toBe(true);
  });
  it('stays right with noise, hum and 8-bit steps, whatever coil and dwell', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 8, max: 25, noNaN: true }),
        fc.double({ min: 2, max: 12, noNaN: true }),
        fc.double({ min: 2, max: 6, noNaN: true }),
        fc.integer({ min: 1, max: 10_000 }),
        (finalA, tauMs, dwellMs, seed) => {
          const charging = { finalA, tauS: tauMs / 1000, dwellS: dwellMs / 1000 };
          const top = finalA * -Math.expm1(-dwellMs / tauMs);
          const found = measure(
            { ...clean, seed, noise: 0.01 * top, hum: 0.005 * top, eightBit: [-1.2 * top, 1.3 * top] },
            charging,
          );
          expect(numberOf(found, 'firing_count')).toBe(5);
          expect(Math.abs(numberOf(found, 'dwell') - dwellMs)).toBeLessThan(0.01 + 0.02 * dwellMs);
          expect(Math.abs(numberOf(found, 'peak_current') - top)).toBeLessThan(0.015 * top);
          const tau = valueFor(found, 'time_constant').value;
          if (typeof tau === 'number') expect(Math.abs(tau / tauMs - 1)).toBeLessThan(0.4);
        },
      ),
      { numRuns: 25 },
    );
  });
});
