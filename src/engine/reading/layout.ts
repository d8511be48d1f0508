import { splitCells } from './cells.ts';
import { type Dialect, detectDialect, MOST_SNIFFED_LINES } from './dialect.ts';
import { findHeader, type Header } from './header.ts';
import { type HeadLine, joinHeadings, splitLines } from './lines.ts';
import { type Preamble, readPreamble } from './preamble.ts';
import { quantityOf } from './quantity.ts';
import { findRoles, type Roles } from './roles.ts';
import type { Delimiter, Encoding, ReadingHints, TimeUnit } from './types.ts';
import { timeUnitOf } from './units.ts';

/** Everything that the first lines tell about a file. */
export interface Layout {
  readonly lines: readonly HeadLine[];
  readonly dialect: Dialect;
  readonly header: Header;
  readonly preamble: Preamble;
  readonly roles: Roles;
  readonly intervalS: number | null;
  readonly timeUnit: TimeUnit | null;
  /** True when neither file nor person said the unit of time. */
  readonly isTimeUnitAssumed: boolean;
}

/** Understands the head of a file: its own words first corrected by what a person said. */
export function findLayout(
  head: Uint8Array,
  encoding: Encoding,
  isWholeFile: boolean,
  said: ReadingHints,
): Layout {
  const lines = joinHeadings(splitLines(head, encoding, isWholeFile, MOST_SNIFFED_LINES));
  const separator = /^\s*"?sep=(.)"?\s*$/i.exec(lines[0]?.text ?? '')?.[1];
  const hints =
    said.delimiter === undefined && isDelimiter(separator) ? { ...said, delimiter: separator } : said;
  const dialect = detectDialect(lines, hints);
  const named = findHeader(lines, dialect, hints);
  const header = dialect.quantities ? withCellUnits(named, lines, dialect) : named;
  const above = lines.slice(0, header.namesAt ?? header.unitsAt ?? dialect.firstRow ?? lines.length);
  const preamble = readPreamble(
    above.map(({ text }) => text),
    dialect.delimiter,
    dialect.decimal,
  );
  const intervalS = hints.sampleIntervalS ?? preamble.intervalS;
  const bare = (cell: string) =>
    dialect.quantities ? (quantityOf(cell, dialect.decimal)?.number ?? cell) : cell;
  const rows = dialect.rows.map((row) => splitCells(lines[row]!.text, dialect.delimiter).map(bare));
  const roles = findRoles(rows, dialect, header, hints, intervalS !== null);
  const unit =
    roles.time === null ? null : timeUnit(hints, header, preamble, roles, rows, dialect.decimal === ',');
  return {
    lines,
    dialect,
    header,
    preamble,
    roles,
    intervalS,
    timeUnit: roles.time === null ? null : (unit ?? 's'),
    isTimeUnitAssumed: roles.time !== null && unit === null,
  };
}

/** Units inside the cells of the first rows go before those of the header: a column's first one counts. */
function withCellUnits(header: Header, lines: readonly HeadLine[], dialect: Dialect): Header {
  const units = Array.from(
    { length: Math.max(header.units.length, dialect.cells) },
    (_, i) => header.units[i] ?? null,
  );
  const names = units.map((_, i) => header.names[i] ?? '');
  for (const row of [...dialect.rows].reverse()) {
    splitCells(lines[row]!.text, dialect.delimiter).forEach((cell, column) => {
      const unit = quantityOf(cell, dialect.decimal)?.unit;
      if (unit !== undefined && column < units.length) units[column] = unit;
    });
  }
  return { ...header, names, units };
}

function isDelimiter(text: string | undefined): text is Delimiter {
  return text === ',' || text === ';' || text === '\t' || text === '|' || text === ' ';
}

/** The unit said by the person, the header, the lines above, or the one in which the steps fit the sample interval. */
function timeUnit(
  hints: ReadingHints,
  header: Header,
  preamble: Preamble,
  roles: Roles,
  rows: readonly (readonly string[])[],
  commas: boolean,
): TimeUnit | null {
  if (hints.timeUnit !== undefined) return hints.timeUnit;
  if (roles.clock) return 'clock';
  const said = timeUnitOf(header.units[roles.time!] ?? null) ?? preamble.timeUnit;
  if (said !== null || preamble.intervalS === null || rows.length < 3) return said;
  const at = (row: number) => Number((rows[row]![roles.time!] ?? '').replace(commas ? ',' : '.', '.'));
  const step = (at(rows.length - 1) - at(0)) / (rows.length - 1);
  const units: readonly (readonly [TimeUnit, number])[] = [
    ['s', 1],
    ['ms', 1e3],
    ['us', 1e6],
    ['ns', 1e9],
  ];
  return (
    units.find(([, perSecond]) => Math.abs(step / perSecond / preamble.intervalS! - 1) < 0.02)?.[0] ?? null
  );
}
