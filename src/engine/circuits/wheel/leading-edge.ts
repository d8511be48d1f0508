import { median } from '../../signal/statistics.ts';
import { findGapPattern } from './gap-pattern.ts';
import type { TwoLevels } from './two-levels.ts';

/** A level held this much longer than its like around it is the gap's. */
const LONG = 1.5;

/**
 * Which edge is the tooth event: the one that ends the gap's long level. The level that is now and then held much
 * longer than usual is the gap's; where both are, the one that makes a wheel, and the longer. Without a gap: rising.
 */
export function chooseEdge(levels: TwoLevels): { readonly rising: boolean } {
  const low = longHolds(levels, 0);
  const high = longHolds(levels, 1);
  if (low.count === 0 && high.count === 0) return { rising: true };
  if (high.count === 0) return { rising: true };
  if (low.count === 0) return { rising: !findGapPattern(levels.fallingS).ok };
  const rises = findGapPattern(levels.risingS).ok;
  const falls = findGapPattern(levels.fallingS).ok;
  if (rises !== falls) return { rising: rises };
  return { rising: !falls || low.longest >= high.longest };
}

function longHolds(levels: TwoLevels, level: 0 | 1): { count: number; longest: number } {
  const { edgesS, rising } = levels;
  const held: number[] = [];
  for (let k = 0; k + 1 < edgesS.length; k += 1) {
    // From a rising edge on the signal is high.
    if (rising[k] === level) held.push(edgesS[k + 1]! - edgesS[k]!);
  }
  const ratios: number[] = [];
  for (let k = 1; k + 1 < held.length; k += 1) {
    const around = [...held.slice(Math.max(0, k - 3), k), ...held.slice(k + 1, k + 4)];
    const ratio = held[k]! / median(around)!;
    if (ratio > LONG) ratios.push(ratio);
  }
  return { count: ratios.length, longest: median(ratios) ?? 0 };
}

/** Width of the pulse that begins at each tooth event, over the middle of the intervals around it. */
export function pulseWidths(levels: TwoLevels, risingEvents: boolean): Float64Array {
  const { edgesS, rising } = levels;
  const events = risingEvents ? levels.risingS : levels.fallingS;
  const widths: number[] = [];
  for (let k = 0; k + 1 < edgesS.length; k += 1) {
    if ((rising[k] === 1) === risingEvents) widths.push(edgesS[k + 1]! - edgesS[k]!);
  }
  return Float64Array.from(widths, (width, i) => {
    const from = Math.max(0, i - 6);
    const near: number[] = [];
    for (let k = from; k < Math.min(events.length - 1, i + 6); k += 1) near.push(events[k + 1]! - events[k]!);
    return width / (median(near) ?? width);
  });
}
