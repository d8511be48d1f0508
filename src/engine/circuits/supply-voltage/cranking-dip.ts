import { type EvenMeans, movingMean } from '../../signal/even-means.ts';
import { spectrum, strongestIn } from '../../signal/spectrum.ts';
import { median } from '../../signal/statistics.ts';

/** Where cranking is in a supply trace: indices into the means, `to` is one past the last. */
export interface CrankingDip {
  /** First step of the dip; null when the trace is already in it at its start. */
  readonly start: number | null;
  /** First step of the plateau, after the dip of the inrush. */
  readonly plateau: number;
  readonly to: number;
}

/** A starter pulls the supply down by at least this within 30 ms. Common practice, no source. */
const LEAST_DROP_V = 0.7;
const LEAST_SHARE = 0.05;
const DROP_S = 0.03;
/** Compressions make the plateau wave at this rate and by at least this much. Common practice, no source. */
const RIPPLE_HZ = [1.5, 40] as const;
const LEAST_RIPPLE_V = 0.06;

/** The time the starter pulls on the supply; null when nothing does. */
export function findCrankingDip(means: EvenMeans): CrankingDip | null {
  const { values, stepS } = means;
  const apart = Math.max(1, Math.round(DROP_S / stepS));
  let start = -1;
  let drop = 0;
  for (let i = 0; i + apart < values.length; i += 1) {
    const fall = values[i]! - values[i + apart]!;
    if (fall > drop) {
      drop = fall;
      start = i;
    }
  }
  const high = quantileOf(values, 0.99);
  if (start < 0 || drop < Math.max(LEAST_DROP_V, LEAST_SHARE * high))
    return ripples(means) ? { start: null, plateau: 0, to: values.length } : null;
  const rest = median(values.subarray(0, start + 1)) ?? values[start]!;
  let first = start;
  while (first < values.length && values[first]! > rest - 0.15 * drop) first += 1;
  const rough = median(values.subarray(first)) ?? rest;
  const back = (rest + Math.min(rough, rest - 0.5 * drop)) / 2;
  const calm = movingMean(values, 0.06 / stepS);
  let to = Math.min(values.length, first + Math.round(0.1 / stepS));
  while (to < values.length && calm[to]! < back) to += 1;
  const level = median(values.subarray(first, to)) ?? back;
  let plateau = first;
  let least = first;
  for (let i = first; i < Math.min(to, first + Math.round(0.5 / stepS)); i += 1)
    if (values[i]! < values[least]!) least = i;
  plateau = least;
  while (plateau < to && values[plateau]! < level - 0.1 * (rest - level)) plateau += 1;
  return { start: first >= 2 ? first : null, plateau, to };
}

function ripples({ values, stepS }: EvenMeans): boolean {
  const found = spectrum(values, { sampleRateHz: 1 / stepS, padding: 4 });
  const peak =
    found &&
    strongestIn(
      found,
      Math.max(RIPPLE_HZ[0], 2 / (values.length * stepS)),
      Math.min(RIPPLE_HZ[1], 0.4 / stepS),
    );
  return peak !== null && peak.amplitude > LEAST_RIPPLE_V && peak.prominence > 8;
}

function quantileOf(values: Float64Array, q: number): number {
  const sorted = Float64Array.from(values).sort();
  return sorted[Math.floor(q * (sorted.length - 1))] ?? 0;
}
