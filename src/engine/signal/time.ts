import type { TimeAxis } from '../capture.ts';

/** Number of samples on the axis. */
export function sampleCount(axis: TimeAxis): number {
  return axis.kind === 'even' ? axis.count : axis.timesS.length;
}

/** Time of sample `index` in seconds; a fractional index lies on the straight line between its neighbours. */
export function timeAt(axis: TimeAxis, index: number): number {
  if (axis.kind === 'even') return axis.startS + index * axis.stepS;
  const below = Math.floor(index);
  const here = axis.timesS[below];
  const next = axis.timesS[below + 1];
  if (here === undefined) return Number.NaN;
  return next === undefined || index === below ? here : here + (next - here) * (index - below);
}

/** First index whose time is at or after `timeS` (0 to count). */
export function indexAtOrAfter(axis: TimeAxis, timeS: number): number {
  if (axis.kind === 'even') {
    const index = Math.ceil((timeS - axis.startS) / axis.stepS - 1e-9);
    return Math.min(Math.max(index, 0), axis.count);
  }
  let low = 0;
  let high = axis.timesS.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (axis.timesS[middle]! < timeS) low = middle + 1;
    else high = middle;
  }
  return low;
}
