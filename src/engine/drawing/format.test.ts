import { describe, expect, it } from 'vitest';
import { count, digitsFor, duration, fixed, frequency, significant, withUnit } from './format.ts';

describe('fixed()', () => {
  it('sets a true minus, never minus zero, and thin spaces from ten thousand on', () => {
    expect(fixed(-1.5, 1)).toBe('−1.5');
    expect(fixed(-0.0001, 2)).toBe('0.00');
    expect(fixed(1234.5, 1)).toBe('1234.5');
    expect(fixed(69999, 0)).toBe('69\u2009999');
  });
});

describe('significant()', () => {
  it('keeps the figures asked for, small and large', () => {
    expect(significant(4.5833)).toBe('4.58');
    expect(significant(211.88, 4)).toBe('211.9');
    expect(significant(0.03111)).toBe('0.0311');
    expect(significant(-245.3)).toBe('−245');
    expect(significant(0)).toBe('0');
  });
});

describe('units', () => {
  it('the degree sign hugs its number, 1 has no sign, others stand apart', () => {
    expect(withUnit('57.0', 'deg')).toBe('57.0°');
    expect(withUnit('58', '1')).toBe('58');
    expect(withUnit('1.90', 'V')).toBe('1.90 V');
  });

  it('durations, rates and sizes choose the unit that fits', () => {
    expect(duration(1.4)).toBe('1.400 s');
    expect(duration(0.0045)).toBe('4.500 ms');
    expect(duration(4e-6)).toBe('4.000 µs');
    expect(frequency(50_000)).toBe('50.00 kHz');
    expect(count(2213)).toBe('2\u2009213');
    expect(digitsFor(0.002)).toBe(3);
  });
});
