import { runningQuantile } from '../../signal/running-quantile.ts';
import { quantileSorted } from '../../signal/statistics.ts';

/** A train of events laid on equal places: how many places each event lies after the one before. */
export interface Placed {
  /** Indexes of the events kept (doubled ones taken out). */
  readonly kept: Int32Array;
  /** `ratio[k]`: interval from kept event k to k + 1 over the local tooth period. */
  readonly ratio: Float64Array;
  /** Kept event before which a doubled one was taken out, with where it stood between its neighbours (0 to 1). */
  readonly extras: readonly { readonly before: number; readonly part: number }[];
  /** Events before the first kept one were left out because the shaft came from rest; the last of them far before it. */
  readonly cutBefore?: boolean;
  /** Standard deviation of the single intervals' ratios about 1. */
  readonly scatter: number;
  /** How many times longer single periods are at the slowest than at the fastest, within about a turn: 1 or more. */
  readonly swing: number;
}

const NEIGHBOURS = 8;
/** About half a turn of most wheels, and so many periods are enough to tell by. */
const ARM = 20;
const MOST_SINGLES = 5000;
/** Above this many periods an interval is no single one. */
export const SINGLE_MOST = 1.45;

/**
 * Lays a train on places. The local tooth period is the geometric mean of the nearest single intervals on both sides,
 * so that a speed that rises or falls smoothly, from rest or to a stall, makes no gap: a gap is longer than what comes
 * before and what comes after it (two-sided test, ST AN2577 p. 23, Freescale AN2897 p. 20).
 */
export function layOnPlaces(times: Float64Array): Placed {
  let kept = Int32Array.from(times, (_, i) => i);
  let ratio = ratios(times, kept);
  const extras: { before: number; event: number; part: number }[] = [];
  const without = new Uint8Array(times.length);
  for (let k = 0; k + 1 < ratio.length; k += 1) {
    const first = ratio[k]!;
    const second = ratio[k + 1]!;
    // An event too many cuts one period in two.
    if (
      Math.min(first, second) < 0.62 &&
      first + second > 0.72 &&
      first + second < 1.36 &&
      first < 0.85 &&
      second < 0.85
    ) {
      without[kept[k + 1]!] = 1;
      extras.push({
        before: kept[k + 2] ?? kept[k + 1]!,
        event: kept[k + 1]!,
        part: first / (first + second),
      });
      k += 1;
    }
  }
  if (extras.length > 0) {
    kept = kept.filter((event) => without[event] === 0);
    ratio = ratios(times, kept);
  }
  const placedExtras: { before: number; part: number }[] = [];
  let index = 0;
  for (const { before, part } of extras) {
    while (index < kept.length && kept[index]! < before) index += 1;
    if (kept[index] === before) placedExtras.push({ before: index, part });
  }
  let squares = 0;
  let singles = 0;
  for (const r of ratio) {
    if (r < SINGLE_MOST) {
      squares += (r - 1) ** 2;
      singles += 1;
    }
  }
  return {
    kept,
    ratio,
    extras: placedExtras,
    scatter: singles > 0 ? Math.sqrt(squares / singles) : Infinity,
    swing: swingOf(times, kept, ratio),
  };
}

/** 95 % over 5 % quantile of single periods, each over the middle of those around it. */
function swingOf(times: Float64Array, kept: Int32Array, ratio: Float64Array): number {
  const single: number[] = [];
  for (let k = 0; k < ratio.length && single.length < MOST_SINGLES; k += 1) {
    if (ratio[k]! < SINGLE_MOST && ratio[k]! > 0.62) single.push(times[kept[k + 1]!]! - times[kept[k]!]!);
  }
  const usual = runningQuantile(Float64Array.from(single), ARM, 0.5);
  const relative = single.map((length, k) => length / usual[k]!).sort((a, b) => a - b);
  if (relative.length < 8) return 1;
  return quantileSorted(relative, 0.95) / quantileSorted(relative, 0.05);
}

function ratios(times: Float64Array, kept: Int32Array): Float64Array {
  const n = Math.max(0, kept.length - 1);
  const interval = new Float64Array(n);
  for (let k = 0; k < n; k += 1) interval[k] = times[kept[k + 1]!]! - times[kept[k]!]!;
  const usual = runningQuantile(interval, NEIGHBOURS, 0.5);
  let ratio = interval.map((length, k) => length / usual[k]!);
  for (let round = 0; round < 3; round += 1) ratio = againstSingles(interval, ratio);
  return ratio;
}

/** Each interval over the geometric mean of the two nearest single ones before and the two after it. */
function againstSingles(interval: Float64Array, ratio: Float64Array): Float64Array<ArrayBuffer> {
  const n = interval.length;
  const single = (k: number) => ratio[k]! < SINGLE_MOST && ratio[k]! > 0.62;
  const before = new Float64Array(n);
  const after = new Float64Array(n);
  sweep(0, n, 1, before);
  sweep(n - 1, -1, -1, after);
  const out = new Float64Array(n);
  for (let k = 0; k < n; k += 1) {
    const left = before[k]!;
    const right = after[k]!;
    const period = left > 0 && right > 0 ? Math.sqrt(left * right) : Math.max(left, right);
    out[k] = period > 0 ? interval[k]! / period : ratio[k]!;
  }
  return out;

  function sweep(from: number, to: number, by: number, into: Float64Array): void {
    let last = 0;
    let earlier = 0;
    for (let k = from; k !== to; k += by) {
      into[k] = last > 0 && earlier > 0 ? Math.sqrt(last * earlier) : last;
      if (single(k)) {
        earlier = last;
        last = interval[k]!;
      }
    }
  }
}
