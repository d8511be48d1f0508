import { quantileSorted } from '../signal/statistics.ts';
import { sampleCount, timeAt } from '../signal/time.ts';
import { align, type Found } from './align.ts';
import { turnedOver } from './allowances.ts';
import { BAND_MINIMUM } from './band.ts';
import { cycleOriginDeg } from './cycle-origin.ts';
import { overDegrees } from './over-degrees.ts';
import { overSeconds } from './over-seconds.ts';
import type { ByHand, Overlay, Side } from './types.ts';

const STEP_DEG = 0.5;
const POINTS = 1500;
/** More members than this make a band no better and cost time. */
const MOST_MEMBERS = 24;

type Cells = readonly (number | null)[];
const cells = (values: Float64Array): Cells =>
  Array.from(values, (value) => (Number.isNaN(value) ? null : value));

const swing = (side: Side): number | null => {
  const value = side.measured.find((candidate) => candidate.key === 'peak_to_peak')?.value;
  return typeof value === 'number' && value > 0 ? value : null;
};

interface Traces {
  readonly axis: Overlay['axis'];
  readonly start: number;
  readonly step: number;
  readonly here: Float64Array;
  readonly references: readonly Float64Array[];
}

/** A pick-up's voltage grows with speed: its shape is compared at one size, and one polarity. */
function sized(values: Float64Array, side: Side, like: Side): Float64Array {
  const a = swing(side);
  const b = swing(like);
  if (!side.circuit.endsWith('-vr') || a === null || b === null) return values;
  const scale = ((turnedOver(side, like) ? -1 : 1) * b) / a;
  return scale === 1 ? values : values.map((value) => value * scale);
}

function onDegrees(here: Side, references: readonly Side[], shiftDeg: number): Traces | null {
  const first = references[0]!;
  if (!here.wheel || !first.wheel) return null;
  const cam = here.circuit.startsWith('cam-');
  const spanDeg = cam ? 720 : 360;
  const originOf = (side: Side) => (cam && side.wheel ? cycleOriginDeg(side, side.wheel) : 0);
  const originHere = originOf(here);
  const originFirst = originOf(first);
  if (originHere === null || originFirst === null) return null;
  const theirs = overDegrees(first, first.wheel, originFirst - shiftDeg, spanDeg, STEP_DEG);
  const nearer = (side: Side, origin: number, shift: number) => {
    const own = overDegrees(side, side.wheel!, origin - shift, spanDeg, STEP_DEG);
    if (!cam) return own;
    // The other mark may begin the cycle when the cam slipped past one: take the origin that lies nearer.
    const other = overDegrees(side, side.wheel!, (origin === 0 ? 360 : 0) - shift, spanDeg, STEP_DEG);
    return distance(other, theirs) < distance(own, theirs) ? other : own;
  };
  const others = references.slice(1).flatMap((side) => {
    const origin = originOf(side);
    return side.wheel && origin !== null ? [sized(nearer(side, origin, shiftDeg), side, first)] : [];
  });
  return {
    axis: 'deg',
    start: 0,
    step: STEP_DEG,
    here: sized(nearer(here, originHere, 0), here, first),
    references: [theirs, ...others],
  };
}

function distance(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  let count = 0;
  for (let i = 0; i < a.length; i++) {
    const off = a[i]! - b[i]!;
    if (Number.isNaN(off)) continue;
    sum += off * off;
    count += 1;
  }
  return count === 0 ? Infinity : sum / count;
}

const firstEvent = (side: Side) =>
  side.measured.find(
    (value) => (value.key === 'dwell' || value.key === 'pulse_width') && value.value !== null,
  )?.evidence[0];

/** A stretch about the event: one and a half widths before switch-off, and as long again, at least 6 ms, after it. */
function onSeconds(here: Side, references: readonly Side[], found: Found, byHandS: number): Traces {
  const event = firstEvent(here);
  const startS = timeAt(here.axis, 0);
  const endS = timeAt(here.axis, Math.max(sampleCount(here.axis) - 1, 0));
  const widthS = event ? event.to - event.from : 0;
  const from = event ? Math.max(event.to - 1.5 * widthS, startS) : startS;
  const to = event ? Math.min(event.to + Math.max(1.5 * widthS, 0.006), endS) : endS;
  const origin = event ? event.to : startS;
  const step = (to - from) / (POINTS - 1) || 1e-6;
  const first = references[0]!;
  const shiftOf = (side: Side): number | null => {
    if (side === first) return found.shiftS ?? timeAt(side.axis, 0) - startS;
    return align(here, side).shiftS;
  };
  return {
    axis: 's',
    start: from - origin,
    step,
    here: overSeconds(here, from, step, POINTS),
    references: references.flatMap((side) => {
      const shift = shiftOf(side);
      return shift === null ? [] : [overSeconds(side, from + shift - byHandS, step, POINTS)];
    }),
  };
}

/** Lowest, middle and highest of the lists at each place; null where fewer than three have a value. */
function bandOver(lists: readonly Float64Array[]) {
  const length = lists[0]!.length;
  const low: (number | null)[] = [];
  const middle: (number | null)[] = [];
  const high: (number | null)[] = [];
  for (let i = 0; i < length; i++) {
    const there: number[] = [];
    for (const list of lists) if (!Number.isNaN(list[i]!)) there.push(list[i]!);
    there.sort((a, b) => a - b);
    const enough = there.length >= BAND_MINIMUM;
    low.push(enough ? there[0]! : null);
    middle.push(enough ? quantileSorted(there, 0.5) : null);
    high.push(enough ? there.at(-1)! : null);
  }
  return { low, middle, high };
}

/**
 * All traces on equal steps of one axis; degrees start at the reference mark. Three or more references give a band and
 * their median. Two that could not be aligned are drawn from their own beginnings. Null only when a cam has no cycle.
 */
export function overlayOf(
  here: Side,
  all: readonly Side[],
  found: Found,
  byHand: ByHand | null = null,
): Overlay | null {
  const references = all.slice(0, MOST_MEMBERS);
  const shift = (axis: ByHand['axis']) => (byHand?.axis === axis ? byHand.shift : 0);
  const traces =
    found.by === 'reference mark'
      ? onDegrees(here, references, shift('deg'))
      : onSeconds(here, references, found, shift('s'));
  if (!traces || traces.references.length === 0) return null;
  const mine = cells(traces.here);
  const band = traces.references.length >= BAND_MINIMUM ? bandOver(traces.references) : null;
  const reference = band?.middle ?? cells(traces.references[0]!);
  return {
    axis: traces.axis,
    start: traces.start,
    step: traces.step,
    here: mine,
    reference,
    low: band?.low ?? null,
    high: band?.high ?? null,
    difference: mine.map((value, i) => {
      const other = reference[i] ?? null;
      return value === null || other === null ? null : value - other;
    }),
  };
}
