import type { Feature } from './laid.ts';

/** Share of the gaps that must find their like one turn on. */
export const LEAST_MATCH = 0.75;
/** With fewer gaps than this in the train, every one must find its like. */
const FEWEST_GAPS = 6;
/** Gaps at the start that fit by chance, and may be left out. */
const MOST_SKIPPED = 5;
/** Share of the train that must be followed when its ends are left out. */
const LEAST_SPAN = 0.6;

interface Likeness {
  readonly matched: number;
  readonly missed: number;
}

const shareOf = ({ matched, missed }: Likeness) => (matched > 0 ? matched / (matched + missed) : 0);

export function smallestTurn(features: readonly Feature[], end: number): number | null {
  const sizeAt = new Map(features.map((f) => [f.place, f.size]));
  const lags = new Set<number>();
  for (let i = 0; i < features.length; i += 1) {
    for (let j = i + 1; j < Math.min(features.length, i + 12); j += 1) {
      if (features[i]!.size === features[j]!.size) lags.add(features[j]!.place - features[i]!.place);
    }
    if (lags.size > 400) break;
  }
  let best = 0;
  const likeness = new Map<number, number>();
  for (const lag of lags) {
    const { matched, missed } = likenessAt(lag);
    if (matched === 0 || matched < LEAST_MATCH * (matched + missed)) continue;
    // One more miss than was seen: what only the ends of the train could show counts for less.
    const share = matched / (matched + missed + 1);
    likeness.set(lag, share);
    best = Math.max(best, share);
  }
  // Whole numbers of turns fit as well as one: the smallest of what fits nearly best.
  const fitting = Array.from(likeness.keys()).filter((lag) => likeness.get(lag)! >= best - 0.1);
  return fitting.length > 0 ? Math.min(...fitting) : null;

  /** How many gaps find their like `lag` places away, of those that could; none when the lag is not to be believed. */
  function likenessAt(lag: number): Likeness {
    const has = (place: number, size: number) => sizeAt.get(place) === size;
    const whole = matches(0, end);
    if (whole.matched > 0 && whole.missed === 0) return whole;
    // At either end the shaft may have stood, or the signal been too weak: then the rest must be most of the train.
    const partnered = features.filter((f) => has(f.place + lag, f.size) || has(f.place - lag, f.size));
    for (let skipped = 0; skipped < MOST_SKIPPED && partnered.length - skipped >= 3; skipped += 1) {
      const first = partnered[skipped]!.place;
      const last = partnered.at(-1)!.place;
      if (last - first < LEAST_SPAN * end) break;
      const rest = matches(first, last + 1);
      if (shareOf(rest) >= LEAST_MATCH) return shareOf(rest) > shareOf(whole) ? rest : whole;
    }
    return whole;

    function matches(from: number, to: number): Likeness {
      let matched = 0;
      let missed = 0;
      for (const { place, size } of features) {
        if (place < from || place > to) continue;
        for (const other of [place + lag, place - lag]) {
          if (other < from || other + size > Math.min(end, to + size)) continue;
          if (has(other, size)) matched += 1;
          else missed += 1;
        }
      }
      if (matched < 2 || (features.length < FEWEST_GAPS && missed > 0)) return { matched: 0, missed };
      return { matched, missed };
    }
  }
}
