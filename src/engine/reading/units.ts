import type { TimeUnit } from './types.ts';

export interface Unit {
  /** UCUM code without prefix. */
  readonly unit: string;
  /** Value in the file times this is the value in `unit`. */
  readonly factor: number;
}

const PREFIXES: Record<string, number> = { n: 1e-9, u: 1e-6, m: 1e-3, '': 1, k: 1e3, K: 1e3, M: 1e6, G: 1e9 };

/** Symbol as written, UCUM code, prefixes in use on scope exports ("MV" is left out: nobody can tell it from mV). */
const SYMBOLS: readonly (readonly [string, string, string])[] = [
  ['V', 'V', 'numkK'],
  ['A', 'A', 'numkK'],
  ['s', 's', 'num'],
  ['Hz', 'Hz', 'mkKMG'],
  ['Ohm', 'Ohm', 'mkKM'],
  ['W', 'W', 'mkKM'],
  ['K', 'K', ''],
  ['F', 'F', 'num'],
  ['T', 'T', 'um'],
];

/** Spellings that are not prefix and symbol, in lower case: UCUM code and factor. */
const WORDS: Record<string, readonly [string, number]> = {
  v: ['V', 1],
  volt: ['V', 1],
  volts: ['V', 1],
  vdc: ['V', 1],
  vac: ['V', 1],
  mv: ['V', 1e-3],
  uv: ['V', 1e-6],
  kv: ['V', 1e3],
  millivolt: ['V', 1e-3],
  millivolts: ['V', 1e-3],
  kilovolt: ['V', 1e3],
  kilovolts: ['V', 1e3],
  amp: ['A', 1],
  amps: ['A', 1],
  ampere: ['A', 1],
  amperes: ['A', 1],
  ma: ['A', 1e-3],
  ua: ['A', 1e-6],
  milliamp: ['A', 1e-3],
  milliamps: ['A', 1e-3],
  milliampere: ['A', 1e-3],
  milliamperes: ['A', 1e-3],
  sec: ['s', 1],
  secs: ['s', 1],
  second: ['s', 1],
  seconds: ['s', 1],
  sek: ['s', 1],
  sekunden: ['s', 1],
  ms: ['s', 1e-3],
  msec: ['s', 1e-3],
  msecs: ['s', 1e-3],
  millisecond: ['s', 1e-3],
  milliseconds: ['s', 1e-3],
  us: ['s', 1e-6],
  usec: ['s', 1e-6],
  microsecond: ['s', 1e-6],
  microseconds: ['s', 1e-6],
  ns: ['s', 1e-9],
  nsec: ['s', 1e-9],
  nanosecond: ['s', 1e-9],
  nanoseconds: ['s', 1e-9],
  min: ['s', 60],
  minute: ['s', 60],
  minutes: ['s', 60],
  minuten: ['s', 60],
  hz: ['Hz', 1],
  hertz: ['Hz', 1],
  khz: ['Hz', 1e3],
  mhz: ['Hz', 1e6],
  Ω: ['Ohm', 1],
  ω: ['Ohm', 1],
  ohms: ['Ohm', 1],
  kohm: ['Ohm', 1e3],
  kω: ['Ohm', 1e3],
  mω: ['Ohm', 1e-3],
  pa: ['kPa', 1e-3],
  hpa: ['kPa', 0.1],
  kpa: ['kPa', 1],
  mpa: ['kPa', 1e3],
  bar: ['bar', 1],
  mbar: ['bar', 1e-3],
  psi: ['[psi]', 1],
  '°c': ['Cel', 1],
  degc: ['Cel', 1],
  '°f': ['[degF]', 1],
  '°': ['deg', 1],
  deg: ['deg', 1],
  degree: ['deg', 1],
  degrees: ['deg', 1],
  '%': ['%', 1],
  percent: ['%', 1],
  rpm: ['rpm', 1],
  '1/min': ['rpm', 1],
  'rev/min': ['rpm', 1],
  'min-1': ['rpm', 1],
  'u/min': ['rpm', 1],
  '1': ['1', 1],
  logic: ['1', 1],
};

/** Plain spelling of a unit: brackets off, both micro signs (U+00B5, U+03BC) to "u", both ohm signs to one. */
function plain(text: string): string {
  return text
    .trim()
    .replace(/^[([{<]\s*(.*?)\s*[)\]}>]$/, '$1')
    .replace(/[µμ]/g, 'u')
    .replace(/\u2126/g, 'Ω')
    .trim();
}

/** Reads "mV", "(s)", "[µs]", "kA" or "volts" as a UCUM code and a factor; null when it is no unit that we know. */
export function parseUnit(text: string): Unit | null {
  const spelled = plain(text);
  for (const [symbol, unit, prefixes] of SYMBOLS) {
    if (!spelled.endsWith(symbol)) continue;
    const prefix = spelled.slice(0, spelled.length - symbol.length);
    if (prefix === '' || (prefix.length === 1 && prefixes.includes(prefix)))
      return { unit, factor: PREFIXES[prefix]! };
  }
  if (spelled === 'MV' || spelled === 'MA' || spelled === 'a') return null;
  const word = WORDS[spelled.toLowerCase()];
  return word === undefined ? null : { unit: word[0], factor: word[1] };
}

const TIME_UNITS: readonly (readonly [TimeUnit, number])[] = [
  ['s', 1],
  ['ms', 1e-3],
  ['us', 1e-6],
  ['ns', 1e-9],
  ['min', 60],
];

/** The time unit whose length is `factor` seconds. */
export function timeUnitOf(unit: Unit | null): TimeUnit | null {
  if (unit?.unit !== 's') return null;
  return TIME_UNITS.find(([, factor]) => factor === unit.factor)?.[0] ?? null;
}

/** Decimal places that a time unit is below the second; minutes are handled by their factor of 60. */
export function decimalShift(unit: TimeUnit | null): number {
  return unit === 'ms' ? 3 : unit === 'us' ? 6 : unit === 'ns' ? 9 : 0;
}
