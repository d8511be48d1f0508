import type { Layout } from './layout.ts';
import type { Scanner } from './scanner.ts';
import type { Timing } from './timing.ts';
import type { ReadColumn } from './types.ts';

/** Sentences about what was found and what was made of it: what happened, where, what was kept, what to do. */
export function makeRemarks(about: {
  readonly layout: Layout;
  readonly scanner: Scanner;
  readonly timing: Timing;
  /** Signals left out because they belong to another time column. */
  readonly leftForTime: readonly number[];
  /** Columns left out because they hold nothing. */
  readonly silent: readonly number[];
  readonly rails: readonly ReadColumn['rail'][];
}): string[] {
  const { layout, scanner, timing, leftForTime, silent, rails } = about;
  const { header, roles, dialect } = layout;
  const named = (column: number) =>
    header.names[column] ? `“${header.names[column]}”` : `column ${column + 1}`;
  const remarks: string[] = [];
  const { stop, footer } = scanner.keeper;

  if (stop?.why === 'second table') {
    remarks.push(
      `The file holds several tables. The first was read; the next begins at line ${stop.line} and was left out.`,
    );
  } else if (stop?.why === 'short rows') {
    remarks.push(
      `From about line ${stop.line} on the rows have another length. Reading stopped there; the rows before were kept.`,
    );
  }
  if (layout.isTimeUnitAssumed)
    remarks.push(
      'The file names no unit for the time. It was read as seconds; correct the unit if that is wrong.',
    );
  if (layout.timeUnit === 'clock' && scanner.cells.firstClockText !== null) {
    remarks.push(`The time column holds clock times. 0 s stands for ${scanner.cells.firstClockText}.`);
  }
  if (dialect.groupsInDoubt) {
    remarks.push(
      'The comma was read as the decimal mark, but it could as well mark thousands. Correct the decimal mark if the values are a thousand times too small.',
    );
  }
  const axis = timing.axis;
  if (timing.printedToS !== null && axis.kind === 'even') {
    remarks.push(
      `Times are printed to ${Number(timing.printedToS.toPrecision(2))} s only. The rows were taken as evenly spaced from the first time to the last, ${Number(axis.stepS.toPrecision(4))} s apart.`,
    );
  }
  if (axis.kind === 'uneven' && axis.timesS.length > 2) {
    remarks.push(
      axis.holds
        ? 'The file holds changes only: each level is held until the next row.'
        : 'The steps between the rows differ. Each row keeps its own time.',
    );
  }
  if (timing.kept !== null) {
    const gone = scanner.stage.rows - timing.kept.length;
    remarks.push(`${count(gone, 'row')} without a readable time ${gone === 1 ? 'was' : 'were'} left out.`);
  }
  roles.otherTimes.forEach((column, i) => {
    const off = scanner.stage.otherTimeOffBy[i] ?? 0;
    const lost = leftForTime.filter(
      (signal) => signal > column && !roles.otherTimes.some((c) => c > column && c < signal),
    );
    if (lost.length > 0) {
      remarks.push(
        `${cap(named(column))} is a second time column, up to ${Number(off.toPrecision(3))} s away from the first. ${lost.map(named).join(', ')} ${lost.length === 1 ? 'belongs' : 'belong'} to it and ${lost.length === 1 ? 'was' : 'were'} left out; choose that time column to read ${lost.length === 1 ? 'it' : 'them'}.`,
      );
    } else if (off > 0) {
      remarks.push(
        `${cap(named(column))} is a second time column, at most ${Number(off.toPrecision(3))} s away from the first, which was used for all signals.`,
      );
    } else remarks.push(`${cap(named(column))} repeats the time and was left out.`);
  });
  const unread = [...roles.leftOut, ...silent].filter((column) => header.names[column]);
  if (unread.length > 0 && unread.length <= 8)
    remarks.push(`Left out, as they hold no signal: ${unread.map(named).join(', ')}.`);

  scanner.stage.columns.forEach((column, i) => {
    if (silent.includes(roles.signals[i]!)) return;
    const name = cap(named(roles.signals[i]!));
    for (const [cells, side, extreme] of [
      [column.high, 'highest', rails[i]?.high ?? null],
      [column.low, 'lowest', rails[i]?.low ?? null],
    ] as const) {
      if (cells === null) continue;
      const kept =
        extreme !== null
          ? `They were set to ${Number(extreme.toPrecision(6))}, the ${side} number of the column, as the input's limit: the true value lies beyond.`
          : 'They are holes, since the column has no number to tell the limit.';
      remarks.push(
        `${name} was over range in ${count(cells.count, 'row')} (“${cells.word}”, first at line ${cells.firstLine}). ${kept}`,
      );
    }
    if (column.holes > 0) {
      remarks.push(`${name} has ${count(column.holes, 'hole')}: cells that are empty or cannot be read.`);
    }
    if (column.tooLarge > 0)
      remarks.push(`${name} has ${count(column.tooLarge, 'number')} beyond 3.4e38; they are holes.`);
  });
  if (scanner.keeper.repeatedNames > 0)
    remarks.push(
      `The line of names stands ${count(scanner.keeper.repeatedNames, 'more time')} inside the table; the rows were joined, since time goes on.`,
    );
  if (footer !== null && stop === null) {
    const last = footer.from + footer.count - 1;
    remarks.push(
      footer.count === 1
        ? `Line ${footer.from}, after the table, is text and was left out.`
        : `Lines ${footer.from} to ${last}, after the table, are text and were left out.`,
    );
  }
  return remarks;
}

const count = (n: number, thing: string) => `${n.toLocaleString('en-GB')} ${thing}${n === 1 ? '' : 's'}`;
const cap = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);
