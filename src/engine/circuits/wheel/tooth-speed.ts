import { mapped } from '../../signal/mapped.ts';
import { median, spread } from '../../signal/statistics.ts';
import { absent, type Value } from '../../value.ts';
import { type FoundWheel, stretchStarts } from './train.ts';

/** Speed from each tooth to the next: `degrees[k]` is the middle of the step, `rpm[k]` the speed over it. */
export interface ToothSpeeds {
  readonly rpm: Float64Array;
  readonly fromS: Float64Array;
  readonly toS: Float64Array;
  readonly fromDeg: Float64Array;
  readonly toDeg: Float64Array;
}

/** The gap counts as one step over its places. Steps across a break in the train are left out. */
export function toothSpeeds(wheel: FoundWheel): ToothSpeeds {
  const { degrees } = wheel.pattern;
  const starts = stretchStarts(wheel.pattern);
  const steps: number[] = [];
  for (let k = 1; k < degrees.length; k += 1) if (!starts.has(k)) steps.push(k);
  const pick = (source: ArrayLike<number>, shift: number) => mapped(steps, (k) => source[k - shift]!);
  const fromDeg = pick(degrees, 1);
  const toDeg = pick(degrees, 0);
  const fromS = pick(wheel.timesS, 1);
  const toS = pick(wheel.timesS, 0);
  // One revolution a minute is six degrees a second.
  const rpm = mapped(steps, (_, i) => (toDeg[i]! - fromDeg[i]!) / (toS[i]! - fromS[i]!) / 6);
  return { rpm, fromS, toS, fromDeg, toDeg };
}

/** `rpm_instant`: median with the slowest and the fastest step. */
export function instantSpeed(speeds: ToothSpeeds): Value {
  const ends = spread(speeds.rpm);
  const middle = median(speeds.rpm);
  if (!ends || middle === null) return absent('rpm_instant', 'rpm', 'fewer than two teeth');
  return {
    key: 'rpm_instant',
    value: middle,
    unit: 'rpm',
    n: ends.n,
    min: ends.min,
    max: ends.max,
    sd: ends.sd,
    evidence: [{ from: speeds.fromS[0]!, to: speeds.toS.at(-1)! }],
  };
}

/** `speed_ripple`: (fastest − slowest step) / mean speed in each 720 degrees from the first mark on. */
export function speedRipple(speeds: ToothSpeeds, hasMark: boolean): Value {
  if (!hasMark) return absent('speed_ripple', '%', 'no reference mark');
  const found: number[] = [];
  const evidence: Array<{ from: number; to: number }> = [];
  let k = 0;
  const last = speeds.toDeg.at(-1) ?? 0;
  for (let from = 0; from + 720 <= last + 1e-6; from += 720) {
    while (k < speeds.rpm.length && speeds.fromDeg[k]! < from - 1e-6) k += 1;
    const first = k;
    let lowest = Infinity;
    let highest = -Infinity;
    let covered = 0;
    for (; k < speeds.rpm.length && speeds.toDeg[k]! <= from + 720 + 1e-6; k += 1) {
      lowest = Math.min(lowest, speeds.rpm[k]!);
      highest = Math.max(highest, speeds.rpm[k]!);
      covered += speeds.toDeg[k]! - speeds.fromDeg[k]!;
    }
    if (covered < 719) continue;
    const span = { from: speeds.fromS[first]!, to: speeds.toS[k - 1]! };
    found.push((100 * (highest - lowest) * (span.to - span.from)) / 120);
    evidence.push(span);
  }
  const all = spread(found);
  if (!all)
    return absent('speed_ripple', '%', 'fewer than two complete turns after the first reference mark');
  return {
    key: 'speed_ripple',
    value: all.mean,
    unit: '%',
    n: all.n,
    min: all.min,
    max: all.max,
    sd: all.sd,
    evidence: [{ from: evidence[0]!.from, to: evidence.at(-1)!.to }],
  };
}
