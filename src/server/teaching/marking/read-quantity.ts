import { DIMENSIONS, UNITS, type Unit } from '../../../contract/areas/teaching-units.ts';

export type Quantity = { readonly number: number; readonly unit: Unit } | { readonly reason: string };

/** Other ways of writing a unit, in small letters. */
const ALSO: Readonly<Record<string, Unit>> = {
  sec: 's',
  us: 'µs',
  // Greek mu and the ohm sign stand beside the micro sign and omega in Unicode.
  μs: 'µs',
  volt: 'V',
  volts: 'V',
  v: 'V',
  mv: 'mV',
  kv: 'kV',
  a: 'A',
  ma: 'mA',
  amp: 'A',
  amps: 'A',
  ampere: 'A',
  amperes: 'A',
  'rev/min': 'rpm',
  '1/min': 'rpm',
  '/min': 'rpm',
  'min-1': 'rpm',
  hz: 'Hz',
  khz: 'kHz',
  deg: '°',
  degree: '°',
  degrees: '°',
  '°ca': '°',
  ohm: 'Ω',
  ohms: 'Ω',
  kohm: 'kΩ',
  percent: '%',
};

const isUnit = (text: string): text is Unit => (UNITS as readonly string[]).includes(text);

function unitOf(text: string): Unit | null {
  const plain = text.normalize('NFKC').replace('\u2126', 'Ω').trim();
  const micro = plain.replace('μ', 'µ');
  if (isUnit(text)) return text;
  if (isUnit(micro)) return micro;
  return ALSO[plain.toLowerCase()] ?? null;
}

const NUMBER = /^([+-]?(?:\d+(?:[.,]\d*)?|[.,]\d+)(?:e[+-]?\d+)?)\s*(.*)$/i;

/**
 * A value as a person types it: "12,6", "12.6 V", "4 580 µs". Comma and point both are the decimal mark, since only one of
 * them may occur; spaces may group digits. A unit in the text wins over the one chosen beside it.
 * @param units the units that make sense; where there is only one it need not be said.
 */
export function readQuantity(typed: string, chosen: Unit | undefined, units: readonly Unit[]): Quantity {
  const text = typed
    .replace(/[\u2212\u2013]/g, '-')
    .replace(/(\d)[\s\u00a0\u2009\u202f'](?=\d{3}(?!\d))/g, '$1')
    .trim();
  const found = NUMBER.exec(text);
  if (found === null) return { reason: 'is not a number; type it like 12.6 or 12,6' };
  const [, digits = '', rest = ''] = found;
  if (/^[.,]\d/.test(rest))
    return { reason: 'has two decimal marks; type it like 1240.5, without marks between thousands' };
  const number = Number(digits.replace(',', '.'));
  if (!Number.isFinite(number)) return { reason: 'is too large for a number' };
  const unit = rest === '' ? (chosen ?? (units.length === 1 ? units[0] : undefined)) : unitOf(rest);
  if (unit === null)
    return { reason: `“${rest.slice(0, 20)}” is not a unit that is known here; use ${units.join(', ')}` };
  if (unit === undefined) return { reason: `say the unit: ${units.join(', ')}` };
  if (!units.includes(unit)) return { reason: `${unit} does not fit this question; use ${units.join(', ')}` };
  return { number, unit };
}

/** How many of one unit make one of another of the same dimension; null when they measure different things. */
export function unitRatio(from: Unit, to: Unit): number | null {
  for (const units of Object.values(DIMENSIONS)) {
    const factors: Readonly<Partial<Record<Unit, number>>> = units;
    const [a, b] = [factors[from], factors[to]];
    if (a !== undefined && b !== undefined) return a / b;
  }
  return null;
}
