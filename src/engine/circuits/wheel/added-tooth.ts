import { median } from '../../signal/statistics.ts';
import type { Pattern } from './pattern.ts';
import { type Placed, SINGLE_MOST } from './places.ts';

/** Two teeth a turn or fewer repeat too easily: the pattern might be there several times in a turn. */
export const FEWEST_TEETH = 3;

/** With fewer teeth than this, a second turn must show it once more. */
const WIDE_TURN = 24;
/** Share of the turns that must have their added tooth, and of the added teeth that must be in the turn's place. */
const SHARE = 0.75;
/** Places by which the added tooth may stand off its usual one. */
const MOST_APART = 0.2;

/** 12+1: no gap, but one more tooth between two places, once a turn, always in the same place. */
export function findAdded(placed: Placed): Pattern | null {
  if (placed.ratio.some((r) => r >= SINGLE_MOST) || placed.extras.length < 2) return null;
  const turn = commonest(placed.extras.slice(1).map(({ before }, i) => before - placed.extras[i]!.before));
  if (turn < FEWEST_TEETH) return null;
  const slot = commonest(placed.extras.map(({ before }) => before % turn));
  const extras = placed.extras.filter(({ before }) => before % turn === slot);
  const before = extras.map((extra) => extra.before);
  const turns = (before.at(-1)! - before[0]!) / turn;
  if (turns < (turn < WIDE_TURN ? 2 : 1)) return null;
  const couldBe = Math.floor((placed.ratio.length - 2 - slot) / turn) + 1;
  if (before.length < SHARE * couldBe || before.length < SHARE * placed.extras.length) return null;
  const middle = median(extras.map((extra) => extra.part))!;
  if (extras.some((extra) => Math.abs(extra.part - middle) > MOST_APART)) return null;

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
      degrees.push(angle - perPlace * (1 - middle));
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
    turns: Int32Array.from(
      before.filter((k) => k > 0),
      (k) => (k - before[0]!) / turn,
    ),
    stretches: [0],
    markIsFirstOfSeveral: false,
    doubled: [],
  };
}

function commonest(values: readonly number[]): number {
  const counts = new Map<number, number>();
  for (const value of values) counts.set(value, (counts.get(value) ?? 0) + 1);
  let best = 0;
  let most = 0;
  for (const [value, count] of counts) {
    if (count <= most) continue;
    most = count;
    best = value;
  }
  return best;
}
