import { mapped } from '../../signal/mapped.ts';
import { runningQuantile } from '../../signal/running-quantile.ts';
import { median } from '../../signal/statistics.ts';
import type { Pickup } from './pickup.ts';

export type Polarity = 'normal' | 'inverted';

/** One kind of swing this much higher than the other tells steep tooth centres from slow stretches between far teeth. */
const STEEPER = 1.45;
/** An interval this much longer than its neighbours' middle is a gap. */
const WIDE = 1.45;
const NEIGHBOURS = 8;
/** So many gaps are enough to tell by, and so many passages for a middle height. */
const MOST_GAPS = 100;
const MOST_PASSAGES = 4000;
const LEAST_DIFFERENCE = 0.15;

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
  const steep = tellSteepness(pickup);
  if (steep) return steep;
  if (pickup.falling.length === 0 || pickup.rising.length === 0) return null;
  const falls = pickup.falling.subarray(0, 2 * MOST_PASSAGES);
  const rises = pickup.rising.subarray(0, 2 * MOST_PASSAGES);
  const betweenFalling = heightInGaps(pickup, falls, rises);
  const betweenRising = heightInGaps(pickup, rises, falls);
  if (betweenFalling === null && betweenRising === null) return null;
  const difference = (betweenRising ?? 1) - (betweenFalling ?? 1);
  if (Math.abs(difference) < LEAST_DIFFERENCE) return null;
  return difference > 0 ? 'normal' : 'inverted';
}

/** As `tellPolarity`, from the heights of all passages alone: where teeth stand far apart they differ clearly. */
export function tellSteepness(pickup: Pickup): Polarity | null {
  const falling = middleHeight(pickup, pickup.falling);
  const rising = middleHeight(pickup, pickup.rising);
  if (falling === null || rising === null) return null;
  if (falling > STEEPER * rising) return 'normal';
  return rising > STEEPER * falling ? 'inverted' : null;
}

function middleHeight(pickup: Pickup, kind: Int32Array): number | null {
  const step = Math.max(1, Math.floor(kind.length / MOST_PASSAGES));
  return median(
    mapped(
      kind.filter((_, i) => i % step === 0),
      (k) => Math.abs(pickup.swings.height[k]!),
    ),
  );
}

/**
 * Median, over the gaps in `teeth`, of the height of the opposite passage inside the gap over that of the nearer of the
 * two teeth beside the gap, as a part of what it is elsewhere.
 */
function heightInGaps(pickup: Pickup, teeth: Int32Array, others: Int32Array): number | null {
  const { at, height } = pickup.swings;
  // The first tooth has no interval before it: it stands for itself.
  const intervals = Float64Array.from(
    teeth,
    (k, i) => at[i > 0 ? k : (teeth[1] ?? k)]! - at[teeth[Math.max(0, i - 1)]!]!,
  );
  const near = runningQuantile(intervals, NEIGHBOURS, 0.5);
  const inGaps: number[] = [];
  const elsewhere: number[] = [];
  let other = 0;
  for (let i = 1; i < teeth.length && inGaps.length < MOST_GAPS; i += 1) {
    const before = teeth[i - 1]!;
    const after = teeth[i]!;
    while (other < others.length && others[other]! < before) other += 1;
    let inside = -1;
    for (let o = other; o < others.length && others[o]! < after; o += 1) {
      if (inside < 0 || Math.abs(height[others[o]!]!) > Math.abs(height[inside]!)) inside = others[o]!;
    }
    if (inside < 0) continue;
    const nearer = at[inside]! - at[before]! < at[after]! - at[inside]! ? before : after;
    const ratio = Math.abs(height[inside]! / height[nearer]!);
    (intervals[i]! >= WIDE * near[i]! ? inGaps : elsewhere).push(ratio);
  }
  const usual = median(elsewhere);
  const found = median(inGaps);
  return usual && found !== null ? found / usual : null;
}
