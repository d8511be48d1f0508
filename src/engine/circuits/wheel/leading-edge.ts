import { mapped } from '../../signal/mapped.ts';
import { median, quantile } from '../../signal/statistics.ts';
import { findGapPattern } from './gap-pattern.ts';
import type { TwoLevels } from './two-levels.ts';

/** A level held this much longer than its like around it is the gap's. */
const LONG = 1.5;
/** The level after it belongs to the gap too when it is, as a rule, held this much longer than its like. */
const ALSO_LONG = 1.25;
const SURELY_SHORT = 1.1;

/**
 * Which edge is the tooth event: the one that ends the gap's long level. Where the next level is longer than usual as
 * well (a pick-up's signal squared by its receiver swings back late in the gap), the gap ends with that one. Where both
 * edges could be, the one that makes a wheel decides. Without a gap: rising.
 */
export function chooseEdge(levels: TwoLevels): { readonly rising: boolean } {
  const low = longHolds(levels, 0);
  const high = longHolds(levels, 1);
  if (low.count === 0 && high.count === 0) return { rising: true };
  // The end of a long low level is a rising edge, that of a long high level after it a falling one.
  const lowFirst = low.count > 0 && (high.count === 0 || low.longest >= high.longest);
  let rising = lowFirst ? !(low.after > ALSO_LONG) : high.after > ALSO_LONG;
  // Only one level is ever held long, and what follows is not: the edge is told, whatever is made of it.
  const told = lowFirst ? high.count === 0 : low.count === 0;
  if (told && (lowFirst ? low.after : high.after) < SURELY_SHORT) return { rising };
  const made = findGapPattern(rising ? levels.risingS : levels.fallingS).ok;
  if (!made && findGapPattern(rising ? levels.fallingS : levels.risingS).ok) rising = !rising;
  else if (!made) rising = true;
  return { rising };
}

interface LongHolds {
  readonly count: number;
  /** Middle of how much longer than usual the long ones are. */
  readonly longest: number;
  /** Middle of how much longer than usual, and than nearly all its like, the opposite level right after them is held. */
  readonly after: number;
}

function longHolds(levels: TwoLevels, level: 0 | 1): LongHolds {
  const { edgesS, rising } = levels;
  const held = Float64Array.from(
    { length: Math.max(0, edgesS.length - 1) },
    (_, k) => edgesS[k + 1]! - edgesS[k]!,
  );
  const overUsual = (k: number) => {
    const around = [k - 6, k - 4, k - 2, k + 2, k + 4, k + 6]
      .filter((j) => j >= 0 && j < held.length)
      .map((j) => held[j]!);
    return around.length < 2 ? 1 : held[k]! / median(around)!;
  };
  const ratios: number[] = [];
  const after: number[] = [];
  const others: number[] = [];
  for (let k = 1; k + 1 < held.length; k += 1) {
    // From a rising edge on the signal is high.
    if (rising[k] !== level) continue;
    const ratio = overUsual(k);
    if (ratio <= LONG) {
      others.push(overUsual(k + 1));
      continue;
    }
    ratios.push(ratio);
    // A pulse long because the shaft is slow there has a long one before the gap as well.
    after.push(Math.min(overUsual(k + 1), held[k + 1]! / held[k - 1]!));
  }
  // Where the speed swings, levels are as long elsewhere.
  const usual = Math.max(1, quantile(others, 0.95) ?? 1);
  return { count: ratios.length, longest: median(ratios) ?? 0, after: (median(after) ?? 1) / usual };
}

/** Width of the pulse that begins at each tooth event, over the middle of the intervals around it. */
export function pulseWidths(levels: TwoLevels, risingEvents: boolean): Float64Array {
  const { edgesS, rising } = levels;
  const events = risingEvents ? levels.risingS : levels.fallingS;
  const widths: number[] = [];
  for (let k = 0; k + 1 < edgesS.length; k += 1) {
    if ((rising[k] === 1) === risingEvents) widths.push(edgesS[k + 1]! - edgesS[k]!);
  }
  return mapped(widths, (width, i) => {
    const near: number[] = [];
    for (let k = Math.max(0, i - 6); k < Math.min(events.length - 1, i + 6); k += 1)
      near.push(events[k + 1]! - events[k]!);
    return width / (median(near) ?? width);
  });
}
