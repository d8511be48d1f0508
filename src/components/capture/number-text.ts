import { fixed, significant, unitText } from '../plot/format.ts';

/** A measured number as text, without its unit: the digits that the quantity bears. */
export function numberText(value: number, unit: string): string {
  const size = Math.abs(value);
  switch (unit) {
    case 'deg':
    case 'rpm':
    case '%':
      return fixed(value, 1);
    case 'ms':
      return fixed(value, size >= 100 ? 1 : size < 0.1 ? 4 : 2);
    case 'V':
    case 'A':
      return size < 0.1 && size > 0 ? significant(value, 2) : fixed(value, size >= 10 ? 1 : 2);
    case '1':
      return Number.isInteger(value) ? fixed(value, 0) : fixed(value, 2);
    default:
      return significant(value, 4);
  }
}

/** "min to max" where they differ as written; null where there is nothing to say. */
export function spreadText(min: number | undefined, max: number | undefined, unit: string): string | null {
  if (min === undefined || max === undefined) return null;
  const from = numberText(min, unit);
  const to = numberText(max, unit);
  return from === to ? null : `${from} to ${to}`;
}

/** The unit as it stands after a value; ratios are "×" of something. */
export const unitAfter = (key: string, unit: string): string => (key === 'gap_ratio' ? '×' : unitText(unit));
