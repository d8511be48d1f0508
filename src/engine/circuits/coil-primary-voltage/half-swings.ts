/** Half swings of a decaying ring about its settled level. */
export interface HalfSwings {
  /** Passages of the settled level, fractional indices; those past the last that could be seen follow in equal steps. */
  readonly edges: readonly number[];
  /** Samples from one passage to the next, from the last of those seen. */
  readonly width: number;
  /** Height of each half swing by a half sine fitted to it, and its standard error from the noise. */
  readonly heights: readonly { readonly height: number; readonly error: number }[];
}

/** Half swings after the last clear one that are looked at as well. */
const BEYOND = 8;
/** Passages from which the width of a half swing and its place are taken: the last that noise hardly moves. */
const FOR_WIDTH = 8;
/** Heights of this many times the noise put a passage to a few hundredths of a half swing. */
const CLEAR = 10;

/**
 * Passages of `settled` from sample `from` to `until` while the trace goes clearly (5 × `noise`) beyond it on either side in turn,
 * then equal steps on. The first passage is a falling one: the ring follows a collapse from above. None: empty lists.
 */
export function halfSwings(
  values: Float32Array,
  from: number,
  until: number,
  settled: number,
  noise: number,
): HalfSwings {
  const seen = passages(values, from, until, settled, 5 * noise);
  if (seen.length < 2) return { edges: [], width: 0, heights: [] };
  const clear = seen.slice(0, clearCount(values, seen, settled, noise));
  const line = lineThrough(clear.slice(-FOR_WIDTH));
  const width = line.step;
  const edges = [...clear];
  const origin = Math.max(0, clear.length - FOR_WIDTH);
  const most = seen.length + BEYOND;
  for (let k = clear.length; k < most; k += 1) {
    const at = line.first + line.step * (k - origin);
    if (at >= until - 1) break;
    edges.push(at);
  }
  const heights = edges
    .slice(1)
    .map((to, k) => heightOf(values, edges[k]!, to, settled, k % 2 === 0 ? -1 : 1, noise));
  return { edges, width, heights };
}

/** How many passages stand between half swings that are clear of the noise; at least two. */
function clearCount(values: Float32Array, seen: readonly number[], settled: number, noise: number): number {
  let k = 1;
  while (
    k + 1 < seen.length &&
    heightOf(values, seen[k]!, seen[k + 1]!, settled, k % 2 === 0 ? -1 : 1, noise).height > CLEAR * noise
  )
    k += 1;
  return Math.max(2, k + 1);
}

/** Least-squares line through places 0, 1, 2 …; of two or more. */
function lineThrough(places: readonly number[]): { first: number; step: number } {
  const n = places.length;
  const middle = (n - 1) / 2;
  const mean = places.reduce((sum, one) => sum + one, 0) / n;
  const step =
    places.reduce((sum, one, k) => sum + (k - middle) * (one - mean), 0) / ((n * (n * n - 1)) / 12);
  return { first: mean - step * middle, step };
}

/**
 * Where the trace passes `settled` between places beyond `reach` on one side and on the other; ends with the first side that is
 * held for four times as long as the one before.
 */
function passages(
  values: Float32Array,
  from: number,
  until: number,
  settled: number,
  reach: number,
): number[] {
  const found: number[] = [];
  let side = 1;
  let zero = -1;
  for (let i = from; i < until; i += 1) {
    const distance = values[i]! - settled;
    const before = i > 0 ? values[i - 1]! - settled : distance;
    if (side * distance < 0 && side * before >= 0) zero = i - 1 + before / (before - distance);
    const last = found[found.length - 1];
    const width = found.length > 1 ? last! - found[found.length - 2]! : Number.POSITIVE_INFINITY;
    if (last !== undefined && i - last > 4 * width) break;
    if (side * distance >= -reach) continue;
    found.push(zero < 0 ? i : zero);
    side = -side;
  }
  return found;
}

/** Least squares: height = Σ v·s / Σ s² with s the half sine; its error is noise / √Σ s². */
function heightOf(
  values: Float32Array,
  from: number,
  to: number,
  settled: number,
  side: number,
  noise: number,
) {
  let product = 0;
  let square = 0;
  for (let i = Math.ceil(from); i < to && i < values.length; i += 1) {
    const value = values[i]!;
    if (Number.isNaN(value)) continue;
    const sine = Math.sin((Math.PI * (i - from)) / (to - from));
    product += sine * (value - settled);
    square += sine * sine;
  }
  return square > 0
    ? { height: (side * product) / square, error: noise / Math.sqrt(square) }
    : { height: 0, error: Number.POSITIVE_INFINITY };
}
