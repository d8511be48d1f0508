import type { TimeAxis } from '../capture.ts';
import { findEven } from './axis.ts';
import type { Layout } from './layout.ts';
import type { Scanner } from './scanner.ts';
import { TimeColumn } from './times.ts';

export interface Timing {
  readonly axis: TimeAxis;
  /** Rows to keep, by their place; null: all. Rows without a time have none in an uneven file. */
  readonly kept: Uint32Array | null;
  readonly printedToS: number | null;
  readonly isChangesOnly: boolean;
}

/** Share of rows in which some logic level changes from which on a file holds changes only. */
const CHANGES_SHARE = 0.95;

/**
 * When the rows were taken. Logic levels that change in (nearly) every row are changes only and hold until the next
 * row, even if their steps happen to be equal: nobody samples a signal at exactly half its rate for the whole file.
 * null: no row has a time.
 */
export function findTiming(scanner: Scanner, layout: Layout): Timing | null {
  if (layout.roles.time === null) {
    const axis = {
      kind: 'even',
      startS: layout.preamble.startS ?? 0,
      stepS: layout.intervalS!,
      count: scanner.stage.rows,
    } as const;
    return { axis, kept: null, printedToS: null, isChangesOnly: false };
  }
  const { times, rows, columns, changedRows } = scanner.stage;
  const isLogic = columns.every((column) => column.isTwoValued) && columns.some((column) => column.isLogic);
  const isChangesOnly = isLogic && rows >= 4 && changedRows >= CHANGES_SHARE * rows;
  const inPlace = isChangesOnly ? null : findEven(times);
  if (inPlace !== null) return even(inPlace, rows, null);

  const all = times.toArray();
  const kept = rowsWithTime(all);
  if (kept?.length === 0) return null;
  const timesS = kept === null ? all : Float64Array.from(kept, (row) => all[row]!);
  if (kept !== null && !isChangesOnly) {
    const without = new TimeColumn();
    without.append(timesS);
    const found = findEven(without);
    if (found !== null) return even(found, kept.length, kept);
  }
  return { axis: { kind: 'uneven', timesS, holds: isLogic }, kept, printedToS: null, isChangesOnly };
}

function even(
  found: NonNullable<ReturnType<typeof findEven>>,
  count: number,
  kept: Uint32Array | null,
): Timing {
  const axis = { kind: 'even', startS: found.startS, stepS: found.stepS, count } as const;
  return { axis, kept, printedToS: found.printedToS, isChangesOnly: false };
}

/** Places of the rows that have a time; null when all have. */
function rowsWithTime(times: Float64Array): Uint32Array | null {
  let count = 0;
  for (let i = 0; i < times.length; i++) if (!Number.isNaN(times[i]!)) count++;
  if (count === times.length) return null;
  const kept = new Uint32Array(count);
  let at = 0;
  for (let i = 0; i < times.length; i++) if (!Number.isNaN(times[i]!)) kept[at++] = i;
  return kept;
}
