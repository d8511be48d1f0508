import type { IrregularTooth, Measured, Value } from '../value.ts';
import { BAND_MINIMUM, type Band, bandOf } from './band.ts';
import { pairAngles } from './circular.ts';
import { ANY_OTHER, NOT_COMPARED, TOLERANCES, type Tolerance } from './tolerances.ts';
import type { Row, Verdict } from './types.ts';

type Judged = Pick<Row, 'verdict' | 'why'>;
const judged = (verdict: Verdict, why: string): Judged => ({ verdict, why });

const UNDER_TWO_REFERENCES = 'compared with one reference';

function judgeNumber(here: number, reference: number, tolerance: Tolerance): Judged {
  switch (tolerance.kind) {
    case 'context':
      return judged('undecided', tolerance.why);
    case 'same':
      return here === reference ? judged('inside', 'the same') : judged('outside', tolerance.otherwise);
    case 'degrees':
    case 'share': {
      const scale = tolerance.kind === 'share' ? Math.abs(reference) : 1;
      const off = Math.abs(here - reference);
      if (off <= tolerance.inside * scale) return judged('inside', UNDER_TWO_REFERENCES);
      if (tolerance.outside !== null && off >= tolerance.outside * scale)
        return judged('outside', UNDER_TWO_REFERENCES);
      return judged(
        'undecided',
        tolerance.kind === 'share' ? tolerance.why : 'Between fitting play and a tooth of slip.',
      );
    }
  }
}

/** Floor of a band's half width, so that three equal references do not make a band of no width: 2 %, or a degree. */
const leastHalfWidth = (tolerance: Tolerance, middle: number) =>
  tolerance.kind === 'degrees' ? 1 : Math.abs(middle) * 0.02;

function judgeBand(here: number, band: Band, tolerance: Tolerance): Judged {
  const inside = here >= band.low && here <= band.high;
  if (inside) return judged('inside', `within the band of ${band.n}`);
  if (tolerance.kind === 'context') return judged('undecided', tolerance.why);
  return judged('outside', `outside the band of ${band.n}`);
}

const isTeeth = (value: Measured): value is readonly IrregularTooth[] =>
  Array.isArray(value) && value.some((item) => typeof item === 'object' && item !== null);

const isNumbers = (value: Measured | null): value is readonly (number | null)[] =>
  Array.isArray(value) && value.every((item) => typeof item === 'number' || item === null);

const numbersOf = (value: Measured | null): number[] =>
  isNumbers(value) ? value.filter((item): item is number => item !== null) : [];

const teethOf = (value: Measured | null): number[] =>
  value !== null && isTeeth(value) ? value.map((tooth) => tooth.tooth) : [];

/** "23, 24" or "none". */
const toothList = (teeth: readonly number[]) => (teeth.length === 0 ? 'none' : teeth.join(', '));

function irregularRow(here: Value, references: readonly Value[]): Row {
  const mine = teethOf(here.value);
  const theirs = new Set(references.flatMap((reference) => teethOf(reference.value)));
  const extra = mine.filter((tooth) => !theirs.has(tooth));
  const verdict =
    extra.length > 0
      ? judged('outside', `Tooth ${extra.join(', ')} differs from its neighbours here and in no reference.`)
      : judged('inside', 'no other teeth than in the reference');
  return {
    key: here.key,
    part: null,
    unit: here.unit,
    here: toothList(mine),
    reference: toothList([...theirs].sort((a, b) => a - b)),
    low: null,
    high: null,
    n: references.length,
    ...verdict,
  };
}

function numberRow(
  base: { readonly key: string; readonly part: number | null; readonly unit: string },
  here: number,
  references: readonly number[],
  tolerance: Tolerance,
): Row {
  const middle = references.reduce((sum, value) => sum + value, 0) / references.length;
  const band =
    references.length >= BAND_MINIMUM ? bandOf(references, leastHalfWidth(tolerance, middle)) : null;
  const reference = band ? band.middle : references[0]!;
  const verdict =
    tolerance.kind === 'same' || !band
      ? judgeNumber(here, reference, tolerance)
      : judgeBand(here, band, tolerance);
  return {
    ...base,
    here,
    reference,
    low: band?.low ?? null,
    high: band?.high ?? null,
    n: references.length,
    ...verdict,
  };
}

function listRows(here: Value, references: readonly Value[], tolerance: Tolerance): Row[] {
  const mine = numbersOf(here.value);
  const lists = references.map((reference) => numbersOf(reference.value));
  const base = { key: here.key, unit: here.unit };
  const first = lists[0] ?? [];
  const angles = tolerance.kind === 'degrees';
  const paired = angles ? pairAngles(mine, first) : null;
  if (mine.length !== first.length || (angles && paired === null)) {
    return [
      {
        ...base,
        part: null,
        here: `${mine.length} of them`,
        reference: `${first.length} of them`,
        low: null,
        high: null,
        n: references.length,
        ...judged('undecided', 'The two do not have the same number of them, so they cannot be paired.'),
      },
    ];
  }
  return first.map((reference, i) => {
    // All members are brought into the first one's cycle, so that 719 and 1 degree lie two degrees apart.
    const others = lists.map((list) => {
      if (!angles) return list[i] ?? Number.NaN;
      return reference + (pairAngles(list, first)?.[i]?.difference ?? Number.NaN);
    });
    const value = paired ? reference + paired[i]!.difference : mine[i]!;
    return numberRow({ ...base, part: i + 1 }, value, others.filter(Number.isFinite), tolerance);
  });
}

function absentRow(here: Value | undefined, reference: Value): Row {
  const value = reference.value;
  const tellsOfTheEvent = reference.key === 'burn_time';
  return {
    key: reference.key,
    part: null,
    unit: reference.unit,
    here: null,
    reference: typeof value === 'object' ? null : value,
    low: null,
    high: null,
    n: 1,
    ...judged(
      tellsOfTheEvent && here?.reason === 'no burn line' ? 'outside' : 'undecided',
      here?.reason ? `Not had here: ${here.reason}.` : 'Not measured here.',
    ),
  };
}

/** The table: one row a value, or one a place of a list. Both sides come from one engine version. */
export function rowsOf(here: readonly Value[], references: readonly (readonly Value[])[]): Row[] {
  const rows: Row[] = [];
  const keys = new Set(references.flatMap((values) => values.map((value) => value.key)));
  for (const key of keys) {
    if (NOT_COMPARED.has(key)) continue;
    const theirs = references.flatMap((values) => {
      const value = values.find((candidate) => candidate.key === key);
      return value && value.value !== null ? [value] : [];
    });
    const first = theirs[0];
    if (!first) continue;
    const mine = here.find((value) => value.key === key);
    if (!mine || mine.value === null) {
      rows.push(absentRow(mine, first));
      continue;
    }
    const tolerance = TOLERANCES[key] ?? ANY_OTHER;
    if (key === 'irregular_teeth') rows.push(irregularRow(mine, theirs));
    else if (Array.isArray(mine.value)) rows.push(...listRows(mine, theirs, tolerance));
    else if (typeof mine.value === 'number' && typeof first.value === 'number') {
      const numbers = theirs.map((value) => value.value).filter((value) => typeof value === 'number');
      rows.push(numberRow({ key, part: null, unit: mine.unit }, mine.value, numbers, tolerance));
    } else if (typeof mine.value === 'string' || typeof mine.value === 'boolean') {
      const reference = first.value as string | boolean;
      const same = mine.value === reference;
      const otherwise = tolerance.kind === 'same' ? tolerance.otherwise : 'They differ.';
      rows.push({
        key,
        part: null,
        unit: mine.unit,
        here: mine.value,
        reference,
        low: null,
        high: null,
        n: theirs.length,
        ...(same ? judged('inside', 'the same') : judged('outside', otherwise)),
      });
    }
  }
  return rows;
}
