import { sampleCount, timeAt } from '../../signal/time.ts';
import type { Side } from '../types.ts';
import { binMeans, finished, meanOf, meansOverSeconds, numberOf } from './resample.ts';

/**
 * Starter current: 32 numbers over the first 0.4 s from the inrush on, 96 over four compressions laid on one another, turned
 * so that the lowest hump comes first, doubled. All in the cranking mean. Without a compression rate half seconds are laid on one another. Null for a steady or too short trace.
 */
export function starterShape(side: Side): Float32Array | null {
  const startS = timeAt(side.axis, 0);
  const endS = timeAt(side.axis, sampleCount(side.axis) - 1);
  const mean = numberOf(side, 'cranking_mean') ?? steadyMean(side, startS, endS);
  if (mean === null || !(mean > 0)) return null;
  const inrushS = onsetS(side, startS, endS, mean);
  const first = meansOverSeconds(side, inrushS, inrushS + 0.4, 32).map((value) => value / mean / 2);
  const rate = numberOf(side, 'compression_rate');
  const steady = inrushS + 0.6;
  const cycles: Float64Array[] = [];
  const periodS = rate !== null && rate > 0 ? 4 / rate : 0.5;
  for (let from = steady; from + periodS <= endS && cycles.length < 8; from += periodS)
    cycles.push(meansOverSeconds(side, from, from + periodS, 96));
  if (cycles.length === 0) return null;
  const folded = meanOf(cycles).map((value) => value / mean);
  return finished([first, turned(folded).map((value) => 2 * (value - 1))]);
}

/** Without humps there is no cranking mean among the values: the mean of the last third does. */
function steadyMean(side: Side, startS: number, endS: number): number | null {
  const [last] = binMeans(meansOverSeconds(side, endS - (endS - startS) / 3, endS, 64), 1);
  return last === undefined || Number.isNaN(last) ? null : last;
}

function onsetS(side: Side, startS: number, endS: number, mean: number): number {
  const steps = 400;
  const coarse = meansOverSeconds(side, startS, endS, steps);
  const found = coarse.findIndex((value) => value > mean / 2);
  return startS + (Math.max(found, 0) * (endS - startS)) / steps;
}

/** Rotated so that the hump of the smallest peak comes first and a trough stands at the start. */
function turned(folded: Float64Array): Float64Array {
  const n = folded.length;
  const quarter = n / 4;
  const smooth = folded.map(
    (_, i) => binMeans([folded[(i + n - 1) % n]!, folded[i]!, folded[(i + 1) % n]!], 1)[0]!,
  );
  let trough = 0;
  for (let i = 0; i < quarter; i++) {
    const sum = (k: number) =>
      smooth[k % n]! +
      smooth[(k + quarter) % n]! +
      smooth[(k + 2 * quarter) % n]! +
      smooth[(k + 3 * quarter) % n]!;
    if (sum(i) < sum(trough)) trough = i;
  }
  let best = trough;
  let least = Infinity;
  for (let hump = 0; hump < 4; hump++) {
    let peak = -Infinity;
    for (let i = 0; i < quarter; i++) peak = Math.max(peak, smooth[(trough + hump * quarter + i) % n]!);
    if (peak < least) {
      least = peak;
      best = trough + hump * quarter;
    }
  }
  return folded.map((_, i) => folded[(i + best) % n]!);
}
