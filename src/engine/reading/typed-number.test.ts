import { describe, expect, it } from 'vitest';
import { readTypedNumber } from './typed-number.ts';

describe('readTypedNumber()', () => {
  it.each([
    ['12.6', 12.6],
    ['12,6', 12.6],
    [' 0,05 ', 0.05],
    ['0,125', 0.125],
    ['-3', -3],
    ['1.234', 1.234],
    ['12 345', 12_345],
    ['1,2345', 1.2345],
  ])('reads "%s" as %d', (text, value) => {
    expect(readTypedNumber(text)).toEqual({ value });
  });

  it('asks what 1,234 means', () => {
    expect(readTypedNumber('1,234')).toEqual({ problem: 'can mean 1.234 or 1234: write one of them' });
  });

  it.each(['', 'abc', '1.2.3', '1,2,3', '12V', 'NaN', 'Infinity'])('reads no number from "%s"', (text) => {
    expect(readTypedNumber(text)).toHaveProperty('problem');
  });
});
