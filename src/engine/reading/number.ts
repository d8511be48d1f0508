/** Exact powers of ten: 10^22 is the last that a double holds exactly. */
export const POWERS_OF_TEN = Float64Array.from({ length: 23 }, (_, n) => Number(`1e${n}`));

/** Whole numbers up to here are exact doubles. */
export const EXACT_MANTISSA = 2 ** 53;

/**
 * The double that `Number()` gives for the same text with `decimal` read as the point and `shift` places taken off:
 * "0,025" with shift 3 is Number("0.025e-3"). NaN when the bytes from `from` to `to` are not wholly one decimal
 * number: sign, digits, decimal mark, digits, exponent; neither hexadecimal nor words.
 *
 * A mantissa of at most 2^53 and a power of at most 22 are both exact doubles, so one rounded division or product is
 * the nearest double (W. D. Clinger, "How to Read Floating Point Numbers Accurately", 1990); all else goes to Number().
 */
export function parseNumber(bytes: Uint8Array, from: number, to: number, decimal: number, shift = 0): number {
  let i = from;
  let byte = i < to ? bytes[i]! : 0;
  const negative = byte === 45;
  if (negative || byte === 43) i++;
  const mantissaFrom = i;
  let mantissa = 0;
  let digits = 0;
  let fraction = 0;
  for (; i < to && (bytes[i]! ^ 48) < 10; i++, digits++) mantissa = mantissa * 10 + (bytes[i]! ^ 48);
  if (i < to && bytes[i] === decimal) {
    i++;
    const start = i;
    for (; i < to && (bytes[i]! ^ 48) < 10; i++, digits++) mantissa = mantissa * 10 + (bytes[i]! ^ 48);
    fraction = i - start;
  }
  if (digits === 0) return Number.NaN;
  const mantissaTo = i;
  let exponent = 0;
  if (i < to && (bytes[i]! | 32) === 101) {
    i++;
    byte = i < to ? bytes[i]! : 0;
    const small = byte === 45;
    if (small || byte === 43) i++;
    const start = i;
    for (; i < to && (bytes[i]! ^ 48) < 10; i++)
      exponent = Math.min(exponent * 10 + (bytes[i]! ^ 48), 99_999);
    if (i === start) return Number.NaN;
    if (small) exponent = -exponent;
  }
  if (i !== to) return Number.NaN;
  const power = exponent - fraction - shift;
  let value: number;
  if (mantissa <= EXACT_MANTISSA && power <= 22 && power >= -22) {
    value = power < 0 ? mantissa / POWERS_OF_TEN[-power]! : mantissa * POWERS_OF_TEN[power]!;
  } else {
    let text = '';
    for (let k = mantissaFrom; k < mantissaTo; k++) {
      text += bytes[k] === decimal ? '.' : String.fromCharCode(bytes[k]!);
    }
    value = Number(`${text}e${exponent - shift}`);
  }
  return negative ? -value : value;
}
