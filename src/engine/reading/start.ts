import { failure } from './failure.ts';
import { type Head, openHead } from './head.ts';
import { findLayout, type Layout } from './layout.ts';
import { notText } from './notText.ts';
import type { Plan } from './plan.ts';
import { makePreview, plainPreview } from './preview.ts';
import type { ReadFailure, ReadingHints } from './types.ts';

/** More columns than this are refused; the widest logic recorders in use stay well below. */
export const MOST_COLUMNS = 1024;

export interface Start {
  readonly ok: true;
  readonly head: Head;
  readonly layout: Layout;
  readonly plan: Plan;
  /** True when a person said which columns to read. */
  readonly isChosen: boolean;
  /** Where the first row begins in the head's bytes. */
  readonly firstRowAt: number;
}

/** Makes the plan for reading from the first bytes of a file, or says why it cannot be read. */
export function startReading(
  raw: Uint8Array,
  isWholeFile: boolean,
  hints: ReadingHints,
): Start | ReadFailure {
  if (raw.length === 0)
    return failure(
      'empty_file',
      'The file is empty: it holds not one byte.',
      'Export the capture again and check that the file has a size before uploading it.',
    );
  const head = openHead(raw, hints);
  const isUtf16 = head.encoding === 'utf-16le' || head.encoding === 'utf-16be';
  const binary = notText(isUtf16 ? head.bytes : raw);
  if (binary !== null) return failure('not_text', `The file is ${binary.kind}, not text.`, binary.hint);
  const layout = findLayout(head.bytes, head.encoding, isWholeFile, hints);
  const { dialect, roles, header, lines } = layout;
  const refuse = (code: ReadFailure['code'], message: string, hint: string, line: number | null) =>
    failure(
      code,
      message,
      hint,
      dialect.firstRow === null
        ? plainPreview(head.bytes.subarray(0, 1 << 16), head.encoding)
        : makePreview(layout),
      line,
    );

  if (dialect.firstRow === null) {
    const isBlank = lines.every(({ text }) => text.trim() === '') && isWholeFile;
    if (isBlank)
      return refuse(
        'empty_file',
        'The file holds no text, only empty lines.',
        'Export the capture again.',
        null,
      );
    return refuse(
      'no_numbers',
      `No row of numbers was found in the first ${lines.length === 1 ? 'line' : `${lines.length} lines`}.`,
      'Check that the export holds the samples and not only settings or a picture, or name the delimiter, the decimal mark and the line of names.',
      lines[0]?.line ?? null,
    );
  }
  const first = lines[dialect.firstRow]!;
  if (dialect.cells > MOST_COLUMNS) {
    return refuse(
      'too_many_columns',
      `Line ${first.line} has ${dialect.cells} columns; at most ${MOST_COLUMNS} can be read.`,
      'Export fewer channels. If each row holds one channel, export the table the other way round.',
      first.line,
    );
  }
  const torn = tornDecimals(layout);
  if (torn !== null)
    return refuse(
      'no_numbers',
      torn,
      'Export with a decimal point, or with semicolons or tabs between the cells.',
      first.line,
    );
  if (roles.signals.length === 0) {
    return refuse(
      'one_column',
      roles.time === null
        ? `No column of samples was found from line ${first.line} on.`
        : 'The file holds only one column, the time. There is no signal in it.',
      'Export time and at least one channel, or name the columns to read.',
      first.line,
    );
  }
  if (roles.time === null && layout.intervalS === null) {
    return refuse(
      'interval_needed',
      `The file has ${dialect.cells === 1 ? 'one column of numbers and' : ''} no time column, and the lines above the table name no sample interval.`.replace(
        'has  no',
        'has no',
      ),
      'Enter the sample interval; reading then starts again from the original.',
      first.line,
    );
  }
  const blank = lines.slice(dialect.firstRow).filter(({ text }) => text.trim() === '').length;
  const plan: Plan = {
    encoding: isUtf16 ? 'utf-8' : head.encoding,
    delimiter: dialect.delimiter,
    decimal: dialect.decimal,
    decimalKnown: dialect.decimalKnown || hints.decimal !== undefined,
    cells: dialect.cells,
    timeColumn: roles.time,
    timeUnit: layout.timeUnit,
    otherTimes: roles.otherTimes,
    signals: roles.signals,
    names: header.names,
    namesText: header.namesAt === null ? null : lines[header.namesAt]!.text.trim(),
    firstLine: first.line,
    blankIsHole: dialect.cells === 1 && blank * 5 < dialect.rows.length,
    cellUnits: dialect.quantities ? header.units : [],
  };
  return { ok: true, head, layout, plan, isChosen: hints.columns !== undefined, firstRowAt: first.from };
}

/** "0,001,1,5" under two names: commas that separate and commas in numbers cannot be told apart. */
function tornDecimals({ lines, dialect }: Layout): string | null {
  if (dialect.delimiter !== ',' || dialect.cells < 4 || dialect.cells % 2 === 1) return null;
  const above = lines.slice(0, dialect.firstRow!).findLast(({ text }) => text.trim() !== '');
  if (above === undefined || above.text.split(',').length * 2 !== dialect.cells) return null;
  const areWhole = dialect.rows.every((row) => /^[-+\d,\s]+$/.test(lines[row]!.text));
  if (!areWhole || /\d/.test(above.text.split(',')[0]!)) return null;
  return `Commas seem to separate the cells and to mark decimals as well: line ${lines[dialect.firstRow!]!.line} has ${dialect.cells} cells under ${dialect.cells / 2} names. The numbers cannot be told for certain, so none were read.`;
}
