import { GrowingSamples, type PlainBudget } from './segments.ts';

/** Cells of one signal that said "over range" on one side. */
export interface RailCells {
  count: number;
  readonly firstLine: number;
  readonly word: string;
}

/**
 * One signal while it is read. Samples are `Math.fround` of the numbers; NaN is a hole. Cells over range arrive as
 * plus or minus infinity, which no number in a file can be once it has passed here.
 */
export class GrowingColumn {
  private readonly samples: GrowingSamples;
  holes = 0;
  /** Numbers too large for a float32; they are holes. */
  tooLarge = 0;
  high: RailCells | null = null;
  low: RailCells | null = null;
  /** The values seen, while there are no more than two. */
  private readonly values: number[] = [];
  isTwoValued = true;
  private hasClean = false;

  constructor(budget: PlainBudget) {
    this.samples = new GrowingSamples(budget);
  }

  /** Takes the next block of doubles. `isOdd` false promises that all of them are ordinary numbers. */
  append(block: Float64Array, isOdd: boolean): void {
    if (this.isTwoValued) this.compareValues(block);
    if (isOdd) this.samples.append(this.checked(block));
    else {
      this.hasClean = true;
      this.samples.append(block);
    }
  }

  /** True when the column has two values and no more. */
  get isLogic(): boolean {
    return this.isTwoValued && this.values.length === 2;
  }

  get hasNumbers(): boolean {
    return this.hasClean;
  }

  /** The samples, with cells over range set to the highest or lowest number of the column, and the rails so used. */
  finish() {
    const samples = this.samples.finish();
    if (this.low === null && this.high === null) return { samples, rail: null };
    let lowest = Number.POSITIVE_INFINITY;
    let highest = Number.NEGATIVE_INFINITY;
    for (let i = 0; i < samples.length; i++) {
      const value = samples[i]!;
      if (value < lowest && value !== Number.NEGATIVE_INFINITY) lowest = value;
      if (value > highest && value !== Number.POSITIVE_INFINITY) highest = value;
    }
    const low = this.low !== null && Number.isFinite(lowest) ? lowest : null;
    const high = this.high !== null && Number.isFinite(highest) ? highest : null;
    for (let i = 0; i < samples.length; i++) {
      if (samples[i] === Number.POSITIVE_INFINITY) samples[i] = high ?? Number.NaN;
      else if (samples[i] === Number.NEGATIVE_INFINITY) samples[i] = low ?? Number.NaN;
    }
    return { samples, rail: low === null && high === null ? null : { low, high } };
  }

  private checked(block: Float64Array): Float64Array {
    return block.map((value) => {
      if (Number.isNaN(value)) {
        this.holes++;
        return value;
      }
      if (Number.isFinite(value) && !Number.isFinite(Math.fround(value))) {
        this.tooLarge++;
        this.holes++;
        return Number.NaN;
      }
      if (Number.isFinite(value)) this.hasClean = true;
      return value;
    });
  }

  private compareValues(block: Float64Array): void {
    const { values } = this;
    let [first, second] = values;
    for (let i = 0; i < block.length; i++) {
      const value = block[i]!;
      if (value === first || value === second || Number.isNaN(value)) continue;
      if (values.length === 2) {
        this.isTwoValued = false;
        return;
      }
      values.push(value);
      [first, second] = values;
    }
  }
}
