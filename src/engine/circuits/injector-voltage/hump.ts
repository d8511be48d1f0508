import type { TimeAxis } from '../../capture.ts';
import { rangeMean } from '../../signal/range.ts';
import { timeAt } from '../../signal/time.ts';

/** The small rise in the decay after the release, as the needle meets its seat. */
export interface Hump {
  readonly atS: number;
  readonly height: number;
}

const POINTS = 240;
/** Points averaged on either side; the ends, where that cannot be done evenly, are left out. */
const REACH = 3;

/**
 * A decaying voltage bends upwards everywhere (it is convex), so whatever stands above the lower convex hull of the decay
 * is not part of it. The hump is the place that stands furthest above, if that is more than nine times what noise leaves
 * after averaging (the hull runs along its lowest points), and more than 1.2 % of the height of the decay.
 *
 * @param from first sample of the decay (the clamp's end); `to` first sample after it.
 */
export function findHump(
  values: Float32Array,
  axis: TimeAxis,
  from: number,
  to: number,
  rest: number,
  noise: number,
): Hump | null {
  const size = Math.max(1, Math.ceil((to - from) / POINTS));
  const xs: number[] = [];
  const ys: number[] = [];
  for (let i = from; i + size <= to; i += size) {
    const y = rangeMean(values, i, i + size);
    if (y === null) continue;
    xs.push(timeAt(axis, i + (size - 1) / 2));
    ys.push(y);
  }
  if (xs.length < 20) return null;
  const times = xs.slice(REACH, -REACH);
  const smooth = times.map((_, k) => meanOf(ys, k, k + 2 * REACH + 1));
  const hull = lowerHull(times, smooth);
  let best = -1;
  let height = 0;
  let corner = 0;
  for (let k = 0; k < times.length; k += 1) {
    while (corner + 1 < hull.length - 1 && hull[corner + 1]! <= k) corner += 1;
    const a = hull[corner]!;
    const b = hull[corner + 1]!;
    const chord =
      smooth[a]! + ((smooth[b]! - smooth[a]!) * (times[k]! - times[a]!)) / (times[b]! - times[a]!);
    if (smooth[k]! - chord > height) {
      height = smooth[k]! - chord;
      best = k;
    }
  }
  const left = noise / Math.sqrt((2 * REACH + 1) * size);
  const enough = Math.max(9 * left, 1.5 * noise, 0.012 * (smooth[0]! - rest));
  return best > 0 && height > enough ? { atS: times[best]!, height } : null;
}

function meanOf(ys: readonly number[], from: number, to: number): number {
  let sum = 0;
  for (let k = from; k < to; k += 1) sum += ys[k]!;
  return sum / (to - from);
}

/** Indices of the lower convex hull of points with rising x (Andrew's monotone chain). */
function lowerHull(xs: readonly number[], ys: readonly number[]): number[] {
  const hull: number[] = [];
  for (let k = 0; k < xs.length; k += 1) {
    while (hull.length >= 2) {
      const a = hull[hull.length - 2]!;
      const b = hull[hull.length - 1]!;
      const turn = (xs[b]! - xs[a]!) * (ys[k]! - ys[a]!) - (ys[b]! - ys[a]!) * (xs[k]! - xs[a]!);
      if (turn > 0) break;
      hull.pop();
    }
    hull.push(k);
  }
  return hull;
}
