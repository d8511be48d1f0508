import type { CellReader } from './cellReader.ts';
import type { Plan, Stop } from './plan.ts';
import { MOST_REPORTED, quoted, Rejections } from './rejections.ts';
import type { Stage } from './stage.ts';
import { decodeText } from './text.ts';

/** More lines of text, or rows of another length, than this in a row are no damaged samples. */
const MOST_ODD_LINES = 100;
/** Rows whose time lies before what was reached: more than this in a row is a restart. */
const MOST_BACKWARD_ROWS = 3;
const TIMES_THAT_RISE = 'times that rise';

/**
 * What becomes of the rows that are not wholly ordinary, or that follow something out of the ordinary. Keeps the place
 * reached in the stage (`r`), in the file (`line`) and in time.
 */
export class RowKeeper {
  readonly rejections = new Rejections();
  r = 0;
  line: number;
  lastTime = Number.NEGATIVE_INFINITY;
  stop: Stop | null = null;
  /** Rows rejected for their time alone, and the first of them. */
  timeRejected = 0;
  firstTimeRejected: number | null = null;
  /** Lines of text after the last row. */
  footer: { readonly from: number; readonly count: number } | null = null;
  /** How often the line of names stood again while the same table went on. */
  repeatedNames = 0;
  bytesSeen = 0;
  private backwards = 0;
  private backwardsFound = '';
  private texts: { readonly line: number; readonly found: string }[] = [];
  private textLines = 0;
  private blankLines = 0;
  private hasNames = false;
  private oddLengths = 0;

  constructor(
    private readonly plan: Plan,
    private readonly stage: Stage,
    private readonly cells: CellReader,
  ) {
    this.line = plan.firstLine - 1;
  }

  /** Nothing is left over from the rows before that the next row must be looked at for. */
  get isPlain(): boolean {
    const { textLines, blankLines, hasNames, backwards, oddLengths } = this;
    return textLines === 0 && blankLines === 0 && !hasNames && backwards === 0 && oddLengths === 0;
  }

  /** Takes the row at `r`, which has `count` cells, `unusedEmpty` of them empty where nothing is wanted. */
  oddRow(bytes: Uint8Array, from: number, to: number, count: number, unusedEmpty: number): void {
    const { plan, stage } = this;
    const row = this.cells.take();
    const empty = row.empty + unusedEmpty;
    const cells = Math.min(count, plan.cells + 1);
    if (empty >= cells) {
      this.blankLines++;
      return;
    }
    if (row.text > 0 && empty + row.text >= cells && row.words === 0) {
      this.addText(decodeText(bytes, from, Math.min(to, from + 4000), plan.encoding).trim());
      return;
    }
    for (const column of [plan.timeColumn, ...plan.otherTimes, ...plan.signals]) {
      if (column === null || column < cells) continue;
      stage.values[stage.bases[column]! + this.r] = Number.NaN;
      stage.isOdd = true;
    }
    const isShort = count < this.need;
    const isLong = this.takeExtra() || (row.problem?.column ?? 0) >= plan.cells;
    if (plan.timeColumn !== null && !this.timeFits()) return;
    if (!this.settlePending(isShort || isLong)) return;
    if (isShort || isLong) {
      const found = isShort ? `${count} ${count === 1 ? 'cell' : 'cells'}` : `more than ${plan.cells} cells`;
      this.rejections.add(this.line, found, `${plan.cells} cells`);
      this.oddLengths++;
      // Rows of another length all along are another table; the bound also keeps holes in proportion to the file.
      if (this.oddLengths > MOST_ODD_LINES || (isShort && this.isOutOfProportion)) {
        this.stop = { why: 'short rows', line: this.line };
        return;
      }
    } else {
      this.oddLengths = 0;
      this.rejectCells(row.problem);
    }
    const time = stage.values[this.r]!;
    if (time > this.lastTime) this.lastTime = time;
    this.r++;
  }

  /** A line that was too long to keep. */
  addText(found: string): void {
    if (found === this.plan.namesText) {
      this.hasNames = true;
      return;
    }
    this.textLines++;
    if (this.texts.length < MOST_REPORTED) this.texts.push({ line: this.line, found: found.slice(0, 200) });
  }

  /** Ends the table. */
  finish(): void {
    if (this.r > 0) this.stage.flush(this.r);
    this.r = 0;
    if (this.textLines > 0) this.footer = { from: this.texts[0]?.line ?? this.line, count: this.textLines };
  }

  /** Cells that a row must have for all columns that are read. */
  get need(): number {
    const { timeColumn, otherTimes, signals } = this.plan;
    return 1 + Math.max(timeColumn ?? 0, ...otherTimes, ...signals);
  }

  private rejectCells(problem: ReturnType<CellReader['take']>['problem']): void {
    const { timeColumn } = this.plan;
    if (problem !== null) {
      const wanted = problem.column === timeColumn ? 'a time' : 'a number';
      this.rejections.add(
        this.line,
        quoted(problem.found),
        `${wanted} in ${this.columnName(problem.column)}`,
      );
    } else if (timeColumn !== null && Number.isNaN(this.stage.values[this.r]!) && this.backwards === 0) {
      this.rejections.add(this.line, 'an empty cell', `a time in ${this.columnName(timeColumn)}`);
    }
  }

  private takeExtra(): boolean {
    const { values, extraBase } = this.stage;
    const isThere = !Number.isNaN(values[extraBase + this.r]!);
    values[extraBase + this.r] = Number.NaN;
    return isThere;
  }

  /** Looks at a time that lies before the one reached. False: reading has stopped. */
  private timeFits(): boolean {
    const { values } = this.stage;
    const { r, lastTime } = this;
    const time = values[r]!;
    if (Number.isNaN(time)) return true;
    if (time >= lastTime) {
      this.backwards = 0;
      return true;
    }
    if (this.textLines > 0 || this.blankLines > 0 || this.hasNames) {
      this.stop = { why: 'second table', line: this.line };
      return false;
    }
    if (this.backwards === 0 && this.lastJumped(time)) {
      const found = `the time ${short(values[r - 1]!)} s between ${short(values[r - 2]!)} s and ${short(time)} s`;
      values[r - 1] = Number.NaN;
      this.lastTime = time;
      this.rejectTime(this.line - 1, found);
      return true;
    }
    if (this.backwards === 0) this.backwardsFound = `${short(time)} s after ${short(lastTime)} s`;
    this.backwards++;
    this.rejectTime(this.line, `the time ${short(time)} s after ${short(lastTime)} s`);
    values[r] = Number.NaN;
    if (this.backwards <= MOST_BACKWARD_ROWS) return true;
    this.stop = { why: 'time backwards', line: this.line - this.backwards + 1, found: this.backwardsFound };
    return false;
  }

  /** True when the row before, not this one, is off the steps so far: it had jumped ahead. */
  private lastJumped(time: number): boolean {
    const { r } = this;
    const { values } = this.stage;
    if (r < 3) return false;
    const [earlier, before, last] = [values[r - 3]!, values[r - 2]!, values[r - 1]!];
    const expected = before + (before - earlier);
    return last === this.lastTime && time >= before && Math.abs(last - expected) > Math.abs(time - expected);
  }

  private rejectTime(line: number, found: string): void {
    this.timeRejected++;
    this.firstTimeRejected ??= line;
    this.rejections.add(line, found, TIMES_THAT_RISE);
  }

  /** Decides about text and empty lines before a row: another table, or samples that could not be read. */
  private settlePending(hasOtherLength: boolean): boolean {
    const { plan, texts, textLines, blankLines, hasNames } = this;
    const isSeparated = textLines > 0 || blankLines > 0 || hasNames;
    if (!isSeparated) return true;
    if (hasOtherLength || (hasNames && plan.timeColumn === null)) {
      this.stop = { why: 'second table', line: this.line };
      return false;
    }
    if (hasNames) this.repeatedNames++;
    const blanks = plan.blankIsHole && blankLines <= 3 ? blankLines : 0;
    const holes = (hasNames || textLines > MOST_ODD_LINES ? 0 : textLines) + blanks;
    for (const { line, found } of texts) this.rejections.add(line, quoted(found), `${plan.cells} numbers`);
    this.rejections.count += textLines - texts.length;
    this.texts = [];
    this.textLines = this.blankLines = 0;
    this.hasNames = false;
    if (holes > 0) this.r = this.stage.insertHoles(this.r, holes);
    return true;
  }

  private columnName(column: number): string {
    const name = this.plan.names[column];
    return name ? `column ${column + 1}, ${quoted(name)}` : `column ${column + 1}`;
  }

  /** Holes made by short rows may take some times the file's own size, not thousands of times. */
  private get isOutOfProportion(): boolean {
    return 4 * this.stage.rows * this.stage.columns.length > 16e6 + 8 * this.bytesSeen;
  }
}

const short = (value: number) => String(Number(value.toPrecision(9)));
