import type { TimeAxis } from '../capture.ts';
import { timeAt } from './time.ts';

/** A straight line through samples: value = `middle` + `slope` * (t − `middleS`). */
export interface LineFit {
  readonly slope: number;
  readonly middle: number;
  readonly middleS: number;
  /** Standard error of the slope from the samples' scatter about the line. */
  readonly slopeError: number;
}

/**
 * Least-squares line through samples `from` up to, not including, `to`; slope in units a second. Holes are skipped.
 * Fewer than three samples, or all at one time: null.
 */
export function fitLine(values: Float32Array, axis: TimeAxis, from: number, to: number): LineFit | null {
  const start = Math.max(0, Math.ceil(from));
  const end = Math.min(values.length, Math.ceil(to));
  const originS = timeAt(axis, start);
  let n = 0;
  let meanT = 0;
  let meanV = 0;
  let tt = 0;
  let tv = 0;
  let vv = 0;
  for (let i = start; i < end; i += 1) {
    const value = values[i]!;
    if (Number.isNaN(value)) continue;
    n += 1;
    const t = timeAt(axis, i) - originS;
    const dt = t - meanT;
    const dv = value - meanV;
    meanT += dt / n;
    meanV += dv / n;
    tt += dt * (t - meanT);
    tv += dt * (value - meanV);
    vv += dv * (value - meanV);
  }
  if (n < 3 || !(tt > 0)) return null;
  const slope = tv / tt;
  const scatter = Math.max(0, vv - slope * tv) / (n - 2);
  return { slope, middle: meanV, middleS: originS + meanT, slopeError: Math.sqrt(scatter / tt) };
}
