import { CR, LF, QUOTE, SPACE, TAB } from './bytes.ts';
import { cellKind, cellNumber } from './cellKind.ts';
import { type Clock, NS_PER_DAY, parseClock } from './clock.ts';
import { parseNumber } from './number.ts';
import type { Plan } from './plan.ts';
import { placesBetween, quantityOf } from './quantity.ts';
import type { Stage } from './stage.ts';
import { decodeText } from './text.ts';
import type { Decimal } from './types.ts';

/** A cell that holds text where a number was wanted. */
export interface Problem {
  readonly column: number;
  readonly found: string;
}

const LONGEST_CELL = 400;

/** Reads the cells that are not plain digits, and counts what a row holds of each kind until `take` is called. */
export class CellReader {
  /** The decimal mark; until one is known the first cell that holds one decides. */
  decimal: Decimal;
  isDecimalKnown: boolean;
  firstClockText: string | null = null;
  private firstClock: Clock | null = null;
  private clockDay = 0;
  private lastClock = 0;
  private empty = 0;
  private text = 0;
  private words = 0;
  private problem: Problem | null = null;
  /** What a column's cells are for. */
  private readonly uses: readonly ('time' | 'clock' | 'other time' | 'signal' | 'extra' | 'none')[];

  constructor(
    private readonly plan: Plan,
    private readonly stage: Stage,
  ) {
    this.decimal = plan.decimal;
    this.isDecimalKnown = plan.decimalKnown;
    this.uses = Array.from({ length: plan.cells + 1 }, (_, column) =>
      column === plan.cells
        ? 'extra'
        : column === plan.timeColumn
          ? plan.timeUnit === 'clock'
            ? 'clock'
            : 'time'
          : plan.otherTimes.includes(column)
            ? 'other time'
            : plan.signals.includes(column)
              ? 'signal'
              : 'none',
    );
  }

  /** Byte of the decimal mark, 0 while it is not known. */
  get decimalByte(): number {
    return this.isDecimalKnown ? this.decimal.charCodeAt(0) : 0;
  }

  /** What the row held since the last call. */
  take() {
    const { empty, text, words, problem } = this;
    this.empty = this.text = this.words = 0;
    this.problem = null;
    return { empty, text, words, problem };
  }

  /** Reads the cell that begins at `from` into row `r`; gives the place of the byte that ends it. */
  read(bytes: Uint8Array, from: number, column: number, r: number, line: number): number {
    const delimiter = this.plan.delimiter.charCodeAt(0);
    const isEnd = (byte: number | undefined) => byte === delimiter || byte === LF || byte === CR;
    let end = from;
    let textFrom = from;
    let textTo = -1;
    if (bytes[from] === QUOTE) {
      textFrom = ++end;
      while (bytes[end] !== LF && bytes[end] !== CR && (bytes[end] !== QUOTE || bytes[end + 1] === QUOTE)) {
        end += bytes[end] === QUOTE ? 2 : 1;
      }
      textTo = end;
      if (bytes[end] === QUOTE) end++;
      while (bytes[end] === SPACE && !isEnd(SPACE)) end++;
      // Something after the closing quote: the quotes are part of the text.
      if (!isEnd(bytes[end])) [textFrom, textTo] = [from, -1];
    }
    while (!isEnd(bytes[end])) end++;
    if (textTo < 0) textTo = end;
    const isBlank = (byte: number | undefined) => byte === SPACE || byte === TAB;
    while (textTo > textFrom && isBlank(bytes[textTo - 1])) textTo--;
    while (textFrom < textTo && isBlank(bytes[textFrom])) textFrom++;
    const { stage } = this;
    stage.values[stage.bases[column]! + r] = this.value(bytes, textFrom, textTo, column, line);
    stage.isOdd = true;
    return end;
  }

  private value(bytes: Uint8Array, from: number, to: number, column: number, line: number): number {
    if (from === to) {
      this.empty++;
      return Number.NaN;
    }
    const use = this.uses[column]!;
    if (use !== 'clock') {
      const value = parseNumber(bytes, from, to, this.decimalByte, this.stage.shifts[column]!);
      if (!Number.isNaN(value) && (Number.isFinite(value) || use === 'signal')) return finite(value);
    }
    const text = decodeText(bytes, from, Math.min(to, from + LONGEST_CELL), this.plan.encoding);
    const word = use === 'clock' ? this.clock(text) : this.word(text, column, use === 'signal', line);
    if (word !== null) return word;
    this.text++;
    if (use !== 'none' && use !== 'other time') this.problem ??= { column, found: text };
    return Number.NaN;
  }

  /** A number in another notation or a word with a meaning; null: text. */
  private word(text: string, column: number, isSignal: boolean, line: number): number | null {
    if (!this.isDecimalKnown) this.settleDecimal(text);
    const kind = cellKind(text, this.decimal);
    if (kind === 'number' || kind === 'grouped')
      return cellNumber(text, this.decimal, this.stage.shifts[column]!);
    const quantity = kind === 'text' ? this.quantity(text, column) : null;
    if (quantity !== null) return quantity;
    if (!isSignal) {
      // Dates and clock times in columns that are not used are no text that would make a row odd.
      return this.uses[column] === 'none' && kind !== 'text' ? Number.NaN : null;
    }
    if (kind === 'hole') {
      this.words++;
      return Number.NaN;
    }
    if (kind !== 'high' && kind !== 'low') return null;
    this.words++;
    const signal = this.stage.columns[this.plan.signals.indexOf(column)]!;
    signal[kind] ??= { count: 0, firstLine: line, word: text };
    signal[kind].count++;
    return kind === 'high' ? Number.POSITIVE_INFINITY : Number.NEGATIVE_INFINITY;
  }

  /** A number with its unit inside the cell, in the unit of its column; null: no such thing. */
  private quantity(text: string, column: number): number | null {
    const unit = this.plan.cellUnits[column];
    const found = unit && quantityOf(text, this.decimal);
    const places = found ? placesBetween(found.unit, unit) : null;
    return found && places !== null
      ? cellNumber(found.number, this.decimal, this.stage.shifts[column]! + places)
      : null;
  }

  private settleDecimal(text: string): void {
    const point = cellKind(text, '.') === 'number';
    const comma = cellKind(text, ',') === 'number';
    if (point === comma) return;
    this.decimal = point ? '.' : ',';
    this.isDecimalKnown = true;
  }

  /** Seconds since the first clock time; a fall by more than half a day without a date is midnight. */
  private clock(text: string): number | null {
    const clock = parseClock(text.trim());
    if (clock === null) return null;
    this.firstClockText ??= text;
    this.firstClock ??= clock;
    if (clock.day === null && clock.ns < this.lastClock - NS_PER_DAY / 2) this.clockDay++;
    this.lastClock = clock.ns;
    const days =
      clock.day !== null && this.firstClock.day !== null ? clock.day - this.firstClock.day : this.clockDay;
    return (days * NS_PER_DAY + clock.ns - this.firstClock.ns) / 1e9;
  }
}

/** Infinity stands for "over range" in the stage; a number beyond doubles is told from it by being finite. */
function finite(value: number): number {
  return Math.min(Math.max(value, -Number.MAX_VALUE), Number.MAX_VALUE);
}
