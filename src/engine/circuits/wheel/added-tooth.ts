import { median } from '../../signal/statistics.ts';
import type { Pattern } from './pattern.ts';
import { type Placed, SINGLE_MOST } from './places.ts';

/** Two teeth a turn or fewer repeat too easily: the pattern might be there several times in a turn. */
export const FEWEST_TEETH = 3;

/** 12+1: no gap, but one more tooth between two places, once a turn, always in the same place. */
export function findAdded(placed: Placed): Pattern | null {
  if (placed.ratio.some((r) => r >= SINGLE_MOST) || placed.extras.length < 2) return null;
  const before = placed.extras.map((extra) => extra.before);
  const turn = before[1]! - before[0]!;
  if (turn < FEWEST_TEETH) return null;
  for (let i = 1; i < before.length; i += 1) if (before[i]! - before[i - 1]! !== turn) return null;

  const part = median(placed.extras.map((extra) => extra.part))!;
  const perPlace = 360 / turn;
  const extraBefore = new Set(before);
  const events: number[] = [];
  const degrees: number[] = [];
  const marks: number[] = [];
  placed.kept.forEach((event, k) => {
    const angle = (k - before[0]!) * perPlace;
    if (extraBefore.has(k) && k > 0) {
      // The doubled event stands right before this one in the train.
      events.push(event - 1);
      degrees.push(angle - perPlace * (1 - part));
      marks.push(events.length);
    }
    events.push(event);
    degrees.push(angle);
  });
  return {
    name: `${turn}+1`,
    places: null,
    teeth: turn + 1,
    missing: 0,
    gaps: [],
    events: Int32Array.from(events),
    degrees: Float64Array.from(degrees),
    marks: Int32Array.from(marks),
    turns: Int32Array.from(marks, (_, i) => i),
    stretches: [0],
    markIsFirstOfSeveral: false,
    doubled: [],
  };
}
