/** Numbers as the pages set them: a true minus sign, thin spaces between thousands, units apart. */

const MINUS = '−';
const THIN = '\u2009';

/** Fixed digits after the point; -0 is 0; thousands apart from ten thousand on. */
export function fixed(value: number, digits: number): string {
  const text = Math.abs(value).toFixed(digits);
  const [whole = '0', fraction] = text.split('.');
  const apart = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, THIN) : whole;
  const negative = value < 0 && Number(text) !== 0;
  return `${negative ? MINUS : ''}${apart}${fraction === undefined ? '' : `.${fraction}`}`;
}

/** At least `figures` significant figures, never more than six digits after the point. */
export function significant(value: number, figures = 3): string {
  if (value === 0) return '0';
  const size = Math.floor(Math.log10(Math.abs(value)));
  return fixed(value, Math.min(Math.max(figures - 1 - size, 0), 6));
}

export const count = (value: number) => fixed(value, 0).replace(/^(−?)(\d)(\d{3})$/, `$1$2${THIN}$3`);

/** Digits after the point that tell apart values `step` away from each other. */
export function digitsFor(step: number): number {
  if (!(step > 0)) return 0;
  return Math.min(Math.max(Math.ceil(-Math.log10(step) - 1e-9), 0), 9);
}

/** A time fine enough for a view of `spanS`: seconds, or milliseconds when less than half a second shows. */
export function time(timeS: number, spanS: number): string {
  return `${fixed(timeS, digitsFor(spanS / 1000))} s`;
}

export function duration(spanS: number): string {
  if (spanS >= 1) return `${fixed(spanS, 3)} s`;
  if (spanS >= 1e-3) return `${significant(spanS * 1e3, 4)} ms`;
  return `${significant(spanS * 1e6, 4)} µs`;
}

const UNIT_WORDS: Record<string, string> = { '1': '', deg: '°', us: 'µs', Ohm: 'Ω', '%': '%' };

/** A UCUM code as people write it; the degree sign hugs its number, so it comes without a space from `withUnit`. */
export const unitText = (unit: string) => UNIT_WORDS[unit] ?? unit;

export function withUnit(number: string, unit: string): string {
  const text = unitText(unit);
  return text === '' ? number : text === '°' ? `${number}°` : `${number} ${text}`;
}

export function frequency(hz: number): string {
  return hz >= 1000 ? `${significant(hz / 1000, 4)} kHz` : `${significant(hz, 4)} Hz`;
}
