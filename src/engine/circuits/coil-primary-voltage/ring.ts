import type { TimeAxis } from '../../capture.ts';
import { rangeMean, rangeMedian } from '../../signal/range.ts';
import { timeAt } from '../../signal/time.ts';
import type { CoilTrace } from './firing.ts';
import { type HalfSwings, halfSwings } from './half-swings.ts';

export interface Ring {
  /** Local extremes further than 4 × the noise from the settled level; null when that cannot be told. */
  readonly count: number | null;
  /** Index at which it has died away. */
  readonly over: number;
}

const SETTLE_S = 2e-3;
/** A capture that ends sooner after the collapse says nothing about a ring. */
const SHORTEST_LOOK_S = 0.5e-3;
/** Half swings about the last ones whose heights are fitted together. */
const FITTED = 7;
/** The last extreme is told from the limit when it is further from it than this many standard errors. */
const SURE = 1;
/** The noise itself is known to about this share, and the limit with it. */
const NOISE_SHARE = 0.02;

/**
 * Counts the half swings about the settled level after sample `from` (the collapse of the burn, or of the kick where nothing
 * burned; both come from above) whose extreme is more than 4 × `noise` away. Near that limit one sample says little, so the
 * height of each of the last half swings is that of a half sine fitted to all its samples, and a decay (a straight line through
 * the logarithms) is fitted through those heights; the count is where it passes the limit. Where an extreme stands at the limit
 * as closely as the fit can tell, the count is null. What precedes the first passage of the settled level is the collapse
 * itself, not an extreme.
 */
export function countRing(trace: CoilTrace, from: number, until: number, noise: number): Ring {
  const { values, axis } = trace;
  const first = Math.ceil(from);
  const settled = settledLevel(trace, first, until);
  const rough = halfSwings(values, first, until, settled, noise);
  const swings = halfSwings(values, first, until, nearLevel(values, rough, 4 * noise) ?? settled, noise);
  if (swings.edges.length < 2) {
    const seenS = timeAt(axis, Math.max(first, until - 1)) - timeAt(axis, first);
    const cut = until >= values.length && seenS < SHORTEST_LOOK_S;
    const calm = furthest(values, first, until, axis, settled) < 2.5 * noise;
    return { count: !cut && calm ? 0 : null, over: first };
  }
  const place = passesLimit(swings, 4 * noise, trace.states.step);
  const width = swings.width;
  const last = swings.edges[swings.edges.length - 1]!;
  if (place === null) return { count: null, over: Math.min(until, Math.ceil(last + width)) };
  const whole = Math.floor(place.at) + 1;
  const over = swings.edges[0]! + (whole + 1) * width;
  if (over > values.length - 1) return { count: null, over: values.length };
  const near = Math.abs(place.at - Math.round(place.at));
  return {
    count: near < SURE * place.error ? null : Math.max(0, whole),
    over: Math.min(until, Math.ceil(over)),
  };
}

/** Number (with a fraction) of the half swing whose height is `limit`, the first being 0, and its standard error; `step` of the converter. */
function passesLimit(
  { heights }: HalfSwings,
  limit: number,
  step: number,
): { at: number; error: number } | null {
  // Steps as coarse as the limit show nothing about it.
  if (limit < 2.5 * step) return null;
  // The last heights well above their own error; weights are those of a logarithm.
  const shown = heights.flatMap(({ height, error: white }, k) => {
    const error = Math.max(white, step / 2.5);
    return height > 3 * error ? [{ k, height, error }] : [];
  });
  let end = 0;
  while (end < shown.length && shown[end]!.k === end) end += 1;
  const used = shown.slice(0, end).slice(-FITTED);
  if (used.length < 3) return fewPass(heights, limit);
  let [w, wx, wy, wxx, wxy] = [0, 0, 0, 0, 0];
  for (const { k, height, error } of used) {
    // A hundredth for what the half sine and the straight line leave out.
    const weight = 1 / ((error / height) ** 2 + 1e-4);
    const y = Math.log(height / limit);
    w += weight;
    wx += weight * k;
    wy += weight * y;
    wxx += weight * k * k;
    wxy += weight * k * y;
  }
  const middle = wx / w;
  const spread = wxx - wx * middle;
  if (!(spread > 0)) return null;
  const slope = (wxy - middle * wy) / spread;
  if (!(slope < 0)) return null;
  const at = middle - (wy / w + Math.log(extremeOverHalfSine(-slope))) / slope;
  const error = Math.sqrt(1 / w + (at - middle) ** 2 / spread + NOISE_SHARE ** 2) / -slope;
  return { at, error };
}

/** Furthest that the mean of five samples goes below or above the settled level in the first millisecond after it is first passed. */
function furthest(
  values: Float32Array,
  from: number,
  until: number,
  axis: TimeAxis,
  settled: number,
): number {
  let start = from;
  while (start < until && values[start]! > settled) start += 1;
  let most = 0;
  for (let i = start; i + 5 <= until && timeAt(axis, i) - timeAt(axis, start) < 1e-3; i += 1)
    most = Math.max(most, Math.abs((rangeMean(values, i, i + 5) ?? settled) - settled));
  return most;
}

/** Too few half swings for a decay: each height by itself, if none stands so near the limit that it may be on either side. */
function fewPass(heights: HalfSwings['heights'], limit: number): { at: number; error: number } | null {
  if (heights.some(({ height, error }) => Math.abs(height - limit) < Math.max(3 * error, 0.35 * limit)))
    return null;
  const below = heights.findIndex(({ height }) => height < limit);
  return { at: (below < 0 ? heights.length : below) - 0.5, error: 0 };
}

/**
 * What the extreme of e^(−d·x) sin(πx), x from 0 to 1, is of the half sine fitted to it: the decay `d` of a half swing moves the extreme
 * forward, and the fit weighs what follows as much.
 */
function extremeOverHalfSine(d: number): number {
  const extremeAt = Math.atan(Math.PI / d) / Math.PI;
  const extreme = Math.exp(-d * extremeAt) * Math.sin(Math.PI * extremeAt);
  const fitted = -Math.expm1(-d) * (1 / d - d / (d * d + 4 * Math.PI * Math.PI));
  return extreme / fitted;
}

/**
 * Mean of whole periods just after the ring has sunk below `limit`: hum and a slow feed move the level while it rings. null where the
 * stretch does not hold two periods there.
 */
function nearLevel(values: Float32Array, { edges, heights }: HalfSwings, limit: number): number | null {
  const first = heights.findIndex(({ height }) => height < limit);
  const from = edges[first < 0 ? heights.length : first];
  const last = edges.length - 1 - ((edges.length - 1 - Math.max(first, 0)) % 2);
  const to = edges[Math.min(first + 6, last)];
  return first >= 0 && from !== undefined && to !== undefined && to - from > 3 * (edges[1]! - edges[0]!)
    ? rangeMean(values, from, to)
    : null;
}

/** Median of the last part of the stretch, where the ring is weakest. */
function settledLevel(trace: CoilTrace, from: number, until: number): number {
  const { values, axis, states } = trace;
  const lengthS = timeAt(axis, Math.max(from, until - 1)) - timeAt(axis, from);
  const share = Math.max(0.5, 1 - SETTLE_S / Math.max(lengthS, SETTLE_S));
  const nearS = Math.min(lengthS, 8e-3);
  const end = from + ((until - from) * nearS) / Math.max(lengthS, 1e-12);
  const level = rangeMedian(values, from + share * (end - from), end);
  return level !== null && Math.abs(level - states.rest) < 0.3 * (states.rest - states.on)
    ? level
    : states.rest;
}
