import type { View } from './types.ts';

/** Pure moves of the view. All keep it inside the whole stretch and not shorter than `least` seconds. */
export interface Bounds {
  readonly whole: View;
  readonly least: number;
}

/** Shortest view: eight samples of the mean step, so that points stay apart and doubles stay exact. */
export function boundsOf(startS: number, durationS: number, samples: number): Bounds {
  const length = durationS > 0 ? durationS : 1e-3;
  const step = samples > 1 ? length / (samples - 1) : length;
  return { whole: { from: startS, to: startS + length }, least: Math.min(length, 8 * step) };
}

export function clampView(view: View, { whole, least }: Bounds): View {
  const length = Math.min(Math.max(view.to - view.from, least), whole.to - whole.from);
  const middle = (view.from + view.to) / 2;
  const from = Math.min(Math.max(middle - length / 2, whole.from), whole.to - length);
  return { from, to: Math.min(from + length, whole.to) };
}

/** Shows `factor` times as much time (below 1 zooms in); the time `at` stays where it is. */
export function zoomAt(view: View, at: number, factor: number, bounds: Bounds): View {
  const length = view.to - view.from;
  const next = Math.min(Math.max(length * factor, bounds.least), bounds.whole.to - bounds.whole.from);
  const share = length > 0 ? (at - view.from) / length : 0.5;
  const from = at - share * next;
  return clampView({ from, to: from + next }, bounds);
}

export function panBy(view: View, seconds: number, bounds: Bounds): View {
  const { whole } = bounds;
  const shift = Math.min(Math.max(seconds, whole.from - view.from), whole.to - view.to);
  return { from: view.from + shift, to: view.to + shift };
}

/** The view in which two held times lie under two fingers at the given shares (0 to 1) of the width. */
export function pinch(
  times: readonly [number, number],
  shares: readonly [number, number],
  bounds: Bounds,
): View {
  const apart = shares[1] - shares[0];
  if (Math.abs(apart) < 1e-3 || times[0] === times[1]) {
    const middle = (times[0] + times[1]) / 2;
    return clampView({ from: middle - bounds.least / 2, to: middle + bounds.least / 2 }, bounds);
  }
  const length = (times[1] - times[0]) / apart;
  if (length <= 0) return clampView({ from: times[0], to: times[0] }, bounds);
  const from = times[0] - shares[0] * length;
  return clampView({ from, to: from + length }, bounds);
}

/** A view that shows the stretch with a share of its length free on both sides. */
export function viewAround(stretch: View, margin: number, bounds: Bounds): View {
  const length = stretch.to - stretch.from;
  return clampView({ from: stretch.from - length * margin, to: stretch.to + length * margin }, bounds);
}

export const timeAtShare = (view: View, share: number) => view.from + share * (view.to - view.from);
export const shareOfTime = (view: View, time: number) => (time - view.from) / (view.to - view.from);
export const sameView = (a: View, b: View) => a.from === b.from && a.to === b.to;
export const covers = (outer: View, inner: View, slack = 0) =>
  outer.from <= inner.from + slack && outer.to >= inner.to - slack;
