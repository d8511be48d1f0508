import { spread } from '../../signal/statistics.ts';
import type { Hump } from './humps.ts';

/** Relative compression of each cylinder in firing order from the first complete hump, in percent of the mean. */
export interface Balance {
  readonly value: readonly number[];
  readonly sd: readonly number[];
  readonly min: readonly number[];
  readonly max: readonly number[];
  /** Times that each cylinder was seen, at least. */
  readonly n: number;
}

/** 100 · (s / mean(s) − 1) of the hump heights s, averaged over cycles; null with fewer humps than cylinders. */
export function compressionBalance(humps: readonly Hump[], cylinders: number): Balance | null {
  if (!(cylinders >= 2) || humps.length < cylinders) return null;
  const places = Array.from({ length: cylinders }, (_, c) =>
    humps.filter((_, k) => k % cylinders === c).map((h) => h.height),
  );
  const spreads = places.map((heights) => spread(heights)!);
  const middle = spreads.reduce((sum, one) => sum + one.mean, 0) / cylinders;
  if (!(middle > 0)) return null;
  const percent = (height: number) => 100 * (height / middle - 1);
  return {
    value: spreads.map((one) => percent(one.mean)),
    sd: spreads.map((one) => (100 * one.sd) / middle),
    min: spreads.map((one) => percent(one.min)),
    max: spreads.map((one) => percent(one.max)),
    n: Math.min(...spreads.map((one) => one.n)),
  };
}
