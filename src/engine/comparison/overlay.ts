import { sampleCount, timeAt } from '../signal/time.ts';
import { cycleOriginDeg } from './cycle-origin.ts';
import { overDegrees } from './over-degrees.ts';
import { overSeconds } from './over-seconds.ts';
import type { Alignment, Overlay, Side } from './types.ts';

const STEP_DEG = 0.5;
const POINTS = 1500;
const cells = (values: Float64Array) => Array.from(values, (value) => (Number.isNaN(value) ? null : value));

/** A two-wire swing turned over is drawn the right way round for the shape; the polarity row says it. */
function turnedOver(here: Side, reference: Side): boolean {
  const polarity = (side: Side) => side.measured.find((value) => value.key === 'polarity')?.value ?? null;
  const a = polarity(here);
  const b = polarity(reference);
  return a !== null && b !== null && a !== b;
}

const swing = (side: Side): number | null => {
  const value = side.measured.find((candidate) => candidate.key === 'peak_to_peak')?.value;
  return typeof value === 'number' && value > 0 ? value : null;
};

function onDegrees(here: Side, reference: Side): Overlay | null {
  if (!here.wheel || !reference.wheel) return null;
  const cam = here.circuit.startsWith('cam-');
  const spanDeg = cam ? 720 : 360;
  const originHere = cam ? cycleOriginDeg(here, here.wheel) : 0;
  const originReference = cam ? cycleOriginDeg(reference, reference.wheel) : 0;
  if (originHere === null || originReference === null) return null;
  let mine = overDegrees(here, here.wheel, originHere, spanDeg, STEP_DEG);
  const theirs = overDegrees(reference, reference.wheel, originReference, spanDeg, STEP_DEG);
  if (cam) {
    // The other mark may begin the cycle when the cam slipped past one: take the origin that lies nearer.
    const other = overDegrees(here, here.wheel, originHere === 0 ? 360 : 0, spanDeg, STEP_DEG);
    if (distance(other, theirs) < distance(mine, theirs)) mine = other;
  }
  // A pick-up's voltage grows with speed: its shape is compared at one size.
  const a = swing(here);
  const b = swing(reference);
  if (here.circuit.endsWith('-vr') && a !== null && b !== null) {
    const scale = ((turnedOver(here, reference) ? -1 : 1) * b) / a;
    mine = mine.map((value) => value * scale);
  }
  return {
    axis: 'deg',
    start: 0,
    step: STEP_DEG,
    here: cells(mine),
    reference: cells(theirs),
    low: null,
    high: null,
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
function onSeconds(here: Side, reference: Side, shiftS: number): Overlay {
  const event = firstEvent(here);
  const startS = timeAt(here.axis, 0);
  const endS = timeAt(here.axis, Math.max(sampleCount(here.axis) - 1, 0));
  const widthS = event ? event.to - event.from : 0;
  const from = event ? Math.max(event.to - 1.5 * widthS, startS) : startS;
  const to = event ? Math.min(event.to + Math.max(1.5 * widthS, 0.006), endS) : endS;
  const origin = event ? event.to : startS;
  const step = (to - from) / (POINTS - 1) || 1e-6;
  return {
    axis: 's',
    start: from - origin,
    step,
    here: cells(overSeconds(here, from, step, POINTS)),
    reference: cells(overSeconds(reference, from + shiftS, step, POINTS)),
    low: null,
    high: null,
  };
}

/** Both traces on equal steps of one axis; null when they could not be aligned. Degrees start at the reference mark. */
export function overlayOf(here: Side, reference: Side, alignment: Alignment): Overlay | null {
  if (alignment.shiftS === null) return null;
  if (alignment.by === 'reference mark') return onDegrees(here, reference);
  return onSeconds(here, reference, alignment.shiftS);
}
