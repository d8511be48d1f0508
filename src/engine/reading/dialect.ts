import { type CellKind, cellKind } from './cellKind.ts';
import { splitCells } from './cells.ts';
import type { HeadLine } from './lines.ts';
import { quantityOf } from './quantity.ts';
import type { Decimal, Delimiter, ReadingHints } from './types.ts';

export interface Dialect {
  readonly delimiter: Delimiter;
  readonly decimal: Decimal;
  /** False when no cell of the head holds a decimal mark, so that the first one met decides. */
  readonly decimalKnown: boolean;
  /** Cells of an ordinary row, those after trailing delimiters included. */
  readonly cells: number;
  /** Index into the head's lines of the first row of numbers; null when there is none. */
  readonly firstRow: number | null;
  /** Indices of the head's lines that are ordinary rows. */
  readonly rows: readonly number[];
  /** True when the same cells could as well be whole numbers with thousands marks. */
  readonly groupsInDoubt: boolean;
  /** True when numbers carry their unit inside the cell. */
  readonly quantities: boolean;
}

const DELIMITERS: readonly Delimiter[] = [',', ';', '\t', '|', ' '];
/** Lines that are looked at; a preamble longer than this is not expected. */
export const MOST_SNIFFED_LINES = 1500;

/** Lines that mostly suffice. */
const FEW_LINES = 400;

interface Tried extends Dialect {
  readonly score: number;
}

/**
 * How a table is written, from its first lines: each pair of delimiter and decimal mark is tried, and the one under
 * which most lines become rows of equally many numbers is taken. Near ties ("1,5" is two numbers or one) go by, in
 * turn: as many names above as cells, no sign of decimal commas torn apart, a first column that rises as time does,
 * more columns, no thousands marks.
 */
export function detectDialect(lines: readonly HeadLine[], hints: ReadingHints): Dialect {
  const few = detectIn(lines.slice(0, FEW_LINES), hints);
  return few.rows.length >= 20 || lines.length <= FEW_LINES ? few : detectIn(lines, hints);
}

function detectIn(lines: readonly HeadLine[], hints: ReadingHints): Dialect {
  const delimiters = hints.delimiter === undefined ? delimitersIn(lines) : [hints.delimiter];
  const decimals: readonly Decimal[] = hints.decimal === undefined ? ['.', ','] : [hints.decimal];
  const pairs = delimiters
    .flatMap((delimiter) => decimals.map((decimal) => ({ delimiter, decimal })))
    .filter(({ delimiter, decimal }) => delimiter !== decimal || hints.decimal !== undefined);
  const bestOf = (loose: boolean, quantities = false) =>
    pairs
      .map(({ delimiter, decimal }) =>
        tryDialect(lines, delimiter, decimal, hints.headerLine ?? null, loose, quantities),
      )
      .reduce(
        (best, tried) => (tried !== null && (best === null || tried.score > best.score) ? tried : best),
        null,
      );
  const strict = bestOf(false);
  const isEnough = strict !== null && (strict.rows.length > 2 || strict.rows.length * 3 > lines.length);
  const withUnits = isEnough ? null : bestOf(false, true);
  const isUnitsEnough =
    withUnits !== null && withUnits.rows.length > 2 && withUnits.rows.length > (strict?.rows.length ?? 0);
  const best = isEnough ? strict : isUnitsEnough ? withUnits : (bestOf(true) ?? strict);
  const none = {
    cells: 0,
    decimalKnown: false,
    firstRow: null,
    rows: [],
    groupsInDoubt: false,
    quantities: false,
  };
  return best ?? { ...none, delimiter: hints.delimiter ?? ',', decimal: hints.decimal ?? '.' };
}

/** The delimiters that occur, and one that does not: it stands for a table of one column. */
function delimitersIn(lines: readonly HeadLine[]): Delimiter[] {
  const occurs = (delimiter: Delimiter) => lines.some(({ text }) => text.includes(delimiter));
  const absent = DELIMITERS.find((delimiter) => !occurs(delimiter));
  return DELIMITERS.filter((delimiter) => delimiter === absent || occurs(delimiter));
}

function tryDialect(
  lines: readonly HeadLine[],
  delimiter: Delimiter,
  decimal: Decimal,
  headerLine: number | null,
  loose: boolean,
  quantities: boolean,
): Tried | null {
  const bare = (cell: string) => (quantities ? (quantityOf(cell, decimal)?.number ?? cell) : cell);
  const split = lines.map(({ text }) => (text.trim() === '' ? [] : splitCells(text, delimiter).map(bare)));
  const kinds = split.map((cells) => cells.map((cell) => cellKind(cell, decimal)));
  const isRow = kinds.map((row, i) => lines[i]!.line > (headerLine ?? 0) && isRowOfNumbers(row, loose));
  const counts = new Map<number, number>();
  for (let i = 0; i < split.length; i++) {
    if (isRow[i]) counts.set(split[i]!.length, (counts.get(split[i]!.length) ?? 0) + 1);
  }
  if (counts.size === 0) return null;
  const cells = [...counts].reduce((a, b) => (b[1] > a[1] ? b : a))[0];
  const rows: number[] = [];
  for (let i = 0; i < split.length; i++) if (isRow[i] && split[i]!.length === cells) rows.push(i);
  const firstRow = rows.find((row, k) => rows.length === 1 || followsOn(lines, row, rows[k + 1])) ?? rows[0]!;
  const table = rows.filter((row) => row >= firstRow);

  const flat = table.flatMap((row) => split[row]!.map((cell, i) => ({ cell, kind: kinds[row]![i]! })));
  const grouped = flat.filter(({ kind }) => kind === 'grouped').length;
  const marked = flat.filter(({ cell, kind }) => kind === 'number' && cell.includes(decimal)).length;
  const torn = delimiter === ',' && flat.some(({ cell }) => /^(-0|0\d+)$/.test(cell));
  const named = namesAbove(lines, firstRow, delimiter) === cells;
  const rising = cells > 1 && rises(table.map((row) => split[row]![0]!));
  const filled = lines.filter(({ text }) => text.trim() !== '').length;
  const score =
    100 * (table.length / filled) +
    (named ? 1 : 0) +
    (torn ? -2 : 0) +
    (rising ? 0.5 : 0) +
    Math.min(cells, 16) * 0.02 -
    (grouped > 0 ? 0.3 : 0) -
    (delimiter === ' ' ? 0.25 : 0) -
    (loose ? 5 : 0) +
    (decimal === '.' ? 0.001 : 0) +
    (marked > 0 && decimal === ',' ? 0.01 : 0);
  const decimalKnown = marked > 0 || grouped > 0 || delimiter === ',';
  const groupsInDoubt =
    decimal === ',' &&
    marked > 2 &&
    flat.every(
      ({ cell, kind }) => kind !== 'number' || !cell.includes(',') || /^[+-]?[1-9]\d{0,2},\d{3}$/.test(cell),
    );
  return { delimiter, decimal, decimalKnown, cells, firstRow, rows: table, groupsInDoubt, quantities, score };
}

/** A row holds at least one number or clock time, and no text; loosely: more of those than of text. */
function isRowOfNumbers(kinds: readonly CellKind[], loose: boolean): boolean {
  let numbers = 0;
  let texts = 0;
  for (const kind of kinds) {
    if (kind === 'number' || kind === 'grouped' || kind === 'clock') numbers++;
    else if (kind === 'text') texts++;
  }
  return numbers > 0 && (texts === 0 || (loose && kinds.length > 1 && numbers >= texts));
}

/** True when only empty lines stand between a row and the next: a lone number in the preamble is no row. */
function followsOn(lines: readonly HeadLine[], row: number, next: number | undefined): boolean {
  if (next === undefined) return false;
  for (let i = row + 1; i < next; i++) if (lines[i]!.text.trim() !== '') return false;
  return true;
}

/** Cells of the nearest line above the rows that is not empty. */
function namesAbove(lines: readonly HeadLine[], firstRow: number, delimiter: Delimiter): number {
  for (let i = firstRow - 1; i >= 0; i--) {
    const text = lines[i]!.text.trim();
    if (text !== '') return splitCells(text, delimiter).length;
  }
  return 0;
}

function rises(cells: readonly string[]): boolean {
  let up = 0;
  for (let i = 1; i < cells.length; i++) {
    const step = Number(cells[i]!.replace(',', '.')) - Number(cells[i - 1]!.replace(',', '.'));
    if (step > 0) up++;
    else if (step < 0) return false;
  }
  return cells.length > 1 && up > 0.5 * (cells.length - 1);
}
