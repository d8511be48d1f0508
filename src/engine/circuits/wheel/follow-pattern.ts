import type { Feature, Laid } from './laid.ts';
import type { Pattern, PatternGap } from './pattern.ts';
import { LEAST_MATCH } from './turn-length.ts';

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

/** Wheels with fewer teeth than this are easily misread where the shaft starts or stops. */
const FEW_TEETH = 12;

/** Of two marks less than a turn apart the one with fewer like it, turn by turn, is no mark. */
function oneATurn(features: readonly Feature[], turn: number): Feature[] {
  const support = (list: readonly Feature[]) => {
    const run = new Map<number, number>();
    const total = new Map<number, number>();
    for (const { place } of list) run.set(place, (run.get(place - turn) ?? 0) + 1);
    for (const { place } of list.slice().reverse())
      total.set(place, Math.max(run.get(place)!, total.get(place + turn) ?? 0));
    return list.map(({ place }) => total.get(place)!);
  };
  let kept = features.slice();
  for (;;) {
    const like = support(kept);
    const out = new Set<number>();
    for (let k = 1; k < kept.length; k += 1) {
      if (kept[k]!.place - kept[k - 1]!.place >= turn - 1) continue;
      if (like[k]! <= like[k - 1]!) out.add(k);
      if (like[k]! >= like[k - 1]!) out.add(k - 1);
    }
    if (out.size === 0) return kept;
    // The weakest first: what stands beside it may be right.
    const weakest = Math.min(...Array.from(out, (k) => like[k]!));
    kept = kept.filter((_, k) => !(out.has(k) && like[k] === weakest));
  }
}

export function follow(laid: Laid, turn: number, template: readonly PatternGap[]): Pattern | null {
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

  const possible = features.filter(
    (f) => f.size === referenceSize && (gaps.length === 1 || fits(f.place + f.size, gaps) >= 0.6),
  );
  const candidates = oneATurn(possible, turn);
  // Lost teeth make gaps of their own; where they are many, the wheel may be another.
  if (candidates.length < LEAST_MATCH * possible.length) return null;
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
  const teeth = turn - gaps.reduce((sum, gap) => sum + gap.size - 1, 0);
  // Of few teeth a slow start or stop makes a gap anywhere: the outer turns must have all their teeth.
  while (
    teeth <= FEW_TEETH &&
    markEvents.length > 1 &&
    chainStarts[1] !== 1 &&
    markEvents[1]! - markEvents[0]! !== teeth
  ) {
    markEvents.shift();
    markTurns.shift();
    const first = markTurns[0]!;
    for (let m = 0; m < markTurns.length; m += 1) markTurns[m]! -= first;
    for (let c = 1; c < chainStarts.length; c += 1) chainStarts[c]! -= 1;
  }
  while (
    teeth <= FEW_TEETH &&
    markEvents.length > 1 &&
    chainStarts.at(-1)! < markEvents.length - 1 &&
    markEvents.at(-1)! - markEvents.at(-2)! !== teeth
  ) {
    markEvents.pop();
    markTurns.pop();
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
