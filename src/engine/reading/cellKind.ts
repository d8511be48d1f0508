import { isDate, parseClock } from './clock.ts';
import type { Decimal } from './types.ts';
import { readWord } from './words.ts';

export type CellKind = 'empty' | 'number' | 'grouped' | 'clock' | 'date' | 'high' | 'low' | 'hole' | 'text';

const PLAIN: Record<Decimal, RegExp> = {
  '.': /^[+−-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+−-]?\d+)?$/,
  ',': /^[+−-]?(?:\d+(?:,\d+)?|,\d+)(?:[eE][+−-]?\d+)?$/,
};

/** Thousands marks: always groups of three after one to three digits that do not begin with 0, one kind of mark. */
const GROUPED: Record<Decimal, RegExp> = {
  '.': /^[+−-]?[1-9]\d{0,2}(?:(?:,\d{3})+|(?:[\u00a0\u202f\u2009 ]\d{3})+|(?:['’]\d{3})+)(?:\.\d*)?$/,
  ',': /^[+−-]?[1-9]\d{0,2}(?:(?:\.\d{3})+|(?:[\u00a0\u202f\u2009 ]\d{3})+|(?:['’]\d{3})+)(?:,\d*)?$/,
};

/** What one trimmed cell holds, with `decimal` as the decimal mark. */
export function cellKind(text: string, decimal: Decimal): CellKind {
  if (text === '') return 'empty';
  if (PLAIN[decimal].test(text)) return 'number';
  if (GROUPED[decimal].test(text)) return 'grouped';
  if (parseClock(text) !== null) return 'clock';
  if (isDate(text)) return 'date';
  return readWord(text) ?? 'text';
}

/** The number in a cell that `cellKind` calls "number" or "grouped": Number() of the text in plain notation. */
export function cellNumber(text: string, decimal: Decimal, shift = 0): number {
  const bare = text
    .replace(/−/g, '-')
    .replace(decimal === '.' ? /[,\u00a0\u202f\u2009 '’]/g : /[.\u00a0\u202f\u2009 '’]/g, '');
  const plain = decimal === ',' ? bare.replace(',', '.') : bare;
  if (shift === 0) return Number(plain);
  const [mantissa, exponent = '0'] = plain.toLowerCase().split('e');
  return Number(`${mantissa}e${Number(exponent) - shift}`);
}
