import { failure } from './failure.ts';
import { makePreview } from './preview.ts';
import { makeRemarks } from './remarks.ts';
import type { Scanner } from './scanner.ts';
import type { Start } from './start.ts';
import { findTiming, type Timing } from './timing.ts';
import type { ReadColumn, ReadOutcome } from './types.ts';

/** Makes the outcome from what the scanner holds; the scanner is empty afterwards. */
export function finishTable({ layout, head, plan }: Start, scanner: Scanner): ReadOutcome {
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
  const left = signalsOfOtherTimes(scanner, plan.otherTimes, plan.signals, timing);
  const finished = scanner.stage.columns.map((column) => column.finish());
  const remarks = makeRemarks(
    layout,
    scanner,
    timing,
    left,
    finished.map(({ rail }) => rail),
  );
  const columns: ReadColumn[] = [];
  finished.forEach(({ samples, rail }, i) => {
    const place = plan.signals[i]!;
    if (left.includes(place)) return;
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
