import type { BlockMeans, ScaleTrack } from './scale.ts';

/**
 * Extremes of the tooth filter, a high and a low in turn. The filter is the mean over one half-width before a moment
 * less the mean over one half-width after it: high at a falling passage through the local middle, low at a rising one.
 * Offset and slow drift fall out, hum is damped, noise averaged.
 */
export interface Swings {
  readonly count: number;
  /** Fractional sample index. */
  readonly at: Float64Array;
  /** Filter output: above 0 for falling passages, below 0 for rising ones. */
  readonly height: Float64Array;
  /** Half-width of the filter there, in samples. */
  readonly halfWidth: Float64Array;
}

/** Blocks in one half-width: fine enough to place an extreme, coarse enough to be quick. */
const BLOCKS_OCTAVES = 3;

/**
 * Extremes that stand out of the noise: a change of direction counts when the filter has turned by more than
 * `floors(halfWidth)`.
 */
export function findSwings(
  means: BlockMeans,
  track: ScaleTrack,
  floor: (halfWidth: number) => number,
): Swings {
  const out = new SwingList();
  const segments = track.octave.length;
  for (let s = 0; s < segments; ) {
    const octave = track.octave[s]!;
    let end = s + 1;
    while (end < segments && track.octave[end] === octave) end += 1;
    const last = end === segments ? means.count : end * track.segmentLength;
    filterStretch(means, octave, s * track.segmentLength, last, floor(2 ** octave), out);
    s = end;
  }
  return out.finish();
}

function filterStretch(
  means: BlockMeans,
  octave: number,
  begin: number,
  end: number,
  floor: number,
  out: SwingList,
): void {
  const fine = Math.max(0, octave - BLOCKS_OCTAVES);
  const size = 2 ** fine;
  const blocks = 2 ** (octave - fine);
  const level = means.level(fine);
  const from = Math.max(0, Math.floor(begin / size) - blocks - 2);
  const to = Math.min(level.length, Math.ceil(end / size) + blocks + 2);
  const clean =
    blocks >= 8
      ? medians5(cut(level, from, to))
      : blocks >= 4
        ? medians3(cut(level, from, to))
        : cut(level, from, to);

  let before = 0;
  let after = 0;
  for (let k = 0; k < blocks; k += 1) {
    before += clean[k] ?? 0;
    after += clean[k + blocks] ?? 0;
  }
  for (let k = blocks; k + blocks <= clean.length; k += 1) {
    const at = (from + k) * size - 0.5;
    if (at >= begin && at < end) out.take(at, (before - after) / blocks, 2 ** octave, floor);
    before += clean[k]! - clean[k - blocks]!;
    after += (clean[k + blocks] ?? 0) - clean[k]!;
  }
}

function cut(level: Float32Array, from: number, to: number): Float32Array {
  if (from >= 0 && to <= level.length) return level.subarray(from, to);
  return Float32Array.from(
    { length: to - from },
    (_, i) => level[Math.min(level.length - 1, Math.max(0, from + i))]!,
  );
}

/** Running median of five: a spike shorter than two blocks leaves no trace, an edge stays where it is. */
function medians5(level: Float32Array): Float32Array {
  const out = level.slice();
  for (let i = 2; i + 2 < level.length; i += 1) {
    const a = level[i - 2]!;
    const b = level[i - 1]!;
    const d = level[i + 1]!;
    const e = level[i + 2]!;
    // The lowest and the highest of the four cannot be the middle of the five: median of the rest.
    const low = Math.max(Math.min(a, b), Math.min(d, e));
    const high = Math.min(Math.max(a, b), Math.max(d, e));
    out[i] = middle(level[i]!, low, high);
  }
  return out;
}

function medians3(level: Float32Array): Float32Array {
  const out = level.slice();
  for (let i = 1; i + 1 < level.length; i += 1) out[i] = middle(level[i]!, level[i - 1]!, level[i + 1]!);
  return out;
}

const middle = (a: number, b: number, c: number) => Math.max(Math.min(a, b), Math.min(Math.max(a, b), c));

/** Follows the filter's output and keeps an extreme once it has turned away from it by more than the floor. */
export class SwingList {
  private at = new Float64Array(1024);
  private height = new Float64Array(1024);
  private halfWidth = new Float64Array(1024);
  private count = 0;
  private direction = 0;
  private firstAt = Number.NaN;
  private highAt = 0;
  private high = -Infinity;
  private highWidth = 0;
  private lowAt = 0;
  private low = Infinity;
  private lowWidth = 0;

  take(at: number, value: number, halfWidth: number, floor: number): void {
    if (Number.isNaN(this.firstAt)) this.firstAt = at;
    if (value > this.high) {
      this.high = value;
      this.highAt = at;
      this.highWidth = halfWidth;
    }
    if (value < this.low) {
      this.low = value;
      this.lowAt = at;
      this.lowWidth = halfWidth;
    }
    if (this.direction >= 0 && this.high - value > floor) {
      this.keep(this.highAt, this.high, this.highWidth);
      this.direction = -1;
      this.low = value;
      this.lowAt = at;
      this.lowWidth = halfWidth;
      this.high = value;
    } else if (this.direction <= 0 && value - this.low > floor) {
      this.keep(this.lowAt, this.low, this.lowWidth);
      this.direction = 1;
      this.high = value;
      this.highAt = at;
      this.highWidth = halfWidth;
      this.low = value;
    } else if (this.direction > 0) {
      this.low = value;
    } else if (this.direction < 0) {
      this.high = value;
    }
  }

  /** What is still rising or falling at the end is no extreme and is left out, as at the beginning. */
  finish(): Swings {
    return {
      count: this.count,
      at: this.at.slice(0, this.count),
      height: this.height.slice(0, this.count),
      halfWidth: this.halfWidth.slice(0, this.count),
    };
  }

  private keep(at: number, height: number, halfWidth: number): void {
    if (at === this.firstAt) return;
    if (this.count === this.at.length) {
      this.at = longer(this.at);
      this.height = longer(this.height);
      this.halfWidth = longer(this.halfWidth);
    }
    this.at[this.count] = at;
    this.height[this.count] = height;
    this.halfWidth[this.count] = halfWidth;
    this.count += 1;
  }
}

function longer(values: Float64Array): Float64Array<ArrayBuffer> {
  const more = new Float64Array(values.length * 2);
  more.set(values);
  return more;
}
