import { robustDeviation, spread } from '../../signal/statistics.ts';
import { absent, type Evidence, type Value } from '../../value.ts';
import type { Pattern, PatternGap } from './pattern.ts';
import type { ToothSpeeds } from './tooth-speed.ts';

const KEY = 'compression_balance';
/** Mean slow-down must be this many deviations of the speed's own noise. */
const ABOVE_NOISE = 4;
/** The speed at an angle is taken over this part of a compression's interval. */
const WINDOW = 1 / 6;
const STEPS = 96;
/** Deviation of one cylinder's slow-down from cycle to cycle, as a share of the mean, above which nothing is said. */
const MOST_CHANGE = 0.35;
/** Places in a compression's interval, and the part of them that may lack their teeth. */
const FEWEST_PLACES = 9;
const MOST_MISSING = 0.25;
/** Standard error of one cylinder's mean slow-down, as a part of the mean of all, above which nothing is said. */
const MOST_ERROR = 0.05;
/** Differences from here on are doubted when they are those of one turn rather than of two. */
const LARGE = 0.1;
const TURN_OVER_CYCLE = 2;
/** Mean slow-down as a part of the mean speed: less is no compression. */
const LEAST_SWING = 0.01;
/** Power of the wave at the rate of compressions over that of all slower waves together. */
const LEAST_PROMINENCE = 0.8;

/**
 * Compressions as the crank feels them: in each 720 / cylinders degrees, centred on the lowest speed,
 * s = mean speed less lowest speed; the value is 100 · (s / mean(s) − 1) for each, in order from the first complete one.
 * A weak cylinder slows the crank less and is negative.
 */
export function compressionBalance(speeds: ToothSpeeds, pattern: Pattern, cylinders: number | null): Value {
  if (cylinders === null) return absent(KEY, '%', 'the number of cylinders is not known');
  const first = speeds.fromDeg[0];
  if (first === undefined) return absent(KEY, '%', 'no crank speed');
  const interval = 720 / cylinders;
  const { places, gaps } = pattern;
  // Angles of such teeth are taken from their times: a swing of speed once a turn is already in them.
  if (places === null) {
    return absent(
      KEY,
      '%',
      'the teeth stand unevenly: their spacing and a swing of speed cannot be told apart',
    );
  }
  const placesEach = (places * interval) / 360;
  if (placesEach < FEWEST_PLACES || mostMissing(gaps, places, placesEach) > MOST_MISSING * placesEach) {
    return absent(KEY, '%', 'too few teeth pass in one compression to see its lowest speed');
  }
  const stretch = longestStretch(speeds);
  const begin = speeds.fromDeg[stretch.from]!;
  const end = speeds.toDeg[stretch.to]!;
  const half = (interval * WINDOW) / 2;
  const timeAtDeg = interpolator(speeds, stretch);
  const speedAt = (deg: number) => (2 * half) / (timeAtDeg(deg + half) - timeAtDeg(deg - half)) / 6;

  const step = interval / STEPS;
  const count = Math.floor((end - begin - 2 * half) / step) + 1;
  if (count < STEPS * 2) return absent(KEY, '%', 'fewer than two compressions in the capture');
  const rpm = Float64Array.from({ length: count }, (_, i) => speedAt(begin + half + i * step));

  let real = 0;
  let imaginary = 0;
  const whole = Math.floor(count / STEPS) * STEPS;
  const mean = rpm.reduce((sum, value) => sum + value, 0) / count;
  for (let i = 0; i < whole; i += 1) {
    const angle = (2 * Math.PI * i) / STEPS;
    real += (rpm[i]! - mean) * Math.cos(angle);
    imaginary += (rpm[i]! - mean) * Math.sin(angle);
  }
  // The wave is highest at `phase`, lowest half an interval later.
  const phase = (Math.atan2(imaginary, real) / (2 * Math.PI)) * STEPS;
  const lowestAt = (((phase + STEPS / 2) % STEPS) + STEPS) % STEPS;
  const starts: number[] = [];
  for (let at = lowestAt - STEPS / 2; at + STEPS <= count - 1; at += STEPS)
    if (at >= -0.5) starts.push(Math.max(0, Math.round(at)));
  const slow = starts.map((start) => {
    const part = rpm.subarray(start, start + STEPS + 1);
    const average = part.reduce((sum, value) => sum + value, 0) / part.length;
    return { s: average - Math.min(...part), average, start };
  });
  const usual = spread(slow.map((entry) => entry.average));
  const settled = slow.findIndex((entry) => usual !== null && entry.average > 0.75 * usual.mean);
  const used = settled < 0 ? [] : slow.slice(settled);
  if (used.length < cylinders)
    return absent(KEY, '%', `fewer than ${cylinders} complete compressions in the capture`);

  const meanS = used.reduce((sum, entry) => sum + entry.s, 0) / used.length;
  const noise = speedNoise(speeds, half * 2);
  if (!(meanS > ABOVE_NOISE * noise) || meanS < LEAST_SWING * mean) {
    return absent(KEY, '%', 'the crank turns so evenly that no compression stands out of the noise');
  }
  if (!(prominence(rpm, used, cylinders) > LEAST_PROMINENCE)) {
    return absent(KEY, '%', 'the speed swings no more at the rate of compressions than it does more slowly');
  }
  const groups = Array.from({ length: cylinders }, (_, c) =>
    used.filter((_, i) => i % cylinders === c).map((e) => e.s),
  );
  const means = groups.map((group) => spread(group)!);
  const overall = means.reduce((sum, group) => sum + group.mean, 0) / cylinders;
  const cycles = Math.min(...groups.map((group) => group.length));
  const pooled = Math.sqrt(means.reduce((sum, group) => sum + group.sd ** 2, 0) / cylinders);
  if (cycles >= 2 && pooled > MOST_CHANGE * overall) {
    return absent(KEY, '%', 'the slow-downs differ more from cycle to cycle than from cylinder to cylinder');
  }
  if (pooled > MOST_ERROR * overall * Math.sqrt(cycles)) {
    return absent(KEY, '%', 'the slow-downs are too uncertain to be compared: more turns are needed');
  }
  if (repeatsEachTurn(means.map((group) => group.mean / overall))) {
    return absent(
      KEY,
      '%',
      'the differences come back every turn rather than every two: run-out of the wheel looks the same as compression',
    );
  }
  const percent = (s: number) => 100 * (s / overall - 1);
  const spanOf = (start: number): Evidence => ({
    from: timeAtDeg(begin + half + start * step),
    to: timeAtDeg(begin + half + Math.min(count - 1, start + STEPS) * step),
  });
  return {
    key: KEY,
    value: means.map((group) => percent(group.mean)),
    unit: '%',
    n: cycles,
    min: means.map((group) => percent(group.min)),
    max: means.map((group) => percent(group.max)),
    sd: means.map((group) => (100 * group.sd) / overall),
    evidence: used.slice(0, 50).map((entry) => spanOf(entry.start)),
  };
}

/** Most places without a tooth within any stretch of so many places. */
function mostMissing(gaps: readonly PatternGap[], places: number, within: number): number {
  const missing = gaps.flatMap(({ size, after }) =>
    Array.from({ length: size - 1 }, (_, i) => after + 1 + i),
  );
  return Math.max(
    0,
    ...missing.map((from) => missing.filter((place) => (place - from + places) % places < within).length),
  );
}

/** Whether opposite cylinders (360 degrees apart) are alike and neighbours are not: a wheel out of true does that too. */
function repeatsEachTurn(shares: readonly number[]): boolean {
  const half = shares.length / 2;
  if (!Number.isInteger(half) || half < 2) return false;
  const together = shares.slice(0, half).map((share, k) => (share + shares[k + half]!) / 2 - 1);
  const apart = shares.slice(0, half).map((share, k) => (share - shares[k + half]!) / 2);
  const size = (list: readonly number[]) => Math.sqrt(list.reduce((sum, x) => sum + x * x, 0));
  return Math.max(...together.map(Math.abs)) > LARGE && size(together) > TURN_OVER_CYCLE * size(apart);
}

/**
 * Power at the rate of compressions over that of the slower waves, over whole cycles of 720 degrees. One cylinder without
 * compression of four still gives more than 1. Teeth that stand off, and an engine without plugs, swing once a turn.
 */
function prominence(rpm: Float64Array, used: ReadonlyArray<{ start: number }>, cylinders: number): number {
  const from = used[0]!.start;
  const cycles = Math.floor(used.length / cylinders);
  const length = Math.min(rpm.length - from, cycles * cylinders * STEPS);
  const part = rpm.subarray(from, from + length);
  // A speed that rises or falls all through is no wave.
  const slope = (part.at(-1)! - part[0]!) / Math.max(1, length - 1);
  const power = (order: number) => {
    let real = 0;
    let imaginary = 0;
    part.forEach((value, i) => {
      const level = value - slope * i;
      const angle = (2 * Math.PI * order * i) / (cylinders * STEPS);
      real += level * Math.cos(angle);
      imaginary += level * Math.sin(angle);
    });
    return real * real + imaginary * imaginary;
  };
  let slower = 0;
  for (let order = 1; order < cylinders; order += 1) slower += power(order);
  return slower > 0 ? power(cylinders) / slower : Infinity;
}

function longestStretch(speeds: ToothSpeeds): { from: number; to: number } {
  let best = { from: 0, to: 0 };
  let from = 0;
  for (let k = 1; k <= speeds.rpm.length; k += 1) {
    if (k < speeds.rpm.length && Math.abs(speeds.fromDeg[k]! - speeds.toDeg[k - 1]!) < 1e-6) continue;
    if (speeds.toDeg[k - 1]! - speeds.fromDeg[from]! > speeds.toDeg[best.to]! - speeds.fromDeg[best.from]!) {
      best = { from, to: k - 1 };
    }
    from = k;
  }
  return best;
}

function interpolator(speeds: ToothSpeeds, stretch: { from: number; to: number }): (deg: number) => number {
  let k = stretch.from;
  return (deg) => {
    while (k > stretch.from && speeds.fromDeg[k]! > deg) k -= 1;
    while (k < stretch.to && speeds.toDeg[k]! < deg) k += 1;
    const part = (deg - speeds.fromDeg[k]!) / (speeds.toDeg[k]! - speeds.fromDeg[k]!);
    return speeds.fromS[k]! + part * (speeds.toS[k]! - speeds.fromS[k]!);
  };
}

/** Deviation of the speed over `widthDeg` that comes from jitter of single tooth events. */
function speedNoise(speeds: ToothSpeeds, widthDeg: number): number {
  const { rpm, fromDeg, toDeg } = speeds;
  const second: number[] = [];
  for (let k = 1; k + 1 < rpm.length && second.length < 5000; k += 1) {
    second.push(rpm[k - 1]! - 2 * rpm[k]! + rpm[k + 1]!);
  }
  const deviation = robustDeviation(second);
  if (deviation === null) return Infinity;
  const stepDeg = (toDeg.at(-1)! - fromDeg[0]!) / rpm.length;
  // An event's jitter speeds one step up and slows the next: √20 in the second difference of steps.
  return ((deviation / Math.sqrt(20)) * Math.SQRT2) / Math.max(1, widthDeg / stepDeg);
}
