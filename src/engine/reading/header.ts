import { cellKind } from './cellKind.ts';
import { splitCells } from './cells.ts';
import type { Dialect } from './dialect.ts';
import type { HeadLine } from './lines.ts';
import { isTimeName, splitName } from './names.ts';
import { isPreambleLine } from './preamble.ts';
import type { ReadingHints } from './types.ts';
import { parseUnit, type Unit } from './units.ts';

export interface Header {
  /** Indices into the head's lines; null: there is no such line. */
  readonly namesAt: number | null;
  readonly unitsAt: number | null;
  /** By file column; empty text where a column has no name. */
  readonly names: readonly string[];
  readonly units: readonly (Unit | null)[];
}

/**
 * Names and units above the first row: the nearest lines that are not empty. A line of units alone may stand between
 * names and numbers; one other line (kinds of data, say) may as well. Lines that tell interval, date or start are
 * never names.
 */
export function findHeader(lines: readonly HeadLine[], dialect: Dialect, hints: ReadingHints): Header {
  const { delimiter, firstRow } = dialect;
  if (firstRow === null) return { namesAt: null, unitsAt: null, names: [], units: [] };
  let unitsAt: number | null = null;
  let namesAt: number | null = null;
  let others = 0;
  for (let i = firstRow - 1; i >= 0 && others < 2 && namesAt === null; i--) {
    const { text, line } = lines[i]!;
    if (text.trim() === '') continue;
    const cells = splitCells(text, delimiter);
    if (hints.headerLine === undefined || hints.headerLine === null) {
      if (unitsAt === null && isUnits(cells, dialect.cells)) unitsAt = i;
      else if (hints.headerLine === undefined && isNames(text, cells, dialect)) namesAt = i;
      else others++;
    } else if (line === hints.headerLine) namesAt = i;
    else if (line > hints.headerLine && unitsAt === null && isUnits(cells, dialect.cells)) unitsAt = i;
  }
  // A line of units alone with nothing above it: "V;A" is then the best name there is.
  if (namesAt === null && unitsAt !== null && hints.headerLine === undefined) {
    const bare = splitCells(lines[unitsAt]!.text, delimiter).some(
      (cell) => !/^[([{<].*[)\]}>]$/.test(cell) && cell !== '',
    );
    if (bare) [namesAt, unitsAt] = [unitsAt, null];
  }
  const headings = namesAt === null ? [] : splitCells(lines[namesAt]!.text, delimiter).map(splitName);
  const unitCells = unitsAt === null ? [] : splitCells(lines[unitsAt]!.text, delimiter);
  const width = Math.max(headings.length, unitCells.length, dialect.cells);
  return {
    namesAt,
    unitsAt,
    names: Array.from({ length: width }, (_, i) => headings[i]?.name ?? ''),
    units: Array.from(
      { length: width },
      (_, i) => parseUnit(unitCells[i] ?? '') ?? headings[i]?.unit ?? null,
    ),
  };
}

/** Every cell that is not empty is a unit, or stands in brackets; at least one is a unit we know. */
function isUnits(cells: readonly string[], width: number): boolean {
  const filled = cells.filter((cell) => cell !== '' && cell !== '-');
  if (filled.length === 0 || cells.length > width + 1 || (width > 1 && cells.length < 2)) return false;
  return (
    filled.every((cell) => parseUnit(cell) !== null || /^[([{<][^()[\]{}<>]*[)\]}>]$/.test(cell)) &&
    filled.some((cell) => parseUnit(cell) !== null)
  );
}

function isNames(text: string, cells: readonly string[], dialect: Dialect): boolean {
  const { cells: width, delimiter, decimal } = dialect;
  const filled = cells.filter((cell) => cell !== '');
  const words = filled.filter((cell) => cellKind(cell, decimal) === 'text');
  if (words.length === 0) return false;
  // Channels may be named by numbers alone, after a heading for the time.
  if (words.length * 2 < filled.length - 1 && !isTimeName(cells[0]!)) return false;
  const trimmed = cells.findLastIndex((cell) => cell !== '') + 1;
  if (width === 1) return trimmed === 1 && !isPreambleLine(text, delimiter) && text.length <= 60;
  if (trimmed < 2 || trimmed > width + 1 || cells.length < width - 1) return false;
  // "Interval;0.001" has the form of names as well; a number in the second cell gives it away.
  return !(words.length < filled.length && isPreambleLine(text, delimiter));
}
