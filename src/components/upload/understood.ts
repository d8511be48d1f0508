import type { CaptureJson } from '../../contract/areas/captures.ts';
import { grouped, rateText, stepText } from '../base/numbers.ts';

const DELIMITERS: Readonly<Record<string, string>> = {
  ',': 'comma',
  ';': 'semicolon',
  '\t': 'tab',
  ' ': 'spaces',
  '|': 'bar',
};
const UNITS: Readonly<Record<string, string>> = {
  s: 'seconds',
  ms: 'milliseconds',
  us: 'microseconds',
  ns: 'nanoseconds',
  min: 'minutes',
  clock: 'time of day',
};

export const delimiterWord = (delimiter: string): string => DELIMITERS[delimiter] ?? delimiter;
export const timeUnitWord = (unit: string): string => UNITS[unit] ?? unit;

/** "semicolon, decimal comma, milliseconds" */
export function readAs(reading: NonNullable<CaptureJson['reading']>): string {
  const parts = [
    delimiterWord(reading.delimiter),
    reading.decimal === ',' ? 'decimal comma' : 'decimal point',
    reading.timeUnit === null ? 'no time column' : timeUnitWord(reading.timeUnit),
  ];
  return parts.join(', ');
}

/** "0.025 ms, 40 kHz"; for an uneven axis that it is one. */
export function stepWords(capture: Pick<CaptureJson, 'axis' | 'sampleRateHz'>): string {
  if (capture.axis === null) return 'not known yet';
  if (capture.axis === 'holds') return 'changes only, each value holds until the next';
  if (capture.sampleRateHz === null) return 'uneven, each row at its own time';
  return `${stepText(1 / capture.sampleRateHz)}, ${rateText(capture.sampleRateHz)}`;
}

/** "2 rows: 1 041 and 1 042"; null when none was rejected. */
export function rejectedWords(reading: NonNullable<CaptureJson['reading']>): string | null {
  const count = reading.rejectedCount;
  if (count === 0) return null;
  const lines = reading.rejectedRows.slice(0, 3).map(({ line }) => grouped(line));
  const shown =
    lines.length === count && count > 1
      ? `${lines.slice(0, -1).join(', ')} and ${lines.at(-1)}`
      : `${lines.join(', ')}${count > lines.length ? ' …' : ''}`;
  return `${grouped(count)} ${count === 1 ? 'row' : 'rows'}: ${count === 1 ? 'line' : 'lines'} ${shown}. Readable cells are kept, the rest are holes.`;
}
