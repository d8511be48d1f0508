import { noiseDeviation } from './statistics.ts';

/**
 * How finely a trace can be read: its white noise, but not less than its quantisation noise (step / √12), in the signal's
 * unit. An 8-bit trace often shows no noise at all between two of its steps, and still knows no better; where it flickers
 * between two neighbouring steps, second differences overstate the noise, which is then below 0.45 of a step.
 * 0 for a trace of one value or of fewer than three samples.
 */
export function readingNoise(values: Float32Array): number {
  const step = quantisationStep(values);
  const white = noiseDeviation(values) ?? 0;
  return white > 0.75 * step ? white : Math.max(step / Math.sqrt(12), Math.min(white, 0.45 * step));
}

/**
 * Smallest step between neighbouring samples that differ, where equal neighbours are common enough for it to be the
 * converter's. A step above an eighth of the span says nothing about the converter (a square wave has no other): 0.
 */
export function quantisationStep(values: Float32Array): number {
  const every = Math.max(1, Math.floor(values.length / 50_000));
  let smallest = Number.POSITIVE_INFINITY;
  let equal = 0;
  let looked = 0;
  let lowest = Number.POSITIVE_INFINITY;
  let highest = Number.NEGATIVE_INFINITY;
  for (let i = 1; i < values.length; i += every) {
    const difference = Math.abs(values[i]! - values[i - 1]!);
    if (Number.isNaN(difference)) continue;
    looked += 1;
    lowest = Math.min(lowest, values[i]!);
    highest = Math.max(highest, values[i]!);
    if (difference === 0) equal += 1;
    else if (difference < smallest) smallest = difference;
  }
  return equal > 0.05 * looked && smallest <= (highest - lowest) / 8 ? smallest : 0;
}
