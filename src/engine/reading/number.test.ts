import fc from 'fast-check';
import { expect, test } from 'vitest';
import { parseNumber } from './number.ts';

const bytesOf = (text: string) => Uint8Array.from(text, (letter) => letter.charCodeAt(0));
const parse = (text: string, decimal = '.', shift = 0) =>
  parseNumber(bytesOf(text), 0, text.length, decimal.charCodeAt(0), shift);

/** Decimal texts of any length, with sign and exponent, as instruments write them. */
const digits = (max: number) =>
  fc.string({ unit: fc.constantFrom(...'0123456789'), minLength: 1, maxLength: max });
const decimalText = fc
  .record({
    sign: fc.constantFrom('', '-', '+'),
    whole: digits(20),
    fraction: fc.option(digits(25)),
    exponent: fc.option(
      fc.tuple(fc.constantFrom('e', 'E', 'e-', 'E+', 'e+'), fc.integer({ min: 0, max: 340 })),
    ),
  })
  .map(
    (p) => `${p.sign}${p.whole}${p.fraction === null ? '' : `.${p.fraction}`}${p.exponent?.join('') ?? ''}`,
  );

test('parseNumber() gives the double that Number() gives, for any decimal text', () => {
  fc.assert(
    fc.property(decimalText, (text) => Object.is(parse(text), Number(text))),
    { numRuns: 20_000 },
  );
});

test('parseNumber() gives back every double written in its shortest form', () => {
  fc.assert(
    fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) =>
      Object.is(parse(String(value)), Number(String(value))),
    ),
    { numRuns: 20_000 },
  );
});

test('parseNumber() with a shift gives Number() of the same text with the exponent lowered', () => {
  fc.assert(
    fc.property(digits(12), digits(12), fc.constantFrom(3, 6, 9), (whole, fraction, shift) =>
      Object.is(parse(`${whole},${fraction}`, ',', shift), Number(`${whole}.${fraction}e-${shift}`)),
    ),
  );
});

test('parseNumber() keeps minus zero, a bare fraction and a trailing point', () => {
  expect(parse('-0')).toBe(-0);
  expect(parse('.5')).toBe(0.5);
  expect(parse('5.')).toBe(5);
  expect(parse('+1.5E+3')).toBe(1500);
});

test('parseNumber() is NaN for anything that is not wholly a decimal number', () => {
  for (const text of [
    '',
    '-',
    '.',
    'e5',
    '1e',
    '1e+',
    '0x10',
    '1 2',
    '1,5',
    '1.2.3',
    'Infinity',
    '1_000',
    '--1',
  ]) {
    expect(parse(text), text).toBeNaN();
  }
});
