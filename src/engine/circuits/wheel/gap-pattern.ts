import { mapped } from '../../signal/mapped.ts';
import { mean, median } from '../../signal/statistics.ts';
import { FEWEST_TEETH, findAdded } from './added-tooth.ts';
import { follow } from './follow-pattern.ts';
import { commonTemplates, nearlyShorter } from './gap-template.ts';
import type { Feature, Laid } from './laid.ts';
import type { PatternGap, PatternResult } from './pattern.ts';
import { layOnPlaces, type Placed, SINGLE_MOST } from './places.ts';
import { isOrdinaryDivision, isProved } from './proof.ts';
import { smallestTurn } from './turn-length.ts';

/** Teeth scattered more than this about their places (deviation, in periods) are no evenly divided wheel. */
const MOST_SCATTER = 0.24;
/** Periods that shrink (or grow) by this much over three teeth, noise aside: the shaft comes from rest or to a stop. */
const STARTING = 1.12;
/** Periods that grow by this much from tooth to tooth, twice in a row, at the end of the train. */
const STOPPING = 1.1;
/** … and are so much longer than they were. */
const STOPPED = 1.3;
/** Fewer teeth a gap than this are few: the speed may swing while a gap of two teeth passes. */
const FEW_TEETH = 40;
/** One reading of the gaps' lengths must fit better than another by this, in places. */
const CLEARLY = 0.3;
const MOST_WAYS = 16;
/** A pick-up's gap may measure half a place more than it is, and the speed may swing; no more, on the average. */
const FARTHEST = 0.65;
/** What each further size of gap costs, in places. */
const UNLIKE = 0.25;
/** An odd division is believed only of a gap that fits it well. */
const FITS_WELL = 0.15;
/** With fewer gaps than this share of the intervals, the rest is an even division. */
const MOST_GAPS = 0.2;
/** Intervals this near to whole numbers of periods are places of an even division. */
const WHOLE = 0.15;
/** The pattern is searched in this many gaps; the whole train is then followed with it. */
const SEARCHED_GAPS = 2000;

/**
 * Finds an evenly divided wheel with missing teeth (60-2, 36-2-2-2, 36-2-1 …) or one added tooth (12+1).
 *
 * Every event is laid on a place; places without a tooth must come back one turn later, and again, all through the
 * train. The smallest turn for which they do is the wheel. Naming: the first number includes the missing places
 * (Speeduino wiki, "Missing Tooth").
 */
export function findGapPattern(times: Float64Array): PatternResult {
  if (times.length < 6) return no('too few teeth in the capture');
  const placed = trimmed(times, layOnPlaces(times));
  if (!(placed.scatter < MOST_SCATTER)) return no('the teeth follow no even division');
  let best: Found | null = null;
  let second: Found | null = null;
  for (const sizes of sizings(placed)) {
    const found = findTurn(laidWith(placed, sizes));
    if (!found) continue;
    if (!best || found.rank > best.rank) [best, second] = [found, best];
    else if (!second || found.rank > second.rank) second = found;
  }
  if (best && second && nameOf(second) !== nameOf(best) && best.rank - second.rank < CLEARLY) {
    return no(`the gaps' lengths fit ${nameOf(best)} as well as ${nameOf(second)}`);
  }
  if (best) {
    const pattern = follow(resized(best), best.turn, best.template);
    if (pattern) return { ok: true, pattern };
  }
  const added = findAdded(placed);
  if (added) return { ok: true, pattern: added };
  const gaps = placed.ratio.reduce((count, r) => count + (r >= SINGLE_MOST ? 1 : 0), 0);
  if (gaps === 0 && placed.extras.length === 0) {
    return no('evenly spaced teeth without a gap: nothing marks the turn', true);
  }
  // Mostly single places: an evenly divided wheel, whose gaps were not seen often or well enough.
  const wholes = placed.ratio.every((r) => Math.abs(r - Math.max(1, Math.round(r))) < WHOLE);
  const evenly = gaps < MOST_GAPS * placed.ratio.length || wholes;
  if (gaps <= 1) {
    return no('no complete turn: fewer than two gaps with a tooth on both sides are in the capture', evenly);
  }
  return no('the gaps do not come back in a repeating pattern', evenly);
}

const no = (reason: string, evenly = false): PatternResult => ({ ok: false, reason, evenly });

/**
 * Leaves out events at the ends where the shaft starts or stops: with a neighbour on one side only, an interval long
 * because of a speed from or to rest looks like a gap.
 */
function trimmed(times: Float64Array, placed: Placed): Placed {
  let from = 0;
  let to = times.length;
  const interval = (k: number) => times[k + 1]! - times[k]!;
  const starting = STARTING + 3 * placed.scatter;
  while (to - from > 8) {
    const a = interval(from);
    const b = interval(from + 1);
    if (a > SINGLE_MOST * b && b > starting * interval(from + 4)) from += 1;
    else break;
  }
  while (to - from > 8) {
    const a = interval(to - 2);
    const b = interval(to - 3);
    if (a > SINGLE_MOST * b && b > starting * interval(to - 6)) to -= 1;
    else break;
  }
  // At the very end nothing follows to tell a gap from a shaft that comes to rest: one long interval behind another.
  while (to - from > 8) {
    const a = interval(to - 2);
    const b = interval(to - 3);
    const usual = median(mapped(new Float64Array(9), (_, i) => interval(Math.max(from, to - 3 - i))))!;
    if (a > STOPPING * b && a < 1.8 * b && b > STOPPING * interval(to - 4) && a > STOPPED * usual) to -= 1;
    else break;
  }
  if (from === 0 && to === times.length) return placed;
  const again = layOnPlaces(times.subarray(from, to));
  return { ...again, kept: again.kept.map((event) => event + from), cutBefore: from > 0 };
}

/** Ways to read the gaps' lengths in whole places: a pick-up's gap may measure 3.5 periods where three are meant. */
function sizings(placed: Placed): Array<(ratio: number) => number> {
  const gaps = Array.from(placed.ratio.filter((r) => r >= SINGLE_MOST)).sort((a, b) => a - b);
  const intervals = placed.ratio.length;
  const jump = Math.max(0.25, 3 * placed.scatter);
  const clusters: number[][] = [];
  for (const gap of gaps) {
    const cluster = clusters.at(-1);
    if (cluster && gap - cluster.at(-1)! < jump) cluster.push(gap);
    else clusters.push([gap]);
  }
  let ways: Array<Array<{ to: number; size: number }>> = [[]];
  for (const cluster of clusters) {
    const to = cluster.at(-1)!;
    const middle = median(cluster)!;
    const wide = to - cluster[0]! > Math.max(1.4, 0.5 * middle);
    const nearest = Math.max(2, Math.round(middle));
    const other = middle > nearest ? nearest + 1 : nearest - 1;
    // The speed swings while a long gap passes, the more the fewer teeth there are: its length is open then.
    const long = middle > 2.6 && intervals < FEW_TEETH * gaps.length;
    const longest = Math.min(nearest + 2, Math.round(middle * placed.swing));
    const shortest = Math.max(2, nearest - 2, Math.round(middle / placed.swing));
    const open = new Set([nearest]);
    if (ways.length < MOST_WAYS && !wide) {
      if (other >= 2 && (long || Math.abs(middle - nearest) > 0.2)) open.add(other);
      if (long) for (let size = shortest; size <= longest; size += 1) open.add(size);
    }
    const sizes = wide ? [0] : Array.from(open);
    ways = ways.flatMap((way) => sizes.map((size) => [...way, { to, size }]));
  }
  return ways.map((way) => (ratio: number) => {
    if (ratio < SINGLE_MOST) return 1;
    const size = way.find((part) => ratio <= part.to)?.size ?? 0;
    return size > 0 ? size : Math.max(2, Math.round(ratio));
  });
}

function laidWith(placed: Placed, sizeOf: (ratio: number) => number): Laid {
  const place = new Int32Array(placed.kept.length);
  const features: Feature[] = [];
  for (let k = 0; k < placed.ratio.length; k += 1) {
    const size = sizeOf(placed.ratio[k]!);
    place[k + 1] = place[k]! + size;
    if (size > 1) features.push({ place: place[k]!, size, event: k + 1 });
  }
  return { placed, place, features };
}

/**
 * On a wheel with one gap, a gap misread by a place because of jitter still stands one turn of teeth from its like:
 * it is given the size of the others.
 */
function resized({ laid, template, turn }: Found): Laid {
  const [gap] = template;
  if (template.length !== 1 || !gap) return laid;
  const { placed } = laid;
  const teeth = turn - gap.size + 1;
  const good = new Set(laid.features.filter((f) => f.size === gap.size).map((f) => f.event));
  const usual = median(Array.from(good, (event) => placed.ratio[event - 1]!))!;
  const sizes = new Map<number, number>();
  for (const { event, size } of laid.features) {
    const near = Math.abs(placed.ratio[event - 1]! / usual - 1) < 0.4;
    if (size !== gap.size && near && (good.has(event - teeth) || good.has(event + teeth)))
      sizes.set(event, gap.size);
  }
  if (sizes.size === 0) return laid;
  const place = new Int32Array(laid.place.length);
  for (let k = 1; k < place.length; k += 1) {
    place[k] = place[k - 1]! + (sizes.get(k) ?? laid.place[k]! - laid.place[k - 1]!);
  }
  const features = laid.features.map((f) => ({
    ...f,
    place: place[f.event - 1]!,
    size: sizes.get(f.event) ?? f.size,
  }));
  return { placed, place, features };
}

const nameOf = ({ turn, template }: Found) =>
  [turn, ...template.map(({ size }) => size - 1).sort((a, b) => b - a)].join('-');

interface Found {
  readonly laid: Laid;
  readonly turn: number;
  readonly template: readonly PatternGap[];
  readonly rank: number;
}

function findTurn(laid: Laid): Found | null {
  const features = laid.features.slice(0, SEARCHED_GAPS);
  const end = features.length < laid.features.length ? features.at(-1)!.place : (laid.place.at(-1) ?? 0);
  const turn = smallestTurn(features, end);
  if (turn === null) return null;
  const nearness = mean(
    mapped(laid.features.slice(0, 200), (f) =>
      Math.min(1, Math.abs(laid.placed.ratio[f.event - 1]! - f.size)),
    ),
  )!;
  if (nearness > FARTHEST * laid.placed.swing) return null;
  const template = commonTemplates(features, turn, end).find((gaps) => {
    const missing = gaps.reduce((sum, gap) => sum + gap.size - 1, 0);
    return (
      turn - missing >= FEWEST_TEETH && !nearlyShorter(gaps, turn) && isProved(features, turn, gaps, nearness)
    );
  });
  if (!template) return null;
  // More teeth that come doubled than gaps: what is missing is not what marks this wheel.
  if (laid.placed.extras.length > 2 + 1.5 * laid.features.length) return null;
  // Wheels are divided into a whole number of degrees, halves or quarters; this decides only where a gap's length is open.
  const natural = isOrdinaryDivision(turn);
  // The speed swings while the gap passes: an odd division is believed only of a gap that fits it well.
  if (!natural && nearness > FITS_WELL) return null;
  // Gaps of one size, or of two, are usual; the swing of speed makes equal gaps look different.
  const sizes = new Set(template.map(({ size }) => size)).size;
  return { laid, turn, template, rank: (natural ? 1 : 0) - nearness - UNLIKE * (sizes - 1) };
}
