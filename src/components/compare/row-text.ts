import type { ComparisonJson } from '../../contract/areas/library.ts';
import { labelOf, partLabel } from '../capture/labels.ts';
import { numberText, unitAfter } from '../capture/number-text.ts';
import { fixed } from '../plot/format.ts';

type Row = ComparisonJson['rows'][number];

export interface RowText {
  readonly label: string;
  readonly here: string;
  readonly reference: string;
  readonly band: string;
  readonly difference: string;
  readonly unit: string;
}

/** A row of the comparison in words and digits. */
export function rowText(row: Row): RowText {
  const unit = unitAfter(row.key, row.unit);
  const cell = (value: Row['here']) =>
    value === null
      ? 'none'
      : typeof value === 'number'
        ? numberText(value, row.unit)
        : typeof value === 'boolean'
          ? value
            ? 'yes'
            : 'no'
          : value.replaceAll('-', '−');
  return {
    label: row.part === null ? labelOf(row.key) : partLabel(row.key, row.part),
    here: cell(row.here),
    reference: cell(row.reference),
    band:
      row.low === null || row.high === null
        ? ''
        : `${numberText(row.low, row.unit)} to ${numberText(row.high, row.unit)}`,
    difference: differenceText(row),
    unit,
  };
}

/** Signed, angles the shorter way round the 720 degrees; empty where one side has no number. */
function differenceText(row: Row): string {
  if (typeof row.here !== 'number' || typeof row.reference !== 'number') return '';
  let difference = row.here - row.reference;
  if (row.key.startsWith('cam_') && Math.abs(difference) > 360) difference -= Math.sign(difference) * 720;
  // As many digits as the value itself bears.
  const digits = numberText(row.here, row.unit).split('.')[1]?.length ?? 0;
  const text = fixed(difference, digits);
  if (!/[1-9]/.test(text)) return text;
  return difference > 0 ? `+${text}` : text;
}

/** Where here and the band stand on a bar, 0 to 1; null where there is no band to stand on. */
export function bandBar(row: Row): { low: number; high: number; here: number } | null {
  if (typeof row.here !== 'number' || row.low === null || row.high === null) return null;
  const from = Math.min(row.low, row.here);
  const to = Math.max(row.high, row.here);
  const room = (to - from) * 0.25 || Math.abs(to) * 0.1 || 1;
  const share = (value: number) => (value - from + room) / (to - from + 2 * room);
  return { low: share(row.low), high: share(row.high), here: share(row.here) };
}
