import { median } from '../../signal/statistics.ts';
import type { Pattern, PatternGap, PatternResult } from './pattern.ts';
import { layOnPlaces, type Placed, SINGLE_MOST } from './places.ts';

/** Teeth scattered more than this about their places (deviation, in periods) are no evenly divided wheel. */
const MOST_SCATTER = 0.24;
const MOST_GAPS_A_TURN = 6;
/** Share of the gaps that must find their like one turn on. */
const LEAST_MATCH = 0.75;
/** Periods that shrink (or grow) by this much over three teeth, noise aside: the shaft comes from rest or to a stop. */
const STARTING = 1.12;
/** Fewer teeth a gap than this are few. */
const FEW_TEETH = 16;
/** With fewer gaps than this in the train, every one must find its like. */
const FEWEST_GAPS = 6;
/** Gaps at the start that fit by chance, and may be left out. */
const MOST_SKIPPED = 5;
/** Share of the train that must be followed when its ends are left out. */
const LEAST_SPAN = 0.6;
/** Two teeth a turn or fewer repeat too easily: the pattern might be there several times in a turn. */
const FEWEST_TEETH = 3;
/** With fewer gaps than this share of the intervals, the rest is an even division. */
const MOST_GAPS = 0.2;
/** The pattern is searched in this many gaps; the whole train is then followed with it. */
const SEARCHED_GAPS = 2000;

/** A gap or a tooth too many, on the place of the tooth before it. */
interface Feature {
  readonly place: number;
  readonly size: number;
  /** Kept event after the feature. */
  readonly event: number;
}

interface Laid {
  readonly placed: Placed;
  /** Place of every kept event. */
  readonly place: Int32Array;
  readonly features: readonly Feature[];
}

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
  for (const sizes of sizings(placed)) {
    const found = findTurn(laidWith(placed, sizes));
    if (found && (!best || found.rank > best.rank)) best = found;
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
  const evenly = gaps < MOST_GAPS * placed.ratio.length;
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
    // A long gap among few teeth lasts a good part of the turn, in which the speed swings: its length is open too.
    const long = middle > 2.6 && intervals < FEW_TEETH * gaps.length;
    const open = !wide && (long || Math.abs(middle - nearest) > 0.2) && other >= 2 && ways.length < 8;
    const sizes = wide ? [0] : open ? [nearest, other] : [nearest];
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

/** Whether so many places are a whole number of degrees, or of half degrees, apart. */
export const isOrdinaryDivision = (places: number) => 720 % places === 0;

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
  const template = commonTemplate(features, turn, end);
  if (!template) return null;
  const missing = template.reduce((sum, gap) => sum + gap.size - 1, 0);
  // Several gaps seen over no more than one turn could be anything: only an ordinary division is believed.
  const ordinary = isOrdinaryDivision(turn) && template.length <= 3;
  if (template.length > 1 && !ordinary && end < 2 * turn + missing) return null;
  if (template.length > 3 && (template.length > MOST_GAPS_A_TURN || end < 3 * turn)) return null;
  if (turn - missing < FEWEST_TEETH || nearlyShorter(template, turn)) return null;
  // Wheels are divided into a whole number of degrees or halves; this decides only where a gap's length is open.
  const natural = isOrdinaryDivision(turn);
  const nearness = median(
    laid.features.slice(0, 200).map((f) => Math.abs(laid.placed.ratio[f.event - 1]! - f.size)),
  )!;
  // Among few teeth the speed swings while the gap passes: an odd division is believed only of a gap that fits it well.
  if (!natural && turn < FEW_TEETH + 4 && nearness > 0.12) return null;
  return { laid, turn, template, rank: (natural ? 1 : 0) - nearness };
}

/**
 * True when gaps stand nearly, but not quite, a fixed number of places apart: one wheel with one gap, of
 * which a tooth or a gap was missed, looks so. Nothing is said then.
 */
function nearlyShorter(template: readonly PatternGap[], turn: number): boolean {
  // Two gaps of different size may well stand nearly opposite (36-2-1).
  if (template.length < 2) return false;
  if (template.length === 2 && template[0]!.size !== template[1]!.size) return false;
  const starts = template.map((gap) => gap.after);
  const steps = starts.map(
    (start, i) => (start - starts[(i + starts.length - 1) % starts.length]! + turn) % turn || turn,
  );
  const least = Math.min(...steps);
  return least >= 6 && steps.every((step) => Math.abs(step - least * Math.round(step / least)) <= 2);
}

function smallestTurn(features: readonly Feature[], end: number): number | null {
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
    const share = likenessAt(lag);
    likeness.set(lag, share);
    best = Math.max(best, share);
  }
  // Whole numbers of turns fit as well as one: the smallest of what fits nearly best.
  const fitting = Array.from(lags).filter((lag) => likeness.get(lag)! >= Math.max(LEAST_MATCH, best - 0.1));
  return fitting.length > 0 ? Math.min(...fitting) : null;

  /** Share of the gaps that find their like `lag` places away, of those that could; 0 when the lag is not to be believed. */
  function likenessAt(lag: number): number {
    const has = (place: number, size: number) => sizeAt.get(place) === size;
    const whole = matches(0, end);
    if (whole === 1) return whole;
    // At either end the shaft may have stood, or the signal been too weak: then the rest must be most of the train.
    const partnered = features.filter((f) => has(f.place + lag, f.size) || has(f.place - lag, f.size));
    for (let skipped = 0; skipped < MOST_SKIPPED && partnered.length - skipped >= 3; skipped += 1) {
      const first = partnered[skipped]!.place;
      const last = partnered.at(-1)!.place;
      if (last - first < LEAST_SPAN * end) break;
      const rest = matches(first, last + 1);
      if (rest >= LEAST_MATCH) return Math.max(rest, whole);
    }
    return whole;

    function matches(from: number, to: number): number {
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
      if (matched < 2 || (features.length < FEWEST_GAPS && missed > 0)) return 0;
      return matched / (matched + missed);
    }
  }
}

/** The commonest sequence of gaps over one turn, starting anywhere; `after` counts from the first tooth after its first gap. */
function commonTemplate(features: readonly Feature[], turn: number, end: number): PatternGap[] | null {
  const counts = new Map<string, { count: number; gaps: PatternGap[] }>();
  for (let i = 0; i < features.length; i += 1) {
    const start = features[i]!.place;
    if (start + turn > end) break;
    const gaps: Array<{ size: number; step: number }> = [];
    let j = i;
    for (; j < features.length && features[j]!.place < start + turn; j += 1) {
      const next = features[j + 1]?.place ?? Infinity;
      gaps.push({ size: features[j]!.size, step: Math.min(next, start + turn) - features[j]!.place });
    }
    const turned = smallestRotation(gaps);
    const key = turned.map((gap) => `${gap.size}/${gap.step}`).join(' ');
    const entry = counts.get(key);
    if (entry) entry.count += 1;
    else counts.set(key, { count: 1, gaps: asPlaces(turned, turn) });
  }
  let best: { count: number; gaps: PatternGap[] } | null = null;
  for (const entry of counts.values()) if (!best || entry.count > best.count) best = entry;
  return best?.gaps ?? null;
}

function smallestRotation<T extends { size: number; step: number }>(gaps: T[]): T[] {
  let best = gaps;
  const text = (list: T[]) => list.map((gap) => `${gap.size}/${gap.step}`).join(' ');
  for (let r = 1; r < gaps.length; r += 1) {
    const turned = [...gaps.slice(r), ...gaps.slice(0, r)];
    if (text(turned) < text(best)) best = turned;
  }
  return best;
}

/** Gaps in order after the tooth that follows the first of them; the first itself comes last. */
function asPlaces(gaps: Array<{ size: number; step: number }>, turn: number): PatternGap[] {
  const out: PatternGap[] = [];
  let place = gaps[0]!.step - gaps[0]!.size;
  for (const gap of gaps.slice(1)) {
    out.push({ size: gap.size, after: place });
    place += gap.step;
  }
  out.push({ size: gaps[0]!.size, after: turn - gaps[0]!.size });
  return out;
}

/** Which gap's following tooth is the reference: one of a size of its own, else one right behind another gap. */
function referenceGap(
  template: readonly PatternGap[],
  turn: number,
): { index: number; several: boolean } | null {
  if (template.length === 1) return { index: 0, several: false };
  const indexes = template.map((_, i) => i);
  const alone = indexes.filter((i) => template.filter((gap) => gap.size === template[i]!.size).length === 1);
  if (alone.length === 1) return { index: alone[0]!, several: false };
  if (alone.length > 1) return null;
  const behind = indexes.filter((i) => {
    const previous = template[(i + template.length - 1) % template.length]!;
    return (template[i]!.after - previous.after - previous.size + turn) % turn === 0;
  });
  return behind.length === 1 ? { index: behind[0]!, several: false } : null;
}

/** The template as seen from the tooth after its gap `index`. */
function turnedTo(template: readonly PatternGap[], index: number, turn: number): PatternGap[] {
  const gap = template[index]!;
  const mark = gap.after + gap.size;
  return [...template.slice(index + 1), ...template.slice(0, index + 1)].map(({ size, after }) => ({
    size,
    after: (((after - mark) % turn) + turn) % turn,
  }));
}

function follow(laid: Laid, turn: number, template: readonly PatternGap[]): Pattern | null {
  const { features, place, placed } = laid;
  const end = place.at(-1) ?? 0;
  const sizeAt = new Map(features.map((f) => [f.place, f.size]));
  const fits = (mark: number, gaps: readonly PatternGap[]) => {
    let expected = 0;
    let found = 0;
    for (const gap of gaps) {
      for (const at of [mark + gap.after, mark + gap.after - turn]) {
        if (at < 0 || at + gap.size > end) continue;
        expected += 1;
        if (sizeAt.get(at) === gap.size) found += 1;
      }
    }
    return expected > 0 ? found / expected : 0;
  };

  const reference = referenceGap(template, turn);
  let gaps = turnedTo(template, reference?.index ?? 0, turn);
  if (!reference) {
    // Several could serve: the first in time that fits.
    const turned = template.map((_, i) => turnedTo(template, i, turn));
    const first = features
      .map((f) => ({
        f,
        gaps: turned.find((g) => g.at(-1)!.size === f.size && fits(f.place + f.size, g) >= LEAST_MATCH),
      }))
      .find((entry) => entry.gaps);
    if (first?.gaps) gaps = first.gaps;
  }
  const referenceSize = gaps.at(-1)!.size;

  const candidates = features.filter(
    (f) => f.size === referenceSize && (gaps.length === 1 || fits(f.place + f.size, gaps) >= 0.6),
  );
  const marked = new Set(candidates.map((f) => f.place + f.size));
  const eventAt = (wanted: number) => {
    let low = 0;
    let high = place.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (place[middle]! < wanted) low = middle + 1;
      else high = middle;
    }
    return place[low] === wanted ? low : null;
  };

  const markEvents: number[] = [];
  const markTurns: number[] = [];
  const chainStarts: number[] = [];
  let lastPlace = 0;
  for (const candidate of candidates) {
    const here = candidate.place + candidate.size;
    if (!marked.has(here + turn) && !marked.has(here - turn)) continue;
    const distance = here - lastPlace;
    if (markEvents.length === 0) {
      markTurns.push(0);
      chainStarts.push(0);
    } else if (distance % turn === 0 && distance / turn <= 6) {
      for (let step = 1; step < distance / turn; step += 1) {
        const between = eventAt(lastPlace + step * turn);
        if (between === null) continue;
        markTurns.push(markTurns.at(-1)! + 1);
        markEvents.push(between);
      }
      const lastEventPlace = place[markEvents.at(-1)!]!;
      markTurns.push(markTurns.at(-1)! + Math.round((here - lastEventPlace) / turn));
    } else {
      chainStarts.push(markEvents.length);
      markTurns.push(markTurns.at(-1)! + 3);
    }
    markEvents.push(candidate.event);
    lastPlace = here;
  }
  if (markEvents.length < 2) return null;
  if (placed.cutBefore && place[0] === place[markEvents[0]!]! - turn) {
    // The tooth one turn before the first mark, with the gap before it already cut off as part of the start.
    markEvents.unshift(0);
    markTurns.unshift(-1);
    for (let m = 0; m < markTurns.length; m += 1) markTurns[m]! += 1;
    for (let c = 1; c < chainStarts.length; c += 1) chainStarts[c]! += 1;
  }

  const events: number[] = [];
  const degrees: number[] = [];
  const positionOf = new Int32Array(place.length);
  const stretches: number[] = [];
  const perPlace = 360 / turn;
  chainStarts.forEach((startMark, chain) => {
    const endMark = (chainStarts[chain + 1] ?? markEvents.length) - 1;
    const firstPlace = place[markEvents[startMark]!]!;
    const lastMarkPlace = place[markEvents[endMark]!]!;
    const previousEvent = events.length > 0 ? events.at(-1)! : -1;
    stretches.push(events.length);
    // Beyond its outer marks a stretch goes less than one turn: further out, a mark should have been there.
    const lowest = firstPlace - turn;
    const highest = lastMarkPlace + turn - 1;
    for (let k = Math.max(previousEvent + 1, 0); k < place.length; k += 1) {
      const at = place[k]!;
      if (at < lowest) continue;
      if (at > highest) break;
      if (chain + 1 < chainStarts.length && k >= markEvents[chainStarts[chain + 1]!]!) break;
      positionOf[k] = events.length;
      events.push(k);
      degrees.push(markTurns[startMark]! * 360 + (at - firstPlace) * perPlace);
    }
  });

  const missing = gaps.reduce((sum, gap) => sum + gap.size - 1, 0);
  const names = gaps.map((gap) => gap.size - 1).sort((a, b) => b - a);
  const marks = Int32Array.from(markEvents, (event) => positionOf[event]!);
  return {
    name: `${turn}-${names.join('-')}`,
    places: turn,
    teeth: turn - missing,
    missing,
    gaps,
    events: Int32Array.from(events, (k) => placed.kept[k]!),
    degrees: Float64Array.from(degrees),
    marks,
    turns: Int32Array.from(markTurns),
    stretches,
    markIsFirstOfSeveral: reference === null,
    doubled: doubledPlaces(laid, markEvents, markTurns, turn),
  };
}

/** Places (after the mark) where an event too many came back in at least 80 % of the turns. */
function doubledPlaces(laid: Laid, marks: number[], turns: number[], turn: number): number[] {
  const counts = new Map<number, number>();
  const total = turns.at(-1)! - turns[0]!;
  let mark = 0;
  for (const extra of laid.placed.extras) {
    while (mark + 1 < marks.length && marks[mark + 1]! < extra.before) mark += 1;
    const offset = laid.place[extra.before]! - laid.place[marks[mark]!]!;
    const place = ((offset % turn) + turn) % turn;
    counts.set(place, (counts.get(place) ?? 0) + 1);
  }
  return Array.from(counts)
    .filter(([, count]) => count >= 0.8 * total && count >= 2)
    .map(([place]) => place)
    .sort((a, b) => a - b);
}

/** 12+1: no gap, but one more tooth between two places, once a turn, always in the same place. */
function findAdded(placed: Placed): Pattern | null {
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
