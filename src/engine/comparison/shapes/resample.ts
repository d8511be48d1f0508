import type { Evidence } from '../../value.ts';
import { overSeconds } from '../over-seconds.ts';
import { sampleAtTime } from '../sample-at-time.ts';
import type { Side } from '../types.ts';

/** Most events that are averaged: more only costs time. */
export const MOST_EVENTS = 8;

/** Mean of the finite numbers of each of `count` equal parts; NaN where a part has none. */
export function binMeans(values: ArrayLike<number>, count: number): Float64Array {
  const means = new Float64Array(count);
  for (let bin = 0; bin < count; bin++) {
    const from = Math.round((bin * values.length) / count);
    const to = Math.max(Math.round(((bin + 1) * values.length) / count), from + 1);
    let sum = 0;
    let n = 0;
    for (let i = from; i < to; i++) {
      const value = values[i]!;
      if (Number.isNaN(value)) continue;
      sum += value;
      n += 1;
    }
    means[bin] = n > 0 ? sum / n : Number.NaN;
  }
  return means;
}

/** Lowest and highest between two places of a list, NaN left out; null when there is none. */
export function extremes(values: ArrayLike<number>, from = 0, to = values.length): [number, number] | null {
  let low = Infinity;
  let high = -Infinity;
  for (let i = from; i < to; i++) {
    const value = values[i]!;
    if (value < low) low = value;
    if (value > high) high = value;
  }
  return low <= high ? [low, high] : null;
}

/** Mean over lists of one length, NaN left out place by place. */
export function meanOf(lists: readonly Float64Array[]): Float64Array {
  const length = lists[0]?.length ?? 0;
  return Float64Array.from({ length }, (_, i) => {
    let sum = 0;
    let n = 0;
    for (const list of lists) {
      const value = list[i]!;
      if (Number.isNaN(value)) continue;
      sum += value;
      n += 1;
    }
    return n > 0 ? sum / n : Number.NaN;
  });
}

/** Events behind a width (dwell, pulse width): from switch-on to switch-off, those of positive length, at most eight. */
export function eventsOf(side: Side): readonly Evidence[] {
  const width = side.measured.find(
    (value) => (value.key === 'dwell' || value.key === 'pulse_width') && value.value !== null,
  );
  return (width?.evidence ?? []).filter(({ from, to }) => to > from).slice(0, MOST_EVENTS);
}

/**
 * Means over `count` equal steps between two times. Where a step holds several samples, their mean; else the value on the
 * straight line. NaN where no sample lies.
 */
export function meansOverSeconds(side: Side, fromS: number, toS: number, count: number): Float64Array {
  const fine = 4;
  const step = (toS - fromS) / (count * fine);
  const values = Float64Array.from({ length: count * fine }, (_, i) =>
    sampleAtTime(side, fromS + (i + 0.5) * step),
  );
  return binMeans(values, count);
}

/** The farthest sample of each of `count` steps, so that a spike between steps is not lost. */
export const peaksOverSeconds = (side: Side, fromS: number, toS: number, count: number): Float64Array => {
  const step = (toS - fromS) / count;
  return overSeconds(side, fromS + step / 2, step, count);
};

export const numberOf = (side: Side, key: string): number | null => {
  const value = side.measured.find((candidate) => candidate.key === key)?.value;
  return typeof value === 'number' && Number.isFinite(value) ? value : null;
};

/** A finished vector: holes become the mean of their neighbours' absence, 0. Null when more than a quarter are holes. */
export function finished(parts: readonly ArrayLike<number>[], length = 128): Float32Array | null {
  const vector = new Float32Array(length);
  let at = 0;
  let holes = 0;
  for (const part of parts)
    for (let i = 0; i < part.length && at < length; i++, at++) {
      const value = part[i]!;
      if (Number.isFinite(value)) vector[at] = value;
      else holes += 1;
    }
  return holes > length / 4 ? null : vector;
}
