import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { shortestFloat32 } from './shortest-float32.ts';

const digitsOf = (text: string) =>
  text.replace(/e.*$/, '').replace(/[-.]/g, '').replace(/^0+/, '').replace(/0+$/, '').length;

describe('shortestFloat32()', () => {
  it('gives the text that was read, however many digits a double would show', () => {
    for (const text of ['0.9025', '0.1', '-3.3', '12.45', '0.07527', '16777216', '1e-7', '100000']) {
      expect(shortestFloat32(Math.fround(Number(text)))).toBe(text);
    }
  });

  it('reads back as the same float32, for any float32', () => {
    fc.assert(
      fc.property(fc.float({ noNaN: true }), (value) => {
        expect(Object.is(Math.fround(Number(shortestFloat32(value))), value)).toBe(true);
      }),
      { numRuns: 3000 },
    );
  });

  it('has no shorter text that reads back: one digit less never does', () => {
    fc.assert(
      fc.property(fc.float({ noNaN: true, noDefaultInfinity: true }), (value) => {
        const digits = digitsOf(shortestFloat32(value));
        if (digits < 2) return;
        const [mantissa, exponent] = Math.abs(value)
          .toExponential(digits - 2)
          .split('e') as [string, string];
        const whole = Number(mantissa.replace('.', ''));
        for (const neighbour of [whole - 1, whole, whole + 1]) {
          const shorter = Number(`${neighbour}e${Number(exponent) - (digits - 2)}`);
          expect(Math.fround(shorter)).not.toBe(Math.abs(value));
        }
      }),
      { numRuns: 3000 },
    );
  });

  it('finds the shorter neighbour below a power of two, where the nearest does not read back', () => {
    // 2^-44: the interval of decimals that read back is half as wide below as above (Steele and White 1990).
    expect(shortestFloat32(2 ** -44)).toBe('5.684342e-14');
    expect(Math.fround(5.684342e-14)).toBe(2 ** -44);
  });

  it('keeps the sign of zero and leaves a hole empty', () => {
    expect([shortestFloat32(0), shortestFloat32(-0), shortestFloat32(Number.NaN)]).toEqual(['0', '-0', '']);
  });
});
