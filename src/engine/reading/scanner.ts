import { CR, LF, QUOTE, SPACE } from './bytes.ts';
import { cellKind, cellNumber } from './cellKind.ts';
import { type Clock, NS_PER_DAY, parseClock } from './clock.ts';
import { GrowingColumn } from './column.ts';
import type { LineSink } from './lineFeeder.ts';
import { POWERS_OF_TEN, parseNumber } from './number.ts';
import { decodeText } from './text.ts';
import { TimeColumn } from './times.ts';
import type { Decimal, Delimiter, Encoding, RejectedRow, TimeUnit } from './types.ts';
import { decimalShift } from './units.ts';

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
}

/** Why reading ended before the end of the file. */
export type Stop =
  | { readonly why: 'second table' | 'short rows'; readonly line: number }
  | { readonly why: 'time backwards'; readonly line: number; readonly found: string };

const MOST_REPORTED = 100;
/** More lines of text than this in a row are no damaged samples. */
const MOST_HOLE_LINES = 100;
/** Rows whose time lies before what was reached: more than this in a row is a restart. */
const MOST_BACKWARD_ROWS = 3;
const MANTISSA_LIMIT = 9007199254740992;

/**
 * Reads rows of numbers from whole lines. Ordinary cells (sign, digits, decimal mark, digits, exponent) are turned
 * into doubles while their bytes are passed over, as `parseNumber` does; all others, and every row that is not wholly
 * ordinary, go the slow way. Rows end at line ends only, whatever quotes say, so two rows are never merged.
 */
export class Scanner implements LineSink {
  readonly times = new TimeColumn();
  readonly columns: readonly GrowingColumn[];
  readonly rejected: RejectedRow[] = [];
  rejectedCount = 0;
  rows = 0;
  stop: Stop | null = null;
  line: number;
  /** Rows rejected for their time alone. */
  timeRejected = 0;
  /** Largest distance of each further time column from the first, in seconds. */
  readonly otherTimeOffBy: number[];
  /** Lines of text after the last row. */
  footer: { readonly from: number; count: number } | null = null;
  /** Lines at which the line of names stood again and the same table went on. */
  repeatedNames = 0;
  /** Rows, and the first differing one, in which some signal changed; counted while all signals have two values. */
  changedRows = 0;
  firstClockText: string | null = null;
  decimal: Decimal;
  private decimalKnown: boolean;

  private readonly blockRows: number;
  private readonly stage: Float64Array;
  private readonly scratch: Float32Array;
  private readonly bases: Int32Array;
  private readonly shifts: Int32Array;
  private readonly need: number;
  private readonly timeBase: number;
  private readonly extraBase: number;
  private readonly timeFactor: number;
  private r = 0;
  private lastTime = Number.NEGATIVE_INFINITY;
  private backwards = 0;
  private backwardsLine = 0;
  private backwardsFound = '';
  private pendingText: { line: number; found: string }[] = [];
  private pendingCount = 0;
  private pendingBlank = 0;
  private pendingNames = false;
  private shortRun = 0;
  private bytesSeen = 0;
  private lastRowValues: Float64Array | null = null;
  private firstClock: Clock | null = null;
  private clockDay = 0;
  private lastClock = 0;
  // What the row being read has so far.
  private rowEmpty = 0;
  private rowText = 0;
  private rowWords = 0;
  private problem: { column: number; found: string } | null = null;

  constructor(private readonly plan: Plan) {
    this.line = plan.firstLine - 1;
    this.decimal = plan.decimal;
    this.decimalKnown = plan.decimalKnown;
    this.columns = plan.signals.map(() => new GrowingColumn());
    this.otherTimeOffBy = plan.otherTimes.map(() => 0);
    const slots = 1 + plan.otherTimes.length + plan.signals.length + 2;
    this.blockRows = Math.max(64, Math.min(4096, Math.floor((1 << 19) / slots)));
    this.stage = new Float64Array(slots * this.blockRows);
    this.scratch = new Float32Array(this.blockRows);
    this.timeBase = 0;
    const base = (slot: number) => slot * this.blockRows;
    const unused = base(slots - 1);
    this.extraBase = base(slots - 2);
    this.stage.fill(Number.NaN, this.extraBase);
    this.bases = new Int32Array(plan.cells + 1).fill(unused);
    this.bases[plan.cells] = this.extraBase;
    this.shifts = new Int32Array(plan.cells + 1);
    const shift = decimalShift(plan.timeUnit);
    if (plan.timeColumn !== null) {
      this.bases[plan.timeColumn] = this.timeBase;
      this.shifts[plan.timeColumn] = shift;
    }
    plan.otherTimes.forEach((column, i) => {
      this.bases[column] = base(1 + i);
      this.shifts[column] = shift;
    });
    plan.signals.forEach((column, i) => {
      this.bases[column] = base(1 + plan.otherTimes.length + i);
    });
    this.need = 1 + Math.max(plan.timeColumn ?? 0, ...plan.otherTimes, ...plan.signals);
    this.timeFactor = plan.timeUnit === 'min' ? 60 : 1;
  }

  lines(bytes: Uint8Array, from: number, to: number): boolean {
    const { stage, bases, shifts, need, timeBase, blockRows } = this;
    const width = this.plan.cells;
    const unusedFrom = this.extraBase;
    const delimiter = this.plan.delimiter.charCodeAt(0);
    const bySpaces = delimiter === SPACE;
    let decimal = this.decimalKnown ? this.decimal.charCodeAt(0) : 0;
    let isPlain = this.isPlain();
    let lastTime = this.lastTime;
    let line = this.line;
    let r = this.r;
    let p = from;
    this.bytesSeen += to - from;
    while (p < to) {
      line++;
      const lineStart = p;
      let column = 0;
      let isOdd = false;
      let unusedEmpty = 0;
      let c = 0;
      for (;;) {
        c = bytes[p]!;
        while (c === SPACE) c = bytes[++p]!;
        const cellStart = p;
        const isNegative = c === 45;
        if (isNegative || c === 43) c = bytes[++p]!;
        // Nine digits fit an int32, which is quicker than doubles; longer ones go on as a double.
        const start = p;
        let stop = p + 9;
        let whole = 0;
        while ((c ^ 48) < 10 && p < stop) {
          whole = (whole * 10 + (c ^ 48)) | 0;
          c = bytes[++p]!;
        }
        let digits = p - start;
        let fraction = 0;
        if (c === decimal) {
          c = bytes[++p]!;
          const point = p;
          stop = p + 9 - digits;
          while ((c ^ 48) < 10 && p < stop) {
            whole = (whole * 10 + (c ^ 48)) | 0;
            c = bytes[++p]!;
          }
          fraction = p - point;
          digits += fraction;
        }
        let value = whole;
        if ((c ^ 48) < 10) {
          const inFraction = fraction > 0 || bytes[p - 1] === decimal;
          const more = p;
          while ((c ^ 48) < 10) {
            value = value * 10 + (c ^ 48);
            c = bytes[++p]!;
          }
          if (inFraction) fraction += p - more;
          else if (c === decimal) {
            c = bytes[++p]!;
            const point = p;
            while ((c ^ 48) < 10) {
              value = value * 10 + (c ^ 48);
              c = bytes[++p]!;
            }
            fraction = p - point;
          }
          if (value > MANTISSA_LIMIT) digits = 0;
        }
        let power = -fraction - shifts[column]!;
        if ((c | 32) === 101 && digits > 0) {
          c = bytes[++p]!;
          const isSmall = c === 45;
          if (isSmall || c === 43) c = bytes[++p]!;
          const exponentStart = p;
          let exponent = 0;
          while ((c ^ 48) < 10 && p < exponentStart + 4) {
            exponent = exponent * 10 + (c ^ 48);
            c = bytes[++p]!;
          }
          if (p === exponentStart) digits = 0;
          power += isSmall ? -exponent : exponent;
        }
        if (!bySpaces) while (c === SPACE) c = bytes[++p]!;
        if (digits > 0 && (c === delimiter || c === LF || c === CR) && power >= -22 && power <= 22) {
          if (power < 0) value /= POWERS_OF_TEN[-power]!;
          else if (power > 0) value *= POWERS_OF_TEN[power]!;
          stage[bases[column]! + r] = isNegative ? -value : value;
        } else if (
          p === cellStart &&
          column > 0 &&
          bases[column]! >= unusedFrom &&
          (c === delimiter || c === LF || c === CR)
        ) {
          // An empty cell where nothing is wanted, as after a trailing delimiter.
          unusedEmpty++;
        } else {
          this.r = r;
          this.line = line;
          p = this.oddCell(bytes, cellStart, column, delimiter);
          c = bytes[p]!;
          isOdd = true;
          decimal = this.decimalKnown ? this.decimal.charCodeAt(0) : 0;
        }
        if (c !== delimiter) break;
        p++;
        if (bySpaces) {
          while (bytes[p] === SPACE) p++;
          c = bytes[p]!;
          if (c === LF || c === CR) break;
        }
        if (column < width) column++;
      }
      const lineEnd = p;
      p += c === CR && bytes[p + 1] === LF && p + 1 < to ? 2 : 1;
      const time = stage[timeBase + r]!;
      if (!isOdd && column + 1 >= need && column < width && isPlain && time >= lastTime) {
        lastTime = time;
        r++;
      } else {
        this.r = r;
        this.line = line;
        this.lastTime = lastTime;
        this.oddRow(bytes, lineStart, lineEnd, column + 1, unusedEmpty);
        if (this.stop !== null) return false;
        r = this.r;
        lastTime = this.lastTime;
        isPlain = this.isPlain();
      }
      if (r === blockRows) {
        this.r = r;
        this.flush();
        r = 0;
      }
    }
    this.r = r;
    this.line = line;
    this.lastTime = lastTime;
    return true;
  }

  longLine(): boolean {
    this.line++;
    this.addPendingText('a line of more than a million characters');
    return true;
  }

  /** Ends the table. */
  finish(): void {
    if (this.r > 0) this.flush();
    if (this.pendingCount > 0)
      this.footer = { from: this.pendingText[0]?.line ?? this.line, count: this.pendingCount };
  }

  /** Nothing is left over from the rows before that the next row must be looked at for. */
  private isPlain(): boolean {
    return this.pendingCount === 0 && this.pendingBlank === 0 && this.backwards === 0 && this.shortRun === 0;
  }

  /** Reads a cell that is not plain digits; gives the place of the byte that ends it. */
  private oddCell(bytes: Uint8Array, from: number, column: number, delimiter: number): number {
    let end = from;
    let textFrom = from;
    let textTo: number;
    if (bytes[from] === QUOTE) {
      end++;
      textFrom = end;
      while (bytes[end] !== LF && bytes[end] !== CR && (bytes[end] !== QUOTE || bytes[end + 1] === QUOTE)) {
        end += bytes[end] === QUOTE ? 2 : 1;
      }
      textTo = end;
    } else textTo = -1;
    while (bytes[end] !== delimiter && bytes[end] !== LF && bytes[end] !== CR) end++;
    if (textTo < 0) textTo = end;
    while (textTo > textFrom && (bytes[textTo - 1] === SPACE || bytes[textTo - 1] === 9)) textTo--;
    while (textFrom < textTo && (bytes[textFrom] === SPACE || bytes[textFrom] === 9)) textFrom++;
    const at = this.bases[column]! + this.r;
    if (textFrom === textTo) {
      this.rowEmpty++;
      this.stage[at] = Number.NaN;
      return end;
    }
    const mark = this.decimalKnown ? this.decimal.charCodeAt(0) : 0;
    const value = parseNumber(bytes, textFrom, textTo, mark, this.shifts[column]!);
    // A column of clock times may hold whole seconds nowhere: a bare number there is no time.
    const isNumber =
      !Number.isNaN(value) && !(this.plan.timeUnit === 'clock' && column === this.plan.timeColumn);
    this.stage[at] = isNumber
      ? value
      : this.oddText(
          decodeText(bytes, textFrom, Math.min(textTo, textFrom + 400), this.plan.encoding),
          column,
        );
    return end;
  }

  private oddText(text: string, column: number): number {
    const isTime = column === this.plan.timeColumn;
    if (isTime && this.plan.timeUnit === 'clock') {
      const clock = parseClock(text.trim());
      if (clock !== null) return this.secondsOf(clock, text);
    } else {
      if (!this.decimalKnown) this.settleDecimal(text);
      const kind = cellKind(text, this.decimal);
      if (kind === 'number' || kind === 'grouped')
        return cellNumber(text, this.decimal, this.shifts[column]!);
      const signal = this.plan.signals.indexOf(column);
      if (signal >= 0 && (kind === 'high' || kind === 'low')) {
        const cells = this.columns[signal]!;
        const rail =
          kind === 'high' ? (cells.high ??= this.newRail(text)) : (cells.low ??= this.newRail(text));
        rail.count++;
        this.rowWords++;
        return kind === 'high' ? Number.POSITIVE_INFINITY : Number.NEGATIVE_INFINITY;
      }
      if (signal >= 0 && kind === 'hole') {
        this.rowWords++;
        return Number.NaN;
      }
      const isWanted =
        isTime || signal >= 0 || this.plan.otherTimes.includes(column) || column >= this.plan.cells;
      if (!isWanted && kind !== 'text') return Number.NaN;
    }
    this.rowText++;
    if (isTime || this.plan.signals.includes(column) || column >= this.plan.cells)
      this.problem ??= { column, found: text };
    return Number.NaN;
  }

  private newRail(word: string) {
    return { count: 0, firstLine: this.line, word };
  }

  private settleDecimal(text: string): void {
    const asPoint = cellKind(text, '.');
    const asComma = cellKind(text, ',');
    if (asPoint === 'number' && asComma !== 'number') this.decimal = '.';
    else if (asComma === 'number' && asPoint !== 'number') this.decimal = ',';
    else return;
    this.decimalKnown = true;
  }

  /** Seconds since the first clock time; a fall by more than half a day without a date is midnight. */
  private secondsOf(clock: Clock, text: string): number {
    this.firstClockText ??= text;
    this.firstClock ??= clock;
    if (clock.day === null && clock.ns < this.lastClock - NS_PER_DAY / 2) this.clockDay++;
    this.lastClock = clock.ns;
    const days =
      clock.day !== null && this.firstClock.day !== null ? clock.day - this.firstClock.day : this.clockDay;
    return (days * NS_PER_DAY + clock.ns - this.firstClock.ns) / 1e9;
  }

  /** The end of a row that is not wholly ordinary, or that follows something out of the ordinary. */
  private oddRow(bytes: Uint8Array, from: number, to: number, count: number, unusedEmpty: number): void {
    const { rowText, rowWords, problem, plan } = this;
    const rowEmpty = this.rowEmpty + unusedEmpty;
    this.rowEmpty = this.rowText = this.rowWords = 0;
    this.problem = null;
    const cells = Math.min(count, plan.cells + 1);
    if (rowEmpty >= cells) {
      this.pendingBlank++;
      return;
    }
    if (rowText > 0 && rowEmpty + rowText >= cells && rowWords === 0) {
      const text = decodeText(bytes, from, Math.min(to, from + 4000), plan.encoding);
      if (plan.namesText !== null && text.trim() === plan.namesText) this.pendingNames = true;
      else this.addPendingText(text.trim());
      return;
    }
    for (let column = cells; column < this.need; column++)
      this.stage[this.bases[column]! + this.r] = Number.NaN;
    const hasExtra =
      !Number.isNaN(this.stage[this.extraBase + this.r]!) || (problem?.column ?? 0) >= plan.cells;
    this.stage[this.extraBase + this.r] = Number.NaN;
    const isShort = count < this.need;
    if (plan.timeColumn !== null && !this.timeFits()) return;
    if (!this.settlePending(isShort || hasExtra)) return;
    if (isShort || hasExtra) {
      this.shortRun++;
      const wanted = `${plan.cells} cells`;
      this.reject(
        this.line,
        `${count > plan.cells ? 'more than ' : ''}${isShort ? count : plan.cells} ${isShort && count === 1 ? 'cell' : 'cells'}`,
        wanted,
      );
      // Rows of another length all along are another table; the bound also keeps holes in proportion to the file.
      if (this.shortRun > MOST_HOLE_LINES || (isShort && this.isOutOfProportion())) {
        this.stop = { why: 'short rows', line: this.line };
        return;
      }
    } else {
      this.shortRun = 0;
      if (problem !== null)
        this.reject(
          this.line,
          quoted(problem.found),
          `${problem.column === plan.timeColumn ? 'a time' : 'a number'} in ${this.columnName(problem.column)}`,
        );
    }
    const time = plan.timeColumn === null ? 0 : this.stage[this.timeBase + this.r]!;
    if (
      plan.timeColumn !== null &&
      Number.isNaN(time) &&
      problem?.column !== plan.timeColumn &&
      this.backwards === 0 &&
      !isShort
    ) {
      this.reject(this.line, 'an empty cell', `a time in ${this.columnName(plan.timeColumn)}`);
    }
    if (time > this.lastTime) this.lastTime = time;
    this.r++;
  }

  /** Looks at a time that lies before the one reached. False: reading has stopped. */
  private timeFits(): boolean {
    const at = this.timeBase + this.r;
    const time = this.stage[at]!;
    if (Number.isNaN(time)) return true;
    if (time >= this.lastTime) {
      this.backwards = 0;
      return true;
    }
    if (this.pendingCount > 0 || this.pendingBlank > 0 || this.pendingNames) {
      this.stop = { why: 'second table', line: this.line };
      return false;
    }
    const before = this.r >= 2 ? this.stage[at - 2]! : Number.NaN;
    const last = this.r >= 1 ? this.stage[at - 1]! : Number.NaN;
    const earlier = this.r >= 3 ? this.stage[at - 3]! : Number.NaN;
    const expected = before + (before - earlier);
    if (
      this.backwards === 0 &&
      last === this.lastTime &&
      time >= before &&
      Math.abs(last - expected) > Math.abs(time - expected)
    ) {
      // The row before had jumped ahead: it is the wrong one.
      this.stage[at - 1] = Number.NaN;
      this.lastTime = time;
      this.timeRejected++;
      this.reject(
        this.line - 1,
        `the time ${short(last)} s between ${short(before)} s and ${short(time)} s`,
        'times that rise',
      );
      return true;
    }
    if (this.backwards === 0) {
      this.backwardsLine = this.line;
      this.backwardsFound = `${short(time)} s after ${short(this.lastTime)} s`;
    }
    this.backwards++;
    this.timeRejected++;
    this.reject(this.line, `the time ${short(time)} s after ${short(this.lastTime)} s`, 'times that rise');
    if (this.backwards > MOST_BACKWARD_ROWS) {
      this.stop = { why: 'time backwards', line: this.backwardsLine, found: this.backwardsFound };
      return false;
    }
    this.stage[at] = Number.NaN;
    return true;
  }

  /** Decides about text and empty lines before a row: another table, or samples that could not be read. */
  private settlePending(hasOtherLength: boolean): boolean {
    const { plan } = this;
    const isSeparated = this.pendingCount > 0 || this.pendingBlank > 0;
    const isRepeat = this.pendingNames;
    if ((isSeparated || isRepeat) && (hasOtherLength || (isRepeat && plan.timeColumn === null))) {
      this.stop = { why: 'second table', line: this.line };
      return false;
    }
    if (isRepeat) this.repeatedNames++;
    const blanks = plan.blankIsHole && this.pendingBlank <= 3 ? this.pendingBlank : 0;
    const holes = (isRepeat || this.pendingCount > MOST_HOLE_LINES ? 0 : this.pendingCount) + blanks;
    for (const { line, found } of this.pendingText) this.reject(line, quoted(found), `${plan.cells} numbers`);
    this.rejectedCount += this.pendingCount - this.pendingText.length;
    this.pendingText = [];
    this.pendingCount = 0;
    this.pendingBlank = 0;
    this.pendingNames = false;
    if (holes > 0) this.insertHoles(holes);
    return true;
  }

  /** Puts rows of holes before the row being read, which moves back by as many places. */
  private insertHoles(count: number): void {
    const slots = this.stage.length / this.blockRows;
    const row = (this.lastRowValues ??= new Float64Array(slots));
    for (let slot = 0; slot < slots; slot++) row[slot] = this.stage[slot * this.blockRows + this.r]!;
    for (let hole = 0; hole < count; hole++) {
      for (let slot = 0; slot < slots; slot++) {
        const isNoTime = slot === 0 && this.plan.timeColumn === null;
        this.stage[slot * this.blockRows + this.r] = isNoTime ? 0 : Number.NaN;
      }
      this.r++;
      if (this.r === this.blockRows) this.flush();
    }
    for (let slot = 0; slot < slots; slot++) this.stage[slot * this.blockRows + this.r] = row[slot]!;
  }

  private addPendingText(found: string): void {
    this.pendingCount++;
    if (this.pendingText.length < MOST_REPORTED)
      this.pendingText.push({ line: this.line, found: found.slice(0, 200) });
  }

  private reject(line: number, found: string, expected: string): void {
    this.rejectedCount++;
    if (this.rejected.length < MOST_REPORTED) this.rejected.push({ line, found, expected });
  }

  private columnName(column: number): string {
    if (column >= this.plan.cells) return `at most ${this.plan.cells} cells`;
    const name = this.plan.names[column];
    return name ? `column ${column + 1}, ${quoted(name)}` : `column ${column + 1}`;
  }

  /** Holes made by short rows may take some times the file's own size, not thousands of times. */
  private isOutOfProportion(): boolean {
    return 4 * this.rows * this.columns.length > 16e6 + 8 * this.bytesSeen;
  }

  private flush(): void {
    const { stage, blockRows, plan } = this;
    const count = this.r;
    const block = (slot: number) => stage.subarray(slot * blockRows, slot * blockRows + count);
    const times = block(0);
    if (plan.timeColumn !== null) {
      plan.otherTimes.forEach((_, i) => {
        this.otherTimeOffBy[i] = Math.max(this.otherTimeOffBy[i]!, furthest(times, block(1 + i)));
      });
      if (this.timeFactor === 1) this.times.append(times);
      else this.times.append(times.map((minutes) => minutes * this.timeFactor));
    }
    const firstSignal = 1 + plan.otherTimes.length;
    if (this.columns.every((column) => column.isTwoValued)) this.countChanges(firstSignal, count);
    this.columns.forEach((column, i) => {
      column.append(block(firstSignal + i), this.scratch);
    });
    this.rows += count;
    this.r = 0;
  }

  private previous: Float64Array | null = null;

  private countChanges(firstSignal: number, count: number): void {
    const { stage, blockRows } = this;
    const signals = this.columns.length;
    const last = (this.previous ??= new Float64Array(signals).fill(Number.NaN));
    for (let i = 0; i < count; i++) {
      let isChanged = false;
      for (let s = 0; s < signals; s++) {
        const value = stage[(firstSignal + s) * blockRows + i]!;
        if (value !== last[s]) isChanged = true;
        last[s] = value;
      }
      if (isChanged) this.changedRows++;
    }
  }
}

function furthest(a: Float64Array, b: Float64Array): number {
  let most = 0;
  for (let i = 0; i < a.length; i++) {
    const off = Math.abs(a[i]! - b[i]!);
    if (off > most) most = off;
  }
  return most;
}

const short = (value: number) => String(Number(value.toPrecision(9)));
const quoted = (text: string) => `“${text.length > 60 ? `${text.slice(0, 59)}…` : text}”`;
