import type { Feature } from './laid.ts';
import type { PatternGap } from './pattern.ts';

/** Whether so many places are a whole number of quarter degrees apart: 60, 48, 36, 32 (11.25 degrees), 24 … */
export const isOrdinaryDivision = (places: number) => 1440 % places === 0;

/** Gaps this many places apart are a turn when they come back once: no usual wheel has two so far apart within a turn. */
const WIDE_TURN = 24;
/** Wheels with more places than this are rare. */
const MOST_PLACES = 60;
/** More gaps a turn than this are teeth that were not seen. */
const MOST_GAPS = 6;
const MANY_GAPS = 4;
/** Each gap of the wheel must come back at least this often beside the one that does most often. */
const LEAST_SHARE = 0.7;
/** How far (in places) the gaps of an unusual wheel may measure from whole places. */
const CLOSE = 0.12;

/**
 * Whether gaps came back often enough to name the wheel. What a claim needs depends on how easily chance, a lost tooth or
 * a part of another wheel would look like it:
 * - one gap, 24 places or more apart: back one turn later, once (60-2 in a turn and a half).
 * - one gap, fewer places or more than 60: twice, for within one turn 36-2-2-2 shows two gaps 15 places apart.
 * - several gaps: each of them back at least once; a tooth lost once is no gap of the wheel. With gaps of two
 *   teeth and more, one of three may be still to come.
 * - several gaps among few places, or four gaps and more: each back three times, all of them, and of whole places.
 */
export function isProved(
  features: readonly Feature[],
  turn: number,
  template: readonly PatternGap[],
  nearness: number,
): boolean {
  const gaps = template.length;
  if (gaps > MOST_GAPS) return false;
  const unusual = gaps >= MANY_GAPS || (gaps > 1 && turn < WIDE_TURN);
  const wanted = unusual ? 3 : turn < WIDE_TURN || turn > MOST_PLACES ? 2 : 1;
  const sizeAt = new Map(features.map((f) => [f.place, f.size]));
  const back = new Map<number, number>();
  let missed = 0;
  const last = features.at(-1)!.place;
  for (const { place, size } of features) {
    const slot = place % turn;
    if (sizeAt.get(place + turn) === size) back.set(slot, (back.get(slot) ?? 0) + 1);
    else if (place + turn <= last) missed += 1;
  }
  const slots = Array.from(back.values()).sort((a, b) => b - a);
  if (unusual && (missed > 0 || nearness > CLOSE)) return false;
  if (gaps > 1 && !unusual && slots.length === gaps - 1 && slots.length > 1) {
    // All but one have come back, nothing speaks against it, and no gap could be one lost tooth.
    return missed === 0 && template.every(({ size }) => size > 2) && isOrdinaryDivision(turn);
  }
  if (slots.length < gaps) return false;
  // A gap misread by a place shifts all that follow: then the turns before and after count together.
  if (gaps === 1) return slots.reduce((sum, count) => sum + count, 0) >= wanted;
  // What is there in a part of the turns only is a tooth lost in them.
  return slots[gaps - 1]! >= wanted && slots[gaps - 1]! >= LEAST_SHARE * slots[0]!;
}
