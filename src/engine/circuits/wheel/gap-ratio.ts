import { spread } from '../../signal/statistics.ts';
import { absent, type Value } from '../../value.ts';
import { type FoundWheel, stretchStarts } from './train.ts';

/** `gap_ratio`: the gap's length over the mean of the nearest single tooth periods before and after it. */
export function gapRatio(wheel: FoundWheel): Value {
  const { pattern, timesS } = wheel;
  const { places, gaps, degrees, marks } = pattern;
  if (places === null || gaps.length === 0 || marks.length === 0) {
    return absent('gap_ratio', '1', 'the wheel has no missing teeth');
  }
  const starts = stretchStarts(pattern);
  const step = (k: number) => Math.round(((degrees[k + 1]! - degrees[k]!) * places) / 360);
  const found: number[][] = gaps.map(() => []);
  const evidence: Array<{ from: number; to: number }> = [];
  const slot = new Map(gaps.map((gap, i) => [gap.after, i]));
  for (let k = 0; k + 1 < degrees.length; k += 1) {
    if (starts.has(k + 1)) continue;
    const place = Math.round((degrees[k]! * places) / 360);
    const index = slot.get(((place % places) + places) % places);
    if (index === undefined || step(k) !== gaps[index]!.size) continue;
    const before = nearestPeriod(k - 1, -1);
    const after = nearestPeriod(k + 1, 1);
    if (before === null || after === null) continue;
    found[index]!.push((timesS[k + 1]! - timesS[k]!) / ((before + after) / 2));
    if (evidence.length < 50) evidence.push({ from: timesS[k]!, to: timesS[k + 1]! });
  }
  const spreads = found.map((list) => spread(list));
  if (spreads.some((s) => s === null)) {
    return absent('gap_ratio', '1', 'no gap in the capture has a single tooth period on both sides');
  }
  const all = spreads.filter((s) => s !== null);
  const n = Math.min(...all.map((s) => s.n));
  if (all.length === 1) {
    const [one] = all;
    return {
      key: 'gap_ratio',
      value: one!.mean,
      unit: '1',
      n,
      min: one!.min,
      max: one!.max,
      sd: one!.sd,
      evidence,
    };
  }
  return {
    key: 'gap_ratio',
    value: all.map((s) => s.mean),
    unit: '1',
    n,
    min: all.map((s) => s.min),
    max: all.map((s) => s.max),
    sd: all.map((s) => s.sd),
    evidence,
  };

  function nearestPeriod(from: number, by: number): number | null {
    for (let k = from; k >= 0 && k + 1 < degrees.length && Math.abs(k - from) < 4; k += by) {
      if (starts.has(k + 1)) return null;
      if (step(k) === 1) return timesS[k + 1]! - timesS[k]!;
    }
    return null;
  }
}
