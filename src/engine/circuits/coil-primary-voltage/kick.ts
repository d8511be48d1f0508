import { highestIn } from '../../signal/range.ts';
import { timeAt } from '../../signal/time.ts';
import type { CoilTrace, Kick } from './firing.ts';

const LONGEST_S = 1e-3;

/**
 * The kick that starts at index `off`: its highest sample before the trace falls back to the feed, at most 1 ms later and
 * before `until`. null when nothing rises above the feed by a quarter of the driver's swing.
 */
export function findKick(trace: CoilTrace, off: number, until: number, railHigh: number | null): Kick | null {
  const { values, axis, states } = trace;
  const swing = states.rest - states.on;
  const floor = states.rest + Math.max(0.25 * swing, 6 * states.noise);
  const first = Math.ceil(off);
  const limitS = timeAt(axis, off) + LONGEST_S;
  let end = first;
  let risen = false;
  while (end < until && (end <= first + 3 || timeAt(axis, end) <= limitS)) {
    const value = values[end]!;
    if (value > floor) risen = true;
    else if (risen && value < states.rest) break;
    end += 1;
  }
  const top = highestIn(values, first, end);
  if (!risen || top < 0) return null;
  const peak = values[top]!;
  const half = (peak + states.rest) / 2;
  const nearTop = peak - Math.max(0.02 * (peak - states.rest), 3 * states.noise);
  let from = top;
  while (from > first && !(values[from - 1]! < half)) from -= 1;
  let to = top;
  while (to + 1 < end && !(values[to + 1]! < half)) to += 1;
  let flatFrom = top;
  while (flatFrom > from && !(values[flatFrom - 1]! < nearTop)) flatFrom -= 1;
  let flatTo = top;
  while (flatTo < to && !(values[flatTo + 1]! < nearTop)) flatTo += 1;
  let equal = 1;
  while (top + equal < values.length && values[top + equal] === peak) equal += 1;
  const samples = to - from + 1;
  const flatSamples = flatTo - flatFrom + 1;
  return {
    peak,
    at: top,
    from,
    to,
    samples,
    flat:
      (equal >= 3 && states.noise > 0 && states.step < 0.002 * peak) ||
      (flatSamples >= 4 &&
        timeAt(axis, flatTo) - timeAt(axis, flatFrom) >= 12e-6 &&
        flatSamples >= 0.5 * samples),
    clipped:
      (railHigh !== null && peak >= railHigh - Math.max(states.noise, 1e-6 * Math.abs(railHigh))) ||
      holeIn(values, from, to + 1),
  };
}

function holeIn(values: Float32Array, from: number, to: number): boolean {
  for (let i = from; i <= to && i < values.length; i += 1) if (Number.isNaN(values[i]!)) return true;
  return false;
}
