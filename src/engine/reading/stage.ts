import { GrowingColumn } from './column.ts';
import type { Plan } from './plan.ts';
import { PlainBudget } from './segments.ts';
import { TimeColumn } from './times.ts';
import { decimalShift } from './units.ts';

/**
 * The rows read last, as doubles, column after column in one array: time, further times, signals, cells too many,
 * cells that nobody wants. A full stage goes on to the growing columns.
 */
export class Stage {
  readonly blockRows: number;
  readonly values: Float64Array;
  /** By file column (cells beyond the last share one): where its values begin. */
  readonly bases: Int32Array;
  /** By file column: decimal places to take off, for times below the second. */
  readonly shifts: Int32Array;
  /** Where values of cells too many begin; whatever begins here or later is not wanted. */
  readonly extraBase: number;
  readonly columns: readonly GrowingColumn[];
  readonly times = new TimeColumn();
  /** Largest distance of each further time column from the first, in seconds. */
  readonly otherTimeOffBy: number[];
  /** Rows that have gone on. */
  rows = 0;
  /** Rows in which some signal differs from the row before; counted while no signal has more than two values. */
  changedRows = 0;
  /** True when a cell of the block may be a hole, over range or beyond float32. */
  isOdd = false;

  private readonly slots: number;
  private readonly firstSignal: number;
  private readonly timeFactor: number;
  private readonly row: Float64Array;
  private readonly previous: Float64Array;

  constructor(private readonly plan: Plan) {
    const { timeColumn, otherTimes, signals, cells } = plan;
    this.firstSignal = 1 + otherTimes.length;
    this.slots = this.firstSignal + signals.length + 2;
    this.blockRows = Math.max(64, Math.min(4096, Math.floor((1 << 19) / this.slots)));
    this.values = new Float64Array(this.slots * this.blockRows);
    const base = (slot: number) => slot * this.blockRows;
    this.extraBase = base(this.slots - 2);
    this.values.fill(Number.NaN, this.extraBase);
    this.bases = new Int32Array(cells + 1).fill(base(this.slots - 1));
    this.bases[cells] = this.extraBase;
    this.shifts = new Int32Array(cells + 1);
    const shift = decimalShift(plan.timeUnit);
    [...(timeColumn === null ? [] : [timeColumn]), ...otherTimes].forEach((column) => {
      this.shifts[column] = shift;
    });
    if (timeColumn !== null) this.bases[timeColumn] = 0;
    otherTimes.forEach((column, i) => {
      this.bases[column] = base(1 + i);
    });
    signals.forEach((column, i) => {
      this.bases[column] = base(this.firstSignal + i);
    });
    const budget = new PlainBudget();
    this.columns = signals.map(() => new GrowingColumn(budget));
    this.otherTimeOffBy = otherTimes.map(() => 0);
    this.timeFactor = plan.timeUnit === 'min' ? 60 : 1;
    this.row = new Float64Array(this.slots);
    this.previous = new Float64Array(signals.length).fill(Number.NaN);
  }

  /** Passes the first `count` rows on. */
  flush(count: number): void {
    const { plan, values, blockRows } = this;
    const block = (slot: number) => values.subarray(slot * blockRows, slot * blockRows + count);
    if (plan.timeColumn !== null) {
      const times = block(0);
      plan.otherTimes.forEach((_, i) => {
        this.otherTimeOffBy[i] = Math.max(this.otherTimeOffBy[i]!, furthest(times, block(1 + i)));
      });
      this.times.append(this.timeFactor === 1 ? times : times.map((minutes) => minutes * this.timeFactor));
    }
    if (this.columns.every((column) => column.isTwoValued)) this.countChanges(count);
    this.columns.forEach((column, i) => {
      column.append(block(this.firstSignal + i), this.isOdd);
    });
    this.rows += count;
    this.isOdd = false;
  }

  /** Puts `count` rows of holes before the row at `r`, which moves on; gives its new place. */
  insertHoles(r: number, count: number): number {
    const { values, blockRows, slots, row } = this;
    let at = r;
    for (let slot = 0; slot < slots; slot++) row[slot] = values[slot * blockRows + at]!;
    for (let hole = 0; hole < count; hole++) {
      this.isOdd = true;
      for (let slot = 0; slot < slots; slot++) {
        const isNoTime = slot === 0 && this.plan.timeColumn === null;
        values[slot * blockRows + at] = isNoTime ? 0 : Number.NaN;
      }
      if (++at < blockRows) continue;
      this.flush(at);
      at = 0;
    }
    this.isOdd = true;
    for (let slot = 0; slot < slots; slot++) values[slot * blockRows + at] = row[slot]!;
    return at;
  }

  private countChanges(count: number): void {
    const { values, blockRows, firstSignal, previous } = this;
    for (let i = 0; i < count; i++) {
      let isChanged = false;
      for (let signal = 0; signal < previous.length; signal++) {
        const value = values[(firstSignal + signal) * blockRows + i]!;
        if (value !== previous[signal]) isChanged = true;
        previous[signal] = value;
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
