import type { Decimal, Delimiter, Encoding, TimeUnit } from './types.ts';
import type { Unit } from './units.ts';

/** How the rows are to be read; made from the first lines of the file. */
export interface Plan {
  readonly encoding: Encoding;
  readonly delimiter: Delimiter;
  readonly decimal: Decimal;
  readonly decimalKnown: boolean;
  /** Cells of an ordinary row, trailing empty ones included. */
  readonly cells: number;
  readonly timeColumn: number | null;
  readonly timeUnit: TimeUnit | null;
  readonly otherTimes: readonly number[];
  readonly signals: readonly number[];
  /** By file column; used to say where a cell stands. */
  readonly names: readonly string[];
  /** Text of the line of names, to know it again further down; null: none. */
  readonly namesText: string | null;
  /** Line number of the first line that will be scanned. */
  readonly firstLine: number;
  /** An empty line between rows of a one-column table is an empty cell. */
  readonly blankIsHole: boolean;
  /** By file column, where cells carry their unit: the unit that the column is read in; empty otherwise. */
  readonly cellUnits: readonly (Unit | null)[];
}

/** Why reading ended before the end of the file. */
export type Stop =
  | { readonly why: 'second table' | 'short rows'; readonly line: number }
  | { readonly why: 'time backwards'; readonly line: number; readonly found: string };
