/** What a typed number may be. */
export type TypedNumber =
  | { readonly kind: 'number'; readonly value: number }
  /** It can be read in two ways a factor of a thousand apart: the person says which is meant. */
  | { readonly kind: 'asks'; readonly decimal: number; readonly thousands: number }
  | { readonly kind: 'none' };

const NONE: TypedNumber = { kind: 'none' };
const number = (text: string): TypedNumber => {
  const value = Number(text);
  return Number.isFinite(value) ? { kind: 'number', value } : NONE;
};

/**
 * Reads a number as people type it: 12.6 and 12,6 are the same, spaces part thousands, of two different marks the last is the
 * decimal one. A single mark before exactly three digits can be either (1,234 or 1.234), unless nothing but 0 stands before it:
 * then it asks instead of guessing. Exponents are taken, words and empty text are not a number.
 */
export function typedNumber(typed: string): TypedNumber {
  const text = typed
    .trim()
    .replace(/[\s\u00a0\u2009\u202f'’]/g, '')
    .replace(/^\u2212/, '-');
  const match = /^([+-]?)(\d*(?:[.,]\d*)*)(e[+-]?\d+)?$/i.exec(text);
  const digits = match?.[2] ?? '';
  if (match === null || !/\d/.test(digits)) return NONE;
  const [, sign = '', , exponent = ''] = match;
  const read = (plain: string) => number(`${sign}${plain}${exponent}`);
  const marks = [...digits].filter((letter) => letter === '.' || letter === ',');
  const last = marks.at(-1);
  if (last === undefined) return read(digits);
  const kinds = new Set(marks);
  const parts = digits.split(/[.,]/);
  const grouped = parts.length > 1 && /^\d{1,3}$/.test(parts[0] ?? '');
  const threes = (groups: readonly string[]) => groups.every((group) => /^\d{3}$/.test(group));
  if (kinds.size === 2) {
    // 1,234.5 and 1.234,5: the mark that comes last, once, is the decimal one.
    if (marks.filter((mark) => mark === last).length > 1) return NONE;
    const whole = parts.slice(0, -1);
    if (!grouped || !threes(whole.slice(1))) return NONE;
    return read(`${whole.join('')}.${parts.at(-1)}`);
  }
  if (marks.length > 1) return grouped && threes(parts.slice(1)) ? read(parts.join('')) : NONE;
  const [before = '', after = ''] = parts;
  if (after.length === 3 && grouped && !/^0+$/.test(before) && exponent === '') {
    return {
      kind: 'asks',
      decimal: Number(`${sign}${before}.${after}`),
      thousands: Number(`${sign}${before}${after}`),
    };
  }
  return read(`${before === '' ? '0' : before}.${after === '' ? '0' : after}`);
}
