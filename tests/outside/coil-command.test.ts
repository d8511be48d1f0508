import { describe, expect, it } from 'vitest';
import { measureCoilCommand } from '../../src/engine/circuits/coil-command.ts';
import { measureOther } from '../../src/engine/circuits/other.ts';
import { every, type Recording, record } from './fixtures/simulate.ts';
import { codesOf, numberOf, valueFor } from './fixtures/values.ts';

const clean: Recording = { rateHz: 50_000, durationS: 0.35, noise: 0.03, seed: 2 };
const starts = every(5, 0.06, 0.05);
const pulses = (low: number, high: number, widthS: number) => (t: number) =>
  starts.some((start) => t >= start && t < start + widthS) ? high : low;
const measure = (recording: Recording, of: (t: number) => number) =>
  measureCoilCommand(record('coil-command', 'V', recording, of));

describe('measureCoilCommand()', () => {
  it('gives width, count and levels of high pulses', () => {
    const found = measure(clean, pulses(0.1, 4.9, 3.3e-3));
    expect(numberOf(found, 'pulse_count')).toBe(5);
    expect(Math.abs(numberOf(found, 'dwell') - 3.3)).toBeLessThan(0.02 + 0.0066);
    expect(Math.abs(numberOf(found, 'level_low') - 0.1)).toBeLessThan(0.048);
    expect(Math.abs(numberOf(found, 'level_high') - 4.9)).toBeLessThan(0.048);
    expect(valueFor(found, 'active_state').value).toBe('high');
    expect(codesOf(found)).toEqual([]);
  });
  it('takes the state held for less time as the active one', () => {
    const found = measure(clean, pulses(12.1, 0.4, 3.3e-3));
    expect(valueFor(found, 'active_state').value).toBe('low');
    expect(Math.abs(numberOf(found, 'dwell') - 3.3)).toBeLessThan(0.02 + 0.0066);
    expect(codesOf(found)).toContain('active-low');
  });
  it('counts only pulses with both edges in the capture', () => {
    expect(numberOf(measure({ ...clean, startS: 0.051 }, pulses(0, 5, 3e-3)), 'pulse_count')).toBe(4);
    expect(numberOf(measure({ ...clean, durationS: 0.291 }, pulses(0, 5, 3e-3)), 'pulse_count')).toBe(4);
  });
  it('keeps its numbers with noise, 8-bit steps and spikes from the ignition', () => {
    const signal = record(
      'coil-command',
      'V',
      { ...clean, rateHz: 200_000, noise: 0.25, eightBit: [-10, 10] },
      pulses(0.1, 4.9, 3.3e-3),
    );
    for (const start of starts) signal.values[Math.round((start + 0.0035) * 200_000)] = 9;
    const found = measureCoilCommand(signal);
    expect(numberOf(found, 'pulse_count')).toBe(5);
    expect(Math.abs(numberOf(found, 'dwell') - 3.3)).toBeLessThan(0.02);
    expect(codesOf(found)).toContain('short-spikes');
  });
  it('counts 0 in a steady trace, says nothing from holes', () => {
    const flat = measure({ ...clean, hum: 0.05 }, () => 0.02);
    expect(numberOf(flat, 'pulse_count')).toBe(0);
    expect(codesOf(flat)).toEqual(['flat-line']);
    expect(measure(clean, () => Number.NaN).values.every((value) => value.value === null)).toBe(true);
  });
  it('reads changes only as steps that hold until the next row', () => {
    const timesS = Float64Array.from([0, 0.01, 0.013, 0.07, 0.0732, 0.1]);
    const found = measureCoilCommand({
      circuit: 'coil-command',
      name: '',
      unit: '1',
      rail: null,
      values: Float32Array.from([0, 1, 0, 1, 0, 0]),
      axis: { kind: 'uneven', timesS, holds: true },
    });
    expect(numberOf(found, 'pulse_count')).toBe(2);
    expect(numberOf(found, 'dwell')).toBeCloseTo(3.1, 9);
    expect(valueFor(found, 'dwell')).toMatchObject({ n: 2 });
  });
});

describe('measureOther()', () => {
  it('gives extremes, mean and rms of a sine', () => {
    // Derived: a sine of amplitude a about m has mean m and rms √(m² + a²/2).
    const found = measureOther(
      record(
        'other',
        'kPa',
        { rateHz: 10_000, durationS: 1 },
        (t) => 40 + 10 * Math.sin(2 * Math.PI * 20 * t),
      ),
    );
    expect(numberOf(found, 'mean')).toBeCloseTo(40, 3);
    expect(numberOf(found, 'rms')).toBeCloseTo(Math.sqrt(1650), 3);
    expect(numberOf(found, 'lowest')).toBeCloseTo(30, 3);
    expect(numberOf(found, 'highest')).toBeCloseTo(50, 3);
    expect(numberOf(found, 'period')).toBeCloseTo(50, 3);
    expect(numberOf(found, 'frequency')).toBeCloseTo(20, 4);
    expect(valueFor(found, 'duty').value).toBeNull();
    expect(valueFor(found, 'lowest').unit).toBe('kPa');
  });
  it('gives duty and width of a trapezoid at half height: top plus half of both ramps', () => {
    // Derived: mesial width of a trapezoid = top + (rise + fall) / 2 = 2 + (1 + 3) / 2 = 4 ms in 20 ms.
    const trapezoid = (t: number) => {
      const ms = (t * 1000) % 20;
      return ms < 1 ? 5 * ms : ms < 3 ? 5 : ms < 6 ? 5 - (5 * (ms - 3)) / 3 : 0;
    };
    const found = measureOther(
      record('other', 'V', { rateHz: 20_000, durationS: 0.5, startS: 0.01 }, trapezoid),
    );
    expect(Math.abs(numberOf(found, 'pulse_width') - 4)).toBeLessThan(0.05);
    expect(Math.abs(numberOf(found, 'duty') - 20)).toBeLessThan(0.3);
    expect(Math.abs(numberOf(found, 'frequency') - 50)).toBeLessThan(0.05);
  });
  it('gives plain numbers and no period for noise and for a trace that does not repeat', () => {
    const noise = measureOther(record('other', 'V', { rateHz: 10_000, durationS: 1, noise: 0.1 }, () => 2));
    expect(valueFor(noise, 'period').value).toBeNull();
    expect(numberOf(noise, 'mean')).toBeCloseTo(2, 2);
    const once = measureOther(
      record('other', 'V', { rateHz: 10_000, durationS: 1 }, (t) => (t > 0.3 && t < 0.5 ? 5 : 0)),
    );
    expect(valueFor(once, 'frequency').value).toBeNull();
    expect(numberOf(once, 'pulse_width')).toBeCloseTo(200, 0);
  });
  it('weighs uneven samples by time, and rows of changes only until the next', () => {
    const uneven = { timesS: Float64Array.from([0, 1, 3]), kind: 'uneven' } as const;
    const signal = {
      circuit: 'other',
      name: '',
      unit: 'V',
      rail: null,
      values: Float32Array.from([0, 2, 4]),
    } as const;
    const straight = measureOther({ ...signal, axis: { ...uneven, holds: false } });
    expect(numberOf(straight, 'mean')).toBeCloseTo((1 * 1 + 2 * 3) / 3, 12);
    const held = measureOther({ ...signal, axis: { ...uneven, holds: true } });
    expect(numberOf(held, 'mean')).toBeCloseTo((0 * 1 + 2 * 2) / 3, 12);
    expect(numberOf(held, 'rms')).toBeCloseTo(Math.sqrt((0 + 4 * 2) / 3), 12);
  });
  it('skips holes, gives reasons for none, says when the rail is reached', () => {
    const values = Float32Array.from([1, Number.NaN, 3]);
    const axis = { kind: 'even', startS: 0, stepS: 1, count: 3 } as const;
    const found = measureOther({
      circuit: 'other',
      name: '',
      unit: 'V',
      values,
      axis,
      rail: { low: null, high: 3 },
    });
    expect(numberOf(found, 'mean')).toBe(2);
    expect(codesOf(found)).toEqual(['clipped']);
    const none = measureOther({
      circuit: 'other',
      name: '',
      unit: 'V',
      values: values.map(() => Number.NaN),
      axis,
      rail: null,
    });
    expect(none.values.every((value) => value.value === null && value.reason)).toBe(true);
  });
});
