import { rangeMean, rangeMedian } from '../../signal/range.ts';
import { timeAt } from '../../signal/time.ts';
import type { CoilTrace } from './firing.ts';

export interface Ring {
  /** Local extremes further than 4 × the noise from the settled level; null when the capture ends while it rings. */
  readonly count: number | null;
  /** Index at which it has died away. */
  readonly over: number;
}

const SETTLE_S = 2e-3;
/** A capture that ends sooner after the collapse says nothing about a ring. */
const SHORTEST_LOOK_S = 0.5e-3;

/**
 * Counts the half swings about the settled level after sample `from` (the collapse of the burn, or of the kick where
 * nothing burned; both come from above). A half swing counts when its extreme, averaged over a sixth of its width so that
 * noise does not lift it, is more than 4 × `noise` away; the count ends with the first that is not, or after a pause of
 * four half swings. What precedes the first passage of the settled level is the collapse itself, not an extreme.
 */
export function countRing(trace: CoilTrace, from: number, until: number, noise: number): Ring {
  const { values, axis } = trace;
  const first = Math.ceil(from);
  const settled = settledLevel(trace, first, until);
  const dead = 3 * noise;
  let side = 1;
  let began = -1;
  let count = 0;
  let width = 0;
  let i = first;
  for (; i < until && !(count > 0 && i - began > 4 * width); i += 1) {
    const distance = values[i]! - settled;
    const now = distance > dead ? 1 : distance < -dead ? -1 : 0;
    if (now === 0 || now === side) continue;
    if (began >= 0) {
      if (!isExtreme(values, began, i, settled, side, noise)) return { count, over: began };
      count += 1;
      width = i - began;
    }
    began = i;
    side = now;
  }
  if (began < 0) {
    const seenS = timeAt(axis, Math.max(first, until - 1)) - timeAt(axis, first);
    return { count: until >= values.length && seenS < SHORTEST_LOOK_S ? null : 0, over: first };
  }
  const last = isExtreme(values, began, i, settled, side, noise) ? 1 : 0;
  const cutOff = i >= values.length && last === 1 && i - began <= 2 * width;
  return { count: cutOff ? null : count + last, over: i };
}

function isExtreme(
  values: Float32Array,
  from: number,
  to: number,
  settled: number,
  side: number,
  noise: number,
): boolean {
  let top = from;
  for (let i = from; i < to; i += 1) if (side * (values[i]! - values[top]!) > 0) top = i;
  const reach = Math.min(Math.floor((to - from) / 12), 200);
  const level = rangeMean(values, Math.max(from, top - reach), Math.min(to, top + reach + 1));
  return level !== null && side * (level - settled) > 4 * noise;
}

/** Median of the last part of the stretch, where the ring is weakest. */
function settledLevel(trace: CoilTrace, from: number, until: number): number {
  const { values, axis, states } = trace;
  const lengthS = timeAt(axis, Math.max(from, until - 1)) - timeAt(axis, from);
  const share = Math.max(0.5, 1 - SETTLE_S / Math.max(lengthS, SETTLE_S));
  const nearS = Math.min(lengthS, 20e-3);
  const end = from + ((until - from) * nearS) / Math.max(lengthS, 1e-12);
  const level = rangeMedian(values, from + share * (end - from), end);
  return level !== null && Math.abs(level - states.rest) < 0.3 * (states.rest - states.on)
    ? level
    : states.rest;
}
