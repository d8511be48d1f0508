import { GrowingSamples } from './segments.ts';

/** Cells of one signal that said "over range", by side. */
export interface RailCells {
  count: number;
  firstLine: number;
  word: string;
}

/**
 * One signal while it is read. Samples are `Math.fround` of the numbers; NaN is a hole. Cells over range arrive as
 * plus or minus infinity, which no number in a file can be once it has passed here.
 */
export class GrowingColumn {
  private readonly samples = new GrowingSamples();
  lowest = Number.POSITIVE_INFINITY;
  highest = Number.NEGATIVE_INFINITY;
  holes = 0;
  /** Numbers too large for a float32; they are holes. */
  tooLarge = 0;
  high: RailCells | null = null;
  low: RailCells | null = null;
  private first = Number.NaN;
  private second = Number.NaN;
  /** True while no more than two different values have come. */
  isTwoValued = true;

  /** Takes the next block of doubles; `scratch` is at least as long. */
  append(block: Float64Array, scratch: Float32Array): void {
    let { lowest, highest, holes } = this;
    const count = block.length;
    for (let i = 0; i < count; i++) {
      const value = Math.fround(block[i]!);
      scratch[i] = value;
      if (value < lowest && value !== Number.NEGATIVE_INFINITY) lowest = value;
      if (value > highest && value !== Number.POSITIVE_INFINITY) highest = value;
      if (value - value !== 0) holes += this.odd(block[i]!, i, scratch);
    }
    this.lowest = lowest;
    this.highest = highest;
    this.holes = holes;
    if (this.isTwoValued) this.compareValues(scratch, count);
    this.samples.append(scratch.subarray(0, count));
  }

  /** The samples, with cells over range set to the highest or lowest number of the column, and the rails so used. */
  finish() {
    const samples = this.samples.finish();
    const rail = {
      low: this.low !== null && Number.isFinite(this.lowest) ? this.lowest : null,
      high: this.high !== null && Number.isFinite(this.highest) ? this.highest : null,
    };
    if (this.low !== null || this.high !== null) {
      for (let i = 0; i < samples.length; i++) {
        if (samples[i] === Number.POSITIVE_INFINITY) samples[i] = rail.high ?? Number.NaN;
        else if (samples[i] === Number.NEGATIVE_INFINITY) samples[i] = rail.low ?? Number.NaN;
      }
    }
    return { samples, rail: rail.low === null && rail.high === null ? null : rail };
  }

  get hasNumbers(): boolean {
    return this.lowest <= this.highest;
  }

  private odd(value: number, i: number, scratch: Float32Array): number {
    if (value === Number.POSITIVE_INFINITY || value === Number.NEGATIVE_INFINITY) return 0;
    if (!Number.isNaN(value)) {
      this.tooLarge++;
      scratch[i] = Number.NaN;
    }
    return 1;
  }

  private compareValues(block: Float32Array, count: number): void {
    let { first, second } = this;
    for (let i = 0; i < count; i++) {
      const value = block[i]!;
      if (value === first || value === second || value !== value) continue;
      if (first !== first) first = value;
      else if (second !== second) second = value;
      else {
        this.isTwoValued = false;
        return;
      }
    }
    this.first = first;
    this.second = second;
  }
}
