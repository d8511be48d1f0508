import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { measureFuelPumpCurrent } from '../../src/engine/circuits/fuel-pump-current.ts';
import { measureStarterCurrent } from '../../src/engine/circuits/starter-current.ts';
import { measureSupplyVoltage } from '../../src/engine/circuits/supply-voltage.ts';
import { type Recording, record, type Starter, starterAmperes } from './fixtures/simulate.ts';
import { codesOf, numberOf, valueFor } from './fixtures/values.ts';

const clean: Recording = { rateHz: 10_000, durationS: 2.5, noise: 2, seed: 4 };
const even: Starter = { startS: 0.1, inrush: 520, level: 160, hump: 50, rateHz: 6.667, shares: [1] };
const measure = (recording: Recording, starter: Starter, cylinders: number | null = 4) =>
  measureStarterCurrent(record('starter-current', 'A', recording, starterAmperes(starter)), cylinders);

describe('measureStarterCurrent()', () => {
  it('gives 6.67 compressions a second for four cylinders at 200 rev/min: n / 60 · N / 2', () => {
    const found = measure(clean, even);
    expect(Math.abs(numberOf(found, 'compression_rate') - 6.667)).toBeLessThan(0.03);
    expect(Math.abs(numberOf(found, 'rpm_mean') - 200)).toBeLessThan(1);
    expect(codesOf(found)).toEqual([]);
  });
  it('gives 10 compressions a second for a V8 at 150 rev/min (NASA Tech Briefs 21269)', () => {
    const found = measure(clean, { ...even, rateHz: 10 }, 8);
    expect(Math.abs(numberOf(found, 'compression_rate') - 10)).toBeLessThan(0.05);
    expect(Math.abs(numberOf(found, 'rpm_mean') - 150)).toBeLessThan(0.75);
  });
  it('gives inrush and the mean over whole humps', () => {
    const found = measure({ ...clean, noise: 0.5 }, even);
    expect(Math.abs(numberOf(found, 'inrush_peak') - 495)).toBeLessThan(3);
    expect(Math.abs(numberOf(found, 'cranking_mean') - 160)).toBeLessThan(1.6);
    expect(valueFor(found, 'inrush_peak').evidence[0]!.from).toBeCloseTo(0.1, 2);
  });
  it('shows even compression as even and a weak one as negative, in order', () => {
    for (const one of valueFor(measure(clean, even), 'compression_balance').value as number[]) {
      expect(Math.abs(one)).toBeLessThan(6);
    }
    const weak = measure(clean, { ...even, shares: [1, 1, 0.5, 1] });
    const balance = valueFor(weak, 'compression_balance').value as number[];
    expect(balance).toHaveLength(4);
    expect(Math.min(...balance)).toBeLessThan(-30);
    expect(balance.filter((one) => one < 0)).toHaveLength(1);
    expect(codesOf(weak)).toContain('uneven-compression');
    expect(Math.abs(numberOf(weak, 'compression_rate') - 6.667)).toBeLessThan(0.07);
  });
  it('keeps its place past a cylinder without any compression', () => {
    const dead = measure(clean, { ...even, shares: [1, 0, 1, 1] });
    expect(Math.abs(numberOf(dead, 'compression_rate') - 6.667)).toBeLessThan(0.1);
    expect(Math.min(...(valueFor(dead, 'compression_balance').value as number[]))).toBeLessThan(-70);
  });
  it('knows no speed and no balance without the number of cylinders', () => {
    const found = measure(clean, even, null);
    expect(valueFor(found, 'rpm_mean').reason).toContain('cylinders');
    expect(valueFor(found, 'compression_balance').reason).toContain('cylinders');
    expect(numberOf(found, 'compression_rate')).toBeGreaterThan(6);
  });
  it('gives no inrush where the capture begins while the starter turns', () => {
    const found = measure({ ...clean, startS: 0.8 }, even);
    expect(valueFor(found, 'inrush_peak').value).toBeNull();
    expect(Math.abs(numberOf(found, 'compression_rate') - 6.667)).toBeLessThan(0.05);
  });
  it('leaves out what follows when the starter is let go', () => {
    const volts = starterAmperes(even);
    const found = measureStarterCurrent(
      record('starter-current', 'A', { ...clean, durationS: 3.5 }, (t) => (t < 2.4 ? volts(t) : 3)),
      4,
    );
    expect(Math.abs(numberOf(found, 'cranking_mean') - 160)).toBeLessThan(2);
    expect(Math.abs(numberOf(found, 'compression_rate') - 6.667)).toBeLessThan(0.05);
  });
  it('turns a reversed clamp round', () => {
    const found = measure({ ...clean, factor: -1 }, even);
    expect(numberOf(found, 'inrush_peak')).toBeGreaterThan(480);
    expect(codesOf(found)).toContain('clamp-reversed');
  });
  it('says null where no compression stands out: even current, noise, a capture too short', () => {
    for (const found of [
      measure({ ...clean, noise: 6 }, { ...even, hump: 0 }),
      measure({ ...clean, durationS: 0.35 }, even),
    ]) {
      expect(valueFor(found, 'compression_rate').value).toBeNull();
      expect(valueFor(found, 'compression_balance').value).toBeNull();
      expect(codesOf(found)).toContain('no-humps');
    }
  });
  it('gives a reason and a notice where no starter current flows', () => {
    const found = measure(clean, { ...even, startS: 99 });
    expect(found.values.every((value) => value.value === null && value.reason)).toBe(true);
    expect(codesOf(found)).toEqual(['flat-line']);
  });
  it('is right at any speed, with noise and commutator ripple, for 3 to 8 cylinders', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(3, 4, 5, 6, 8),
        fc.double({ min: 90, max: 320, noNaN: true }),
        fc.integer({ min: 1, max: 10_000 }),
        (cylinders, rpm, seed) => {
          const rateHz = (rpm * cylinders) / 120;
          const amperes = starterAmperes({ ...even, rateHz });
          const ripple = (t: number) => amperes(t) + (t > 0.1 ? 8 * Math.sin(2 * Math.PI * 730 * t) : 0);
          const found = measureStarterCurrent(
            record('starter-current', 'A', { ...clean, durationS: 3, noise: 6, seed }, ripple),
            cylinders,
          );
          expect(Math.abs(numberOf(found, 'rpm_mean') / rpm - 1)).toBeLessThan(0.01);
          expect(Math.abs(numberOf(found, 'cranking_mean') - 160)).toBeLessThan(3);
        },
      ),
      { numRuns: 25 },
    );
  });
});

describe('measureSupplyVoltage()', () => {
  // Rest 12.6 V, inrush dip to 7.4 V, plateau about 10.3 V with compressions; the shape of a crank, values invented.
  const crank = (t: number) => {
    const since = t - 0.4;
    if (since < 0 || t > 2.6) return 12.6;
    return (
      10.3 -
      2.9 * Math.exp(-since / 0.05) +
      0.25 * Math.cos(2 * Math.PI * 6.6 * since) * (1 - Math.exp(-since / 0.05))
    );
  };
  it('gives rest, lowest and the mean of the plateau', () => {
    const found = measureSupplyVoltage(
      record('supply-voltage', 'V', { ...clean, noise: 0.03, durationS: 3.2 }, crank),
    );
    expect(Math.abs(numberOf(found, 'rest_level') - 12.6)).toBeLessThan(0.05);
    expect(Math.abs(numberOf(found, 'lowest') - 7.4)).toBeLessThan(0.12);
    expect(Math.abs(numberOf(found, 'cranking_mean') - 10.3)).toBeLessThan(0.08);
    expect(codesOf(found)).toEqual([]);
  });
  it('notices the dip of ISO 7637-2:2004 pulse 4 (7 V below rest for 40 ms) and not that of 4 V for 15 ms', () => {
    const pulse = (drop: number, lengthS: number) => (t: number) =>
      t < 0.5 ? 12 : t < 0.5 + lengthS ? 12 - drop : t < 2 ? 9.5 : 12;
    const deep = measureSupplyVoltage(
      record('supply-voltage', 'V', { ...clean, noise: 0.02 }, pulse(7, 0.04)),
    );
    expect(codesOf(deep)).toContain('deep-dip');
    expect(numberOf(deep, 'lowest')).toBeCloseTo(5, 0);
    expect(deep.notices[0]!.evidence[0]!.to - deep.notices[0]!.evidence[0]!.from).toBeCloseTo(0.04, 3);
    const shallow = measureSupplyVoltage(
      record('supply-voltage', 'V', { ...clean, noise: 0.02 }, pulse(4, 0.015)),
    );
    expect(codesOf(shallow)).toEqual([]);
    expect(Math.abs(numberOf(shallow, 'cranking_mean') - 9.5)).toBeLessThan(0.05);
  });
  it('gives the level and no cranking for a steady supply', () => {
    const found = measureSupplyVoltage(
      record('supply-voltage', 'V', { ...clean, noise: 0.05, hum: 0.05 }, () => 12.4),
    );
    expect(numberOf(found, 'rest_level')).toBeCloseTo(12.4, 1);
    expect(valueFor(found, 'cranking_mean').value).toBeNull();
  });
  it('gives no rest level where the capture begins while cranking', () => {
    const found = measureSupplyVoltage(
      record('supply-voltage', 'V', { ...clean, noise: 0.03, startS: 0.9, durationS: 1.5 }, crank),
    );
    expect(valueFor(found, 'rest_level').value).toBeNull();
    expect(Math.abs(numberOf(found, 'cranking_mean') - 10.3)).toBeLessThan(0.08);
  });
  it('notices a forgotten factor and a line near zero', () => {
    expect(
      codesOf(measureSupplyVoltage(record('supply-voltage', 'V', { ...clean, noise: 0.01 }, () => 1.24))),
    ).toEqual(['probe-factor']);
    expect(
      codesOf(measureSupplyVoltage(record('supply-voltage', 'V', { ...clean, noise: 0.01 }, () => 0.02))),
    ).toEqual(['near-zero']);
  });
});

describe('measureFuelPumpCurrent()', () => {
  const pump = (rateHz: number) => (t: number) =>
    5.5 + 0.5 * Math.abs(Math.sin(Math.PI * rateHz * t)) + 0.15 * Math.sin((2 * Math.PI * rateHz * t) / 8);
  const quick: Recording = { rateHz: 50_000, durationS: 0.6, noise: 0.04, seed: 6 };
  it('gives mean, ripple rate and speed: 60 · rate / 8 for eight bars, the usual count (common practice, no source)', () => {
    const found = measureFuelPumpCurrent(record('fuel-pump-current', 'A', quick, pump(680)));
    expect(Math.abs(numberOf(found, 'mean') - (5.5 + 1 / Math.PI))).toBeLessThan(0.03);
    expect(Math.abs(numberOf(found, 'ripple_rate') - 680)).toBeLessThan(2);
    expect(Math.abs(numberOf(found, 'pump_speed') - 5100)).toBeLessThan(15);
    expect(codesOf(found)).toEqual(['bar-count']);
  });
  it('counts two ripples a bar where the count is odd', () => {
    const found = measureFuelPumpCurrent(record('fuel-pump-current', 'A', quick, pump(700)), 7);
    expect(Math.abs(numberOf(found, 'pump_speed') - 3000)).toBeLessThan(10);
  });
  it('gives no rate without ripple, at too low a sample rate, and for a pump that does not run', () => {
    expect(
      valueFor(measureFuelPumpCurrent(record('fuel-pump-current', 'A', quick, () => 5)), 'ripple_rate').value,
    ).toBeNull();
    const slow = measureFuelPumpCurrent(
      record('fuel-pump-current', 'A', { ...quick, rateHz: 500 }, pump(680)),
    );
    expect(valueFor(slow, 'ripple_rate').reason).toContain('too few');
    const off = measureFuelPumpCurrent(record('fuel-pump-current', 'A', { ...quick, noise: 0.02 }, () => 0));
    expect(valueFor(off, 'pump_speed').value).toBeNull();
    expect(codesOf(off)).toEqual(['flat-line']);
  });
});
