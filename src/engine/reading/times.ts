import { POWERS_OF_TEN } from './number.ts';

/** Some consecutive times, exactly: as whole ticks of 10^-decimals s with their steps, or as they are. */
type Block =
  | { readonly kind: 'raw'; readonly times: Float64Array }
  | {
      readonly kind: 'ticks';
      readonly count: number;
      readonly decimals: number;
      readonly first: number;
      readonly step: number;
      /** What each step after the first time exceeds `step` by; null: nothing. */
      readonly extra: Uint8Array | Uint16Array | null;
    };

const MOST_DECIMALS = 18;
const MOST_TICKS = 2 ** 53;

/**
 * A float64 time column kept small and exact. Printed times are whole multiples of a power of ten, and those of an
 * even capture differ by nearly the same number of ticks: one block then needs a few bytes in place of eight a row.
 * What does not divide exactly is kept as it is, so `block()` always gives back the same doubles (NaN included).
 */
export class TimeColumn {
  private readonly blocks: Block[] = [];
  private decimals = 0;
  length = 0;
  longestBlock = 0;

  append(times: Float64Array): void {
    if (times.length === 0) return;
    this.blocks.push(this.pack(times));
    this.length += times.length;
    this.longestBlock = Math.max(this.longestBlock, times.length);
  }

  get blockCount(): number {
    return this.blocks.length;
  }

  /** The times of one block, in `into` from 0 on; gives their number. */
  block(index: number, into: Float64Array): number {
    const block = this.blocks[index]!;
    if (block.kind === 'raw') {
      into.set(block.times);
      return block.times.length;
    }
    const power = POWERS_OF_TEN[block.decimals]!;
    const { count, step, extra } = block;
    let ticks = block.first;
    into[0] = ticks / power;
    for (let i = 1; i < count; i++) {
      ticks += extra === null ? step : step + extra[i - 1]!;
      into[i] = ticks / power;
    }
    return count;
  }

  /** All times in one array. */
  toArray(): Float64Array {
    const all = new Float64Array(this.length);
    let at = 0;
    for (let b = 0; b < this.blocks.length; b++) at += this.block(b, all.subarray(at));
    return all;
  }

  /** Start and step when all times are whole ticks with one and the same step; null: they are not, or fewer than two. */
  perfectlyEven(): { readonly startS: number; readonly stepS: number } | null {
    let next: number | null = null;
    let start = 0;
    let step = 0;
    let decimals = 0;
    for (const block of this.blocks) {
      if (block.kind === 'raw' || block.extra !== null) return null;
      if (next === null) {
        ({ first: start, step, decimals } = block);
      } else {
        // Decimals never fall unless ticks grow too large; a change within the file is left to the general fit.
        if (block.decimals !== decimals || block.first !== next || (block.count > 1 && block.step !== step))
          return null;
      }
      next = block.first + block.count * step;
    }
    if (this.length < 2 || step <= 0) return null;
    return { startS: start / POWERS_OF_TEN[decimals]!, stepS: step / POWERS_OF_TEN[decimals]! };
  }

  private pack(times: Float64Array): Block {
    const decimals = this.commonDecimals(times);
    if (decimals === null) return { kind: 'raw', times: times.slice() };
    const power = POWERS_OF_TEN[decimals]!;
    const first = Math.round(times[0]! * power);
    let low = Number.POSITIVE_INFINITY;
    let high = Number.NEGATIVE_INFINITY;
    let last = first;
    for (let i = 1; i < times.length; i++) {
      const ticks = Math.round(times[i]! * power);
      const step = ticks - last;
      if (step < low) low = step;
      if (step > high) high = step;
      last = ticks;
    }
    if (times.length === 1) low = high = 0;
    if (high - low > 65_535) return { kind: 'raw', times: times.slice() };
    const head = { kind: 'ticks' as const, count: times.length, decimals, first, step: low };
    if (high === low) return { ...head, extra: null };
    const extra = high - low < 256 ? new Uint8Array(times.length - 1) : new Uint16Array(times.length - 1);
    last = first;
    for (let i = 1; i < times.length; i++) {
      const ticks = Math.round(times[i]! * power);
      extra[i - 1] = ticks - last - low;
      last = ticks;
    }
    return { ...head, extra };
  }

  /** The fewest decimals, beginning with those of the block before, in which every time is exactly a whole number of ticks. */
  private commonDecimals(times: Float64Array): number | null {
    for (const begin of this.decimals > 0 ? [this.decimals, 0] : [0]) {
      let decimals = begin;
      while (decimals <= MOST_DECIMALS) {
        const power = POWERS_OF_TEN[decimals]!;
        let i = 0;
        for (; i < times.length; i++) {
          const ticks = Math.round(times[i]! * power);
          if (ticks / power !== times[i] || ticks > MOST_TICKS || ticks < -MOST_TICKS) break;
        }
        if (i === times.length) {
          this.decimals = decimals;
          return decimals;
        }
        decimals++;
      }
    }
    return null;
  }
}
