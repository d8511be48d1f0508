import { describe, expect, it } from 'vitest';
import { readQuantity, unitRatio } from './read-quantity.ts';

const volts = ['V', 'mV', 'kV'] as const;
const times = ['s', 'ms', 'µs'] as const;

describe('readQuantity()', () => {
  it.each([
    ['12,6', 12.6],
    ['12.6', 12.6],
    [' 12,6 ', 12.6],
    ['.5', 0.5],
    ['-3', -3],
    ['−3', -3],
    ['1 240', 1240],
    ['1\u202f240,5', 1240.5],
    ['1e3', 1000],
  ])('reads “%s” as %d', (typed, number) => {
    expect(readQuantity(typed, 'V', volts)).toEqual({ number, unit: 'V' });
  });

  it('takes the unit in the text over the one chosen beside it', () => {
    expect(readQuantity('12600 mV', 'V', volts)).toEqual({ number: 12600, unit: 'mV' });
    expect(readQuantity('4580us', 'ms', times)).toEqual({ number: 4580, unit: 'µs' });
    expect(readQuantity('4580 μs', undefined, times)).toEqual({ number: 4580, unit: 'µs' });
    expect(readQuantity('208 rev/min', undefined, ['rpm'])).toEqual({ number: 208, unit: 'rpm' });
  });

  it('does not need the only unit that fits to be said', () => {
    expect(readQuantity('208', undefined, ['rpm'])).toEqual({ number: 208, unit: 'rpm' });
  });

  it.each([
    ['twelve', /not a number/],
    ['', /not a number/],
    ['1.234,5', /two decimal marks/],
    ['12 V 6', /not a unit/],
    ['12 furlongs', /not a unit/],
    ['12 ms', /does not fit/],
    ['1e999', /too large/],
  ])('refuses “%s” in words instead of guessing', (typed, reason) => {
    const read = readQuantity(typed, 'V', volts);
    expect('reason' in read && read.reason).toMatch(reason);
  });

  it('asks for the unit where several fit and none was chosen', () => {
    const read = readQuantity('12.6', undefined, volts);
    expect('reason' in read && read.reason).toMatch(/say the unit/);
  });
});

// Prefixes: SI Brochure, 9th edition, table 7. The bar is 100 kPa (the same, table 8, note).
describe('unitRatio()', () => {
  it.each([
    ['s', 'ms', 1000],
    ['mV', 'V', 0.001],
    ['kV', 'V', 1000],
    ['bar', 'kPa', 100],
    ['MPa', 'bar', 10],
  ] as const)('%s to %s', (from, to, ratio) => expect(unitRatio(from, to)).toBeCloseTo(ratio, 12));

  it('gives none between units of different things', () => {
    expect(unitRatio('ms', 'V')).toBeNull();
    expect(unitRatio('Hz', 'rpm')).toBeNull();
  });
});
