import type { TimeAxis } from '../../capture.ts';
import { fullestLevel, within } from '../../signal/fullest-level.ts';
import { sortedRange } from '../../signal/range.ts';
import { quantisationStep, readingNoise } from '../../signal/resolution.ts';
import { quantileSorted, robustDeviation } from '../../signal/statistics.ts';
import { timeAt } from '../../signal/time.ts';

/** Amperes with the clamp's zero taken off and a reversed clamp turned round. */
export interface CurrentTrace {
  readonly amperes: Float32Array;
  readonly axis: TimeAxis;
  /** What the clamp showed without current, as measured. */
  readonly zero: number;
  readonly reversed: boolean;
  readonly noise: number;
  /** Step of the converter; 0 where none is seen. */
  readonly step: number;
  /** Highest level that five samples in a row reach: spikes do not count. */
  readonly top: number;
}

const FALL_S = 30e-6;

/**
 * A coil's current climbs slowly and drops fast, so the steeper direction tells which way up the clamp was. The zero is
 * the fullest level in the half of the trace that the current drops to. All holes, or one value: null.
 */
export function currentTrace(values: Float32Array, axis: TimeAxis): CurrentTrace | null {
  const sorted = sortedRange(values, 0, values.length, 65_536);
  if (sorted.length < 8) return null;
  const noise = readingNoise(values);
  const lowest = sorted[0]!;
  const highest = sorted[sorted.length - 1]!;
  const reversed = isReversed(
    values,
    axis,
    fullestLevel(sorted, lowest, highest, noise).level,
    lowest,
    highest,
  );
  const middle = (lowest + highest) / 2;
  const full = fullestLevel(sorted, reversed ? middle : lowest, reversed ? highest : middle, noise).level;
  const sign = reversed ? -1 : 1;
  const zero = quietLevel(sorted, full, sign, Math.max(8 * noise, 0.04 * (highest - lowest)));
  const amperes = values.map((value) => sign * (value - zero));
  const quiet = sortedRange(amperes, 0, amperes.length, 65_536);
  const about = quiet.filter((value) => Math.abs(value) < Math.max(8 * noise, 0.03 * (highest - lowest)));
  return {
    amperes,
    axis,
    zero,
    reversed,
    noise: Math.max(noise, robustDeviation(about) ?? 0),
    step: quantisationStep(values),
    top: sustainedTop(amperes),
  };
}

/**
 * Median of the samples within `reach` of the fullest level: hum has its modes at its ends, not in its middle. Where the foot of the
 * rises holds more than a tenth of what is there, the fullest level itself.
 */
function quietLevel(sorted: Float32Array, full: number, sign: number, reach: number): number {
  const about = within(sorted, full - reach, full + reach);
  const beyond =
    sign > 0
      ? within(sorted, full + reach, full + 3 * reach)
      : within(sorted, full - 3 * reach, full - reach);
  return about.length > 0 && beyond.length <= 0.1 * about.length ? quantileSorted(about, 0.5) : full;
}

function isReversed(
  values: Float32Array,
  axis: TimeAxis,
  fullest: number,
  lowest: number,
  highest: number,
): boolean {
  const stepS =
    values.length > 1 ? (timeAt(axis, values.length - 1) - timeAt(axis, 0)) / (values.length - 1) : 1;
  const apart = Math.max(1, Math.min(Math.round(FALL_S / stepS), values.length >> 3));
  let rise = 0;
  let fall = 0;
  for (let i = apart; i < values.length; i += 1) {
    const change = values[i]! - values[i - apart]!;
    if (change > rise) rise = change;
    else if (-change > fall) fall = -change;
  }
  if (fall > 1.4 * rise) return false;
  if (rise > 1.4 * fall) return true;
  return fullest > (lowest + highest) / 2 && Math.abs(lowest) > Math.abs(highest);
}

function sustainedTop(amperes: Float32Array): number {
  const width = Math.min(5, Math.max(1, amperes.length >> 4));
  let top = 0;
  for (let i = width - 1; i < amperes.length; i += 1) {
    let least = amperes[i]!;
    for (let k = 1; k < width; k += 1) least = Math.min(least, amperes[i - k]!);
    if (least > top) top = least;
  }
  return top;
}
