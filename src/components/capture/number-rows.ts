import type { Evidence, IrregularTooth, Measured, Value } from '../../engine/value.ts';
import { degreesAt, timeAtDegrees } from '../plot/degrees.ts';
import { fixed } from '../plot/format.ts';
import type { PlotWheel } from '../plot/types.ts';
import { labelOf, partLabel } from './labels.ts';
import { numberText, spreadText, unitAfter } from './number-text.ts';

/** One row of the Numbers: what is read, and the samples behind it. */
export interface NumberRow {
  readonly id: string;
  readonly label: string;
  /** Null: the value cannot be had; `detail` says why. */
  readonly text: string | null;
  readonly unit: string;
  readonly detail: string;
  /** Deserves a look: shown with the triangle and the word. */
  readonly look: boolean;
  readonly evidence: readonly Evidence[];
}

/** A value as one row, or as one row for each part of a list. */
export function numberRows(value: Value, wheel: PlotWheel | null): NumberRow[] {
  const { key, unit } = value;
  const base = { look: false, evidence: value.evidence, unit: unitAfter(key, unit) };
  const whole = (text: string | null, detail: string): NumberRow[] => [
    { ...base, id: key, label: labelOf(key), text, detail, unit: text === null ? '' : base.unit },
  ];
  if (value.value === null) return whole(null, value.reason ?? 'no reason was given');
  if (typeof value.value === 'number')
    return whole(numberText(value.value, unit), countAndSpread(value, null));
  if (typeof value.value === 'boolean') return whole(value.value ? 'yes' : 'no', countAndSpread(value, null));
  if (typeof value.value === 'string')
    return whole(value.value.replaceAll('-', '−'), countAndSpread(value, null));
  if (isTeeth(value.value)) return toothRows(value, value.value);
  return value.value.map((part, place) => ({
    ...base,
    id: `${key} ${place + 1}`,
    label: partLabel(key, place + 1),
    text: part === null ? null : numberText(part, unit),
    detail: part === null ? 'not to be had here' : countAndSpread(value, place),
    evidence: evidenceOfPart(value, place, part, wheel),
  }));
}

const isTeeth = (list: Exclude<Measured, number | string | boolean>): list is readonly IrregularTooth[] =>
  typeof list[0] === 'object' && list[0] !== null;

function toothRows(value: Value, teeth: readonly IrregularTooth[]): NumberRow[] {
  return teeth.map(({ tooth, height_ratio, spacing_ratio }) => {
    const short = height_ratio !== null && height_ratio < 1;
    const parts = [
      height_ratio === null ? null : `${fixed(height_ratio, 2)} × its neighbours’ height`,
      spacing_ratio === null ? null : `${fixed(spacing_ratio, 2)} × their spacing`,
      value.n === undefined ? null : `n = ${value.n}`,
    ];
    return {
      id: `${value.key} ${tooth}`,
      label: height_ratio === null ? 'Tooth out of place' : short ? 'Short tooth' : 'Tall tooth',
      text: String(tooth),
      unit: '',
      detail: parts.filter((part) => part !== null).join(', '),
      look: true,
      evidence: value.evidence,
    };
  });
}

const partOf = (of: number | readonly number[] | undefined, place: number | null) =>
  typeof of === 'object' ? (place === null ? undefined : of[place]) : of;

function countAndSpread(value: Value, place: number | null): string {
  const spread = spreadText(partOf(value.min, place), partOf(value.max, place), value.unit);
  return [value.n === undefined ? null : `n = ${value.n}`, spread].filter((part) => part !== null).join(', ');
}

/**
 * Which of a list's evidence belongs to one part: the engine lists it part after part, each in order of time, so a part begins
 * where time falls back. Where that does not come out, all of it. An angle is shown from the place it is counted from.
 */
function evidenceOfPart(
  value: Value,
  place: number,
  part: number | null,
  wheel: PlotWheel | null,
): readonly Evidence[] {
  const groups: Evidence[][] = [];
  for (const stretch of value.evidence) {
    const group = groups[groups.length - 1];
    if (group === undefined || stretch.from <= group[group.length - 1]!.from) groups.push([stretch]);
    else group.push(stretch);
  }
  const parts = Array.isArray(value.value) ? value.value.length : 0;
  const one = value.evidence.length === parts ? [value.evidence[place]!] : null;
  const own = one ?? (groups.length === parts ? groups[place]! : value.evidence);
  if (value.unit !== 'deg' || wheel === null || part === null) return own;
  return own.map((stretch) => {
    const degrees = degreesAt(wheel, stretch.to);
    const from = degrees === null ? null : timeAtDegrees(wheel, degrees - part);
    return from === null || stretch.from !== stretch.to ? stretch : { from, to: stretch.to };
  });
}
