/** What a person typed: a number, or why it is none. */
export type TypedNumber = { readonly value: number } | { readonly problem: string };

/**
 * A number as people type it at a vehicle: "12.6" and "12,6" are the same. "1,234" may be either 1.234 or one thousand two hundred
 * thirty-four: it asks instead of guessing. Several separators of one kind ask too.
 */
export function readTypedNumber(text: string): TypedNumber {
  const tidy = text
    .trim()
    .replace(/[\s\u00a0\u202f]/g, '')
    .replace(/^\u2212/, '-');
  if (tidy === '') return { problem: 'is empty' };
  if (/^[+-]?[1-9]\d{0,2},\d{3}$/.test(tidy)) {
    const [whole = '', rest = ''] = tidy.split(',');
    return { problem: `can mean ${whole}.${rest} or ${whole}${rest}: write one of them` };
  }
  const dotted = tidy.replace(',', '.');
  if (!/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d{1,2})?$/i.test(dotted)) return { problem: 'is not a number' };
  const value = Number(dotted);
  return Number.isFinite(value) ? { value } : { problem: 'is not a number' };
}
