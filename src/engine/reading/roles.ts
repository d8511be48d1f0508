import { cellKind, cellNumber } from './cellKind.ts';
import type { Dialect } from './dialect.ts';
import type { Header } from './header.ts';
import { isCounterName, isTimeName } from './names.ts';
import type { ReadingHints } from './types.ts';

export interface Roles {
  /** File column of the time axis; null: none. */
  readonly time: number | null;
  /** True when the time column holds clock times. */
  readonly clock: boolean;
  /** Further columns of time, in file order. */
  readonly otherTimes: readonly number[];
  readonly signals: readonly number[];
  /** Columns that only count rows, hold dates or text, or are empty and nameless. */
  readonly leftOut: readonly number[];
}

interface Shape {
  readonly numbers: number;
  readonly clocks: number;
  readonly texts: number;
  readonly filled: number;
  /** Never falls and rises at least once. */
  readonly rises: boolean;
  readonly mostlyUp: boolean;
  /** Rises by the same step all along, within 2 %. */
  readonly even: boolean;
}

/**
 * Which column is time and which are signals, from names, units and the first rows. A column named like time, or in
 * seconds, must rise to be taken. Without names the first column is time when it rises.
 */
export function findRoles(
  rows: readonly (readonly string[])[],
  dialect: Dialect,
  header: Header,
  hints: ReadingHints,
  intervalKnown: boolean,
): Roles {
  const shapes = Array.from({ length: dialect.cells }, (_, column) => shapeOf(rows, column, dialect));
  const nameless = header.namesAt === null;
  const isTime = (column: number): boolean => {
    const shape = shapes[column]!;
    const name = header.names[column] ?? '';
    if (shape.clocks > 0 && shape.clocks >= shape.numbers) return true;
    if (shape.numbers === 0) return false;
    // A column called time is one even where it falls, so that the fall can be told; a bare "x" or "t" must rise.
    if (isTimeName(name))
      return shape.mostlyUp || rows.length === 1 || /time|zeit|temps|tiempo|tempo/i.test(name);
    return header.units[column]?.unit === 's' && (shape.rises || rows.length === 1);
  };
  const columns = shapes.map((_, column) => column);
  let times = columns.filter(isTime);
  const counters = columns.filter(
    (column) =>
      isCounterName(header.names[column] ?? '') &&
      (header.units[column] ?? null) === null &&
      shapes[column]!.rises &&
      !times.includes(column),
  );
  if (times.length === 0 && dialect.cells > 1) {
    const first = columns.find((column) => !counters.includes(column) && shapes[column]!.filled > 0);
    const shape = first === undefined ? undefined : shapes[first];
    const trusted = shape?.rises && (nameless ? !intervalKnown || shape.even : shape.even && !intervalKnown);
    if (first !== undefined && trusted && counters.length === 0 && rows.length > 2) times = [first];
  }
  const time = hints.timeColumn === undefined ? (times[0] ?? null) : hints.timeColumn;
  const leftOut: number[] = [];
  const signals: number[] = [];
  const otherTimes: number[] = [];
  for (const column of columns) {
    const shape = shapes[column]!;
    const unnamedAndEmpty = shape.filled === 0 && (header.names[column] ?? '') === '';
    if (column === time) continue;
    if (hints.columns !== undefined) (hints.columns.includes(column) ? signals : leftOut).push(column);
    else if (times.includes(column)) otherTimes.push(column);
    else if (
      counters.includes(column) ||
      unnamedAndEmpty ||
      (shape.filled > 0 && shape.texts === shape.filled)
    )
      leftOut.push(column);
    else signals.push(column);
  }
  const clock = time !== null && (shapes[time]?.clocks ?? 0) > (shapes[time]?.numbers ?? 0);
  return { time, clock, otherTimes, signals, leftOut };
}

function shapeOf(rows: readonly (readonly string[])[], column: number, dialect: Dialect): Shape {
  let numbers = 0;
  let clocks = 0;
  let texts = 0;
  let filled = 0;
  let falls = 0;
  let last = Number.NaN;
  const steps: number[] = [];
  for (const row of rows) {
    const cell = row[column] ?? '';
    const kind = cellKind(cell, dialect.decimal);
    if (kind !== 'empty') filled++;
    if (kind === 'clock') clocks++;
    if (kind === 'text' || kind === 'date') texts++;
    if (kind !== 'number' && kind !== 'grouped') continue;
    numbers++;
    const value = cellNumber(cell, dialect.decimal);
    if (value < last) falls++;
    if (!Number.isNaN(last)) steps.push(value - last);
    last = value;
  }
  const up = steps.filter((step) => step > 0).length;
  const middle = [...steps].sort((a, b) => a - b)[steps.length >> 1] ?? 0;
  const near = steps.filter((step) => Math.abs(step - middle) <= 0.02 * middle).length;
  return {
    numbers,
    clocks,
    texts,
    filled,
    mostlyUp: up > 0.5 * steps.length,
    rises: up > 0 && falls <= 0.05 * steps.length,
    even: middle > 0 && near >= 0.9 * steps.length,
  };
}
