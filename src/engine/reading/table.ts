import { failure } from './failure.ts';
import { makePreview } from './preview.ts';
import { makeRemarks } from './remarks.ts';
import type { Scanner } from './scanner.ts';
import type { Start } from './start.ts';
import { findTiming, type Timing } from './timing.ts';
import type { ReadColumn, ReadOutcome } from './types.ts';

/** Makes the outcome from what the scanner holds; the scanner is empty afterwards. */
export function finishTable({ layout, head, plan, isChosen }: Start, scanner: Scanner): ReadOutcome {
  const { dialect, header, roles, preamble } = layout;
  const preview = makePreview(layout);
  const first = plan.firstLine;
  if (!scanner.stage.columns.some((column) => column.hasNumbers)) {
    return failure(
      'no_numbers',
      `From line ${first} on no cell of a signal holds a number.`,
      'Check the delimiter, the decimal mark and the columns.',
      preview,
      first,
    );
  }
  const timing = findTiming(scanner, layout);
  if (timing === null) {
    return failure(
      'no_numbers',
      `No row from line ${first} on has a time that can be read.`,
      'Choose the column that holds the time, or enter the sample interval.',
      preview,
      first,
    );
  }
  const unread = scanner.stage.rows - (timing.kept?.length ?? scanner.stage.rows);
  if (2 * unread > scanner.stage.rows) {
    return failure(
      'no_numbers',
      `The time cannot be read in ${unread} of ${scanner.stage.rows} rows from line ${first} on.`,
      'Check the decimal mark, the unit of time and which column holds the time.',
      preview,
      scanner.keeper.rejections.first[0]?.line ?? first,
    );
  }
  const { axis } = timing;
  if (axis.kind === 'uneven' && axis.timesS.length > 2 && axis.timesS[0] === axis.timesS.at(-1)) {
    return failure(
      'interval_needed',
      `The time is the same in all rows from line ${first} on, so it cannot tell when the samples were taken.`,
      'Enter the sample interval, or choose another column for the time.',
      preview,
      first,
    );
  }
  const left = signalsOfOtherTimes(scanner, plan.otherTimes, plan.signals, timing);
  const silent = silentColumns(scanner, plan.signals, isChosen);
  const finished = scanner.stage.columns.map((column, i) =>
    left.includes(plan.signals[i]!) || silent.includes(plan.signals[i]!) ? null : column.finish(),
  );
  const remarks = makeRemarks({
    layout,
    scanner,
    timing,
    leftForTime: left,
    silent,
    rails: finished.map((column) => column?.rail ?? null),
  });
  const columns: ReadColumn[] = [];
  finished.forEach((column, i) => {
    if (column === null) return;
    const { samples, rail } = column;
    const place = plan.signals[i]!;
    const unit = header.units[place] ?? null;
    columns.push({
      column: place,
      name: header.names[place] || `Column ${place + 1}`,
      unit: unit?.unit ?? null,
      factor: unit?.factor ?? 1,
      samples: timing.kept === null ? samples : Float32Array.from(timing.kept, (row) => samples[row]!),
      rail,
    });
  });
  const clock = layout.timeUnit === 'clock' ? scanner.cells.firstClockText : null;
  return {
    ok: true,
    reading: {
      encoding: head.encoding,
      delimiter: dialect.delimiter,
      decimal: scanner.cells.decimal,
      timeUnit: layout.timeUnit,
      timeColumn: roles.time,
      headerLine: header.namesAt === null ? null : layout.lines[header.namesAt]!.line,
      rows: timing.kept?.length ?? scanner.stage.rows,
      rejectedRows: scanner.keeper.rejections.first,
      rejectedCount: scanner.keeper.rejections.count,
      recordedAt: preamble.recordedAt ?? clock,
      remarks,
    },
    axis: timing.axis,
    columns,
    preview,
  };
}

/** Signals behind a further time column that is more than half a step away from the first: their times are others. */
function signalsOfOtherTimes(
  scanner: Scanner,
  others: readonly number[],
  signals: readonly number[],
  timing: Timing,
): number[] {
  const { axis } = timing;
  const span =
    axis.kind === 'even' ? axis.stepS * axis.count : (axis.timesS.at(-1) ?? 0) - (axis.timesS[0] ?? 0);
  const step = span / Math.max(1, scanner.stage.rows);
  const left: number[] = [];
  others.forEach((column, i) => {
    if ((scanner.stage.otherTimeOffBy[i] ?? 0) <= step / 2) return;
    const next = others[i + 1] ?? Number.POSITIVE_INFINITY;
    left.push(...signals.filter((signal) => signal > column && signal < next));
  });
  // Were all signals to go, the choice of the time column is what is wrong; they are kept and the remark tells.
  return left.length === signals.length ? [] : left;
}

/** Columns in which nothing was recorded: no number, nothing over range. What a person chose is kept even so. */
function silentColumns(scanner: Scanner, signals: readonly number[], isChosen: boolean): number[] {
  if (isChosen) return [];
  return signals.filter((_, i) => {
    const column = scanner.stage.columns[i]!;
    return !column.hasNumbers && column.high === null && column.low === null;
  });
}
