import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { typedNumber } from './typed-number.ts';

describe('typedNumber()', () => {
  it.each([
    ['12,6', 12.6],
    ['12.6', 12.6],
    [' 12,6 ', 12.6],
    ['-0,5', -0.5],
    ['−3.2', -3.2],
    ['0,234', 0.234],
    ['0.234', 0.234],
    [',5', 0.5],
    ['12,', 12],
    ['1234', 1234],
    ['1 234', 1234],
    ['1\u2009234,5', 1234.5],
    ["1'234.5", 1234.5],
    ['1,234.5', 1234.5],
    ['1.234,5', 1234.5],
    ['1,234,567', 1_234_567],
    ['1.234.567,25', 1_234_567.25],
    ['1,2345', 1.2345],
    ['12,34', 12.34],
    ['1234,567', 1234.567],
    ['1.2e3', 1200],
  ])('reads %s as %d', (typed, value) => {
    expect(typedNumber(typed)).toEqual({ kind: 'number', value });
  });

  it.each(['1,234', '1.234', '-12,500', '999.000'])('asks about %s, which can be either', (typed) => {
    const found = typedNumber(typed);
    expect(found.kind).toBe('asks');
    if (found.kind === 'asks') expect(found.thousands).toBeCloseTo(found.decimal * 1000, 6);
  });

  it.each([
    '',
    ' ',
    '-',
    ',',
    'abc',
    '12 V',
    '1,23,4',
    '1,234.56.7',
    '1.2,34,5',
    '12..5',
    '1,2.3e',
    'Infinity',
  ])('takes “%s” for no number', (typed) => {
    expect(typedNumber(typed)).toEqual({ kind: 'none' });
  });

  it('gives back what either way of writing a number says, and never a value a thousand times off', () => {
    const cases = fc.record({
      whole: fc.integer({ min: 0, max: 99_999_999 }),
      rest: fc.stringMatching(/^\d{0,5}$/),
      comma: fc.boolean(),
      parted: fc.boolean(),
    });
    fc.assert(
      fc.property(cases, ({ whole, rest, comma, parted }) => {
        const [decimal, group] = comma ? [',', '.'] : ['.', ','];
        const front = parted ? String(whole).replace(/\B(?=(\d{3})+(?!\d))/g, group) : String(whole);
        const found = typedNumber(rest === '' ? front : `${front}${decimal}${rest}`);
        const meant = Number(`${whole}.${rest === '' ? '0' : rest}`);
        if (found.kind === 'asks') expect([found.decimal, found.thousands]).toContain(meant);
        else expect(found).toEqual({ kind: 'number', value: meant });
      }),
    );
  });
});
