import { median } from '../../signal/statistics.ts';
import type { Pickup } from './pickup.ts';

export type Polarity = 'normal' | 'inverted';

/** One kind of swing this much higher than the other tells steep tooth centres from slow stretches between far teeth. */
const STEEPER = 1.45;
/** An interval this much longer than its neighbours' middle is a gap. */
const WIDE = 1.45;
const NEIGHBOURS = 8;

/**
 * Which passage is a tooth's centre: the falling one (normal) or the rising one (inverted), between these two leads.
 *
 * At a tooth's centre the signal goes straight from one lobe to the other. Between the last tooth before a gap and the
 * first one after it, it comes back from one lobe only to the flat stretch: the filter answers with half the height.
 * So the kind of passage that stays full beside gaps is the tooth's. Where teeth stand far apart this holds at every
 * tooth, and the heights alone tell. The patent US 11,237,203 B2 tells the same from ratios of edge intervals.
 *
 * @returns null when there is no gap and no difference in height: an even wave has no flanks to tell by.
 */
export function tellPolarity(pickup: Pickup): Polarity | null {
  const falling = middleHeight(pickup, pickup.falling);
  const rising = middleHeight(pickup, pickup.rising);
  if (falling === null || rising === null) return null;
  if (falling > STEEPER * rising) return 'normal';
  if (rising > STEEPER * falling) return 'inverted';
  const betweenFalling = heightInGaps(pickup, pickup.falling, pickup.rising);
  const betweenRising = heightInGaps(pickup, pickup.rising, pickup.falling);
  if (betweenFalling === null && betweenRising === null) return null;
  const difference = (betweenRising ?? 1) - (betweenFalling ?? 1);
  if (Math.abs(difference) < 0.1) return null;
  return difference > 0 ? 'normal' : 'inverted';
}

const middleHeight = (pickup: Pickup, kind: Int32Array) =>
  median(Float64Array.from(kind, (k) => Math.abs(pickup.swings.height[k]!)));

/** Median, over the gaps in `teeth`, of the height of the opposite passage inside the gap beside its neighbours'. */
function heightInGaps(pickup: Pickup, teeth: Int32Array, others: Int32Array): number | null {
  const { at, height } = pickup.swings;
  const intervals = Float64Array.from(teeth, (k, i) => (i > 0 ? at[k]! - at[teeth[i - 1]!]! : Number.NaN));
  const found: number[] = [];
  let other = 0;
  for (let i = 1; i < teeth.length && found.length < 400; i += 1) {
    const near = median(intervals.subarray(Math.max(1, i - NEIGHBOURS), i + NEIGHBOURS + 1))!;
    while (other < others.length && others[other]! < teeth[i - 1]!) other += 1;
    if (intervals[i]! < WIDE * near) continue;
    let inside = 0;
    for (let o = other; o < others.length && others[o]! < teeth[i]!; o += 1) {
      inside = Math.max(inside, Math.abs(height[others[o]!]!));
    }
    const window = others.subarray(Math.max(0, other - NEIGHBOURS), other + NEIGHBOURS);
    const usual = median(Float64Array.from(window, (k) => Math.abs(height[k]!)));
    if (inside > 0 && usual) found.push(inside / usual);
  }
  return median(found);
}
