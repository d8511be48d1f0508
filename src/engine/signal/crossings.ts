/** Crossings of one level, in order. `at` is a fractional sample index: `timeAt(axis, at[k])` gives seconds. */
export interface Crossings {
  readonly count: number;
  readonly at: Float64Array;
  /** 1: rising, 0: falling. They alternate, except across a hole in the samples. */
  readonly rising: Uint8Array;
}

export interface CrossingOptions {
  readonly level: number;
  /** Full width of the dead band, centred on the level, in the signal's unit. 0: every crossing counts. */
  readonly hysteresis: number;
  /** Values hold until the next row (changes only): the crossing is at the row's own time. */
  readonly holds?: boolean;
}

/** Holes (NaN) of up to this many samples are bridged by a straight line; behind a longer one the state is unknown. */
const BRIDGED_HOLE = 4;

/**
 * Crossings of a level, accepted only when the signal then leaves the dead band on the other side. The moment is that
 * of the last passage of the level itself, on a straight line between the two samples.
 *
 * Edge rule: a sample that equals the level counts as above it. Empty input, one sample, all NaN: no crossing.
 * The state before the first sample outside the dead band is unknown, so nothing is counted until then.
 */
export function crossings(values: Float32Array, options: CrossingOptions): Crossings {
  const { level, hysteresis, holds = false } = options;
  const upper = level + hysteresis / 2;
  const lower = level - hysteresis / 2;
  let at = new Float64Array(1024);
  let rising = new Uint8Array(1024);
  let count = 0;
  let state = 0;
  let lastRise = -1;
  let lastFall = -1;
  let previous = Number.NaN;
  let previousIndex = -1;

  for (let i = 0; i < values.length; i += 1) {
    const value = values[i]!;
    if (Number.isNaN(value)) continue;
    if (i - previousIndex > 1 && i - previousIndex - 1 > BRIDGED_HOLE && !holds) {
      state = 0;
      previous = Number.NaN;
    }
    if (value >= level) {
      if (previous < level) {
        lastRise = holds
          ? i
          : previousIndex + ((level - previous) / (value - previous)) * (i - previousIndex);
      }
      if (value >= upper && state <= 0) {
        if (state < 0) {
          if (count === at.length) [at, rising] = grow(at, rising);
          at[count] = lastRise;
          rising[count] = 1;
          count += 1;
        }
        state = 1;
      }
    } else {
      if (previous >= level) {
        lastFall = holds
          ? i
          : previousIndex + ((previous - level) / (previous - value)) * (i - previousIndex);
      }
      if (value <= lower && state >= 0) {
        if (state > 0) {
          if (count === at.length) [at, rising] = grow(at, rising);
          at[count] = lastFall;
          rising[count] = 0;
          count += 1;
        }
        state = -1;
      }
    }
    previous = value;
    previousIndex = i;
  }
  return { count, at: at.slice(0, count), rising: rising.slice(0, count) };
}

function grow(at: Float64Array, rising: Uint8Array): [Float64Array<ArrayBuffer>, Uint8Array<ArrayBuffer>] {
  const moreAt = new Float64Array(at.length * 2);
  const moreRising = new Uint8Array(at.length * 2);
  moreAt.set(at);
  moreRising.set(rising);
  return [moreAt, moreRising];
}
