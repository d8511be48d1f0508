interface Scale {
  readonly unit: string;
  readonly factor: number;
}

/** Units a reading may be typed in, and what one of them is in the unit of the data. 1 psi = 6.894757 kPa (NIST SP 811, app. B.8). */
const SCALES: Readonly<Record<string, Scale>> = {
  V: { unit: 'V', factor: 1 },
  mV: { unit: 'V', factor: 1e-3 },
  kV: { unit: 'V', factor: 1e3 },
  A: { unit: 'A', factor: 1 },
  mA: { unit: 'A', factor: 1e-3 },
  s: { unit: 'ms', factor: 1e3 },
  ms: { unit: 'ms', factor: 1 },
  us: { unit: 'ms', factor: 1e-3 },
  kPa: { unit: 'kPa', factor: 1 },
  MPa: { unit: 'kPa', factor: 1e3 },
  bar: { unit: 'kPa', factor: 100 },
  psi: { unit: 'kPa', factor: 6.894757 },
  rpm: { unit: 'rpm', factor: 1 },
  Ohm: { unit: 'Ohm', factor: 1 },
  kOhm: { unit: 'Ohm', factor: 1e3 },
  MOhm: { unit: 'Ohm', factor: 1e6 },
  mm: { unit: 'mm', factor: 1 },
  deg: { unit: 'deg', factor: 1 },
  Cel: { unit: 'Cel', factor: 1 },
  '%': { unit: '%', factor: 1 },
  '1': { unit: '1', factor: 1 },
};

/** The same units as people write them. */
const SPELLINGS: Readonly<Record<string, string>> = {
  '\u00b5s': 'us',
  '\u03bcs': 'us',
  'rev/min': 'rpm',
  '1/min': 'rpm',
  'r/min': 'rpm',
  ohm: 'Ohm',
  '\u03a9': 'Ohm',
  '\u2126': 'Ohm',
  kohm: 'kOhm',
  'k\u03a9': 'kOhm',
  'k\u2126': 'kOhm',
  '°': 'deg',
  '°C': 'Cel',
  C: 'Cel',
  '[psi]': 'psi',
  turns: '1',
  '': '1',
};

const known = (unit: string): Scale | undefined => SCALES[SPELLINGS[unit.trim()] ?? unit.trim()];

/** The value in another unit; null when one cannot become the other. */
export function convert(value: number, from: string, to: string): number | null {
  const [source, target] = [known(from), known(to)];
  if (source === undefined || target === undefined || source.unit !== target.unit) return null;
  return (value * source.factor) / target.factor;
}

/** The units in which a reading of this unit may be typed. */
export const unitsFor = (unit: string): string[] =>
  Object.keys(SCALES).filter((one) => known(one)?.unit === known(unit)?.unit);
