import { mean, median, spread } from '../../signal/statistics.ts';
import { absent, type Evidence, type IrregularTooth, type Value } from '../../value.ts';
import { type FoundWheel, stretchStarts, toothNumbers } from './train.ts';

const LOW = 0.85;
const HIGH = 1.15;
const OFF_DEGREES = 0.2;
/** In this share of the turns. */
const SHARE = 0.8;
const MOST_TURNS = 60;
/** With fewer places the speed swings too much from tooth to tooth to say where one is due. */
const FEWEST_PLACES = 20;
/** Neighbours are looked for within so many places. */
const REACH = 4;

export interface Irregular {
  readonly value: Value;
  /** How far each tooth stands off, degrees, 0 where it is not irregular; tooth 1 first. */
  readonly offDeg: readonly number[];
}

/**
 * `irregular_teeth`: teeth unlike their neighbours in at least 80 % of the turns. A tooth's height is held against the
 * mean of its neighbours', its angle against a smooth curve through its neighbours' times, so that a speed that rises
 * and falls with compression shifts nothing. The worst tooth is taken out first and its neighbours judged without it.
 * The teeth beside a gap are not held against neighbours: a pick-up's last and first swing differ there by nature.
 */
export function irregularTeeth(wheel: FoundWheel, gaps: Value): Irregular {
  const { pattern, timesS, height, halfWidth } = wheel;
  const { places, teeth } = pattern;
  const none = new Array<number>(teeth).fill(0);
  if (places === null || pattern.marks.length < 3) {
    const reason =
      places === null
        ? 'the teeth stand unevenly by design'
        : 'fewer than two complete turns to compare teeth over';
    return { value: absent('irregular_teeth', '1', reason), offDeg: none };
  }
  const number = toothNumbers(wheel);
  const starts = stretchStarts(pattern);
  const beside = new Set<number>();
  const most = Math.min(timesS.length, teeth * MOST_TURNS);
  const place = Int32Array.from({ length: most }, (_, k) => Math.round((pattern.degrees[k]! * places) / 360));
  for (let k = 1; k < most; k += 1) {
    if (!starts.has(k) && place[k]! - place[k - 1]! > 1 && isGap(number[k - 1]!, number[k]!)) {
      beside.add(number[k - 1]!);
      beside.add(number[k]!);
    }
  }

  // The teeth beside a gap that is no whole number of periods long are shifted by the sensor: no measure for others.
  const ratio = typeof gaps.value === 'number' ? [gaps.value] : ((gaps.value ?? []) as readonly number[]);
  const trusted = ratio.length > 0 && ratio.every((value) => Math.abs(value - Math.round(value)) < 0.05);
  const strange = trusted ? new Set<number>() : beside;
  // Speed swings up to four times a turn (eight cylinders) bend the curve by this share of what they bend the line.
  const curveError = Math.min(1, 8 * ((2 * Math.PI) / places) ** 2);

  const flagged = new Set<number>();
  const found: Array<IrregularTooth & { off: number }> = [];
  for (let round = 0; round < Math.max(1, teeth / 4); round += 1) {
    const worst = worstTooth();
    if (!worst) break;
    flagged.add(worst.tooth);
    found.push(worst);
  }
  found.sort((a, b) => a.tooth - b.tooth);
  const offDeg = none.slice();
  for (const { tooth, off, spacing_ratio } of found) if (spacing_ratio !== null) offDeg[tooth - 1] = off;
  const evidence: Evidence[] = [];
  for (let k = 1; k + 1 < most && evidence.length < 50; k += 1) {
    if (flagged.has(number[k]!)) {
      evidence.push({ from: (timesS[k - 1]! + timesS[k]!) / 2, to: (timesS[k]! + timesS[k + 1]!) / 2 });
    }
  }
  const list: IrregularTooth[] = found.map(({ tooth, height_ratio, spacing_ratio }) => ({
    tooth,
    height_ratio,
    spacing_ratio,
  }));
  return {
    value: {
      key: 'irregular_teeth',
      value: list,
      unit: '1',
      n: pattern.marks.length - 1,
      evidence: evidence.length > 0 ? evidence : [{ from: wheel.marksS[0]!, to: wheel.marksS.at(-1)! }],
    },
    offDeg,
  };

  function isGap(before: number, after: number): boolean {
    return after === (before % teeth) + 1;
  }

  function worstTooth(): (IrregularTooth & { off: number }) | null {
    const heights: number[][] = Array.from({ length: teeth + 1 }, () => []);
    const offsets: number[][] = Array.from({ length: teeth + 1 }, () => []);
    const doubts: number[][] = Array.from({ length: teeth + 1 }, () => []);
    for (let k = 1; k + 1 < most; k += 1) {
      const tooth = number[k]!;
      if (flagged.has(tooth) || beside.has(tooth)) continue;
      const near = neighbours(k);
      const ratio = height ? heightRatio(k, near) : null;
      if (ratio !== null) heights[tooth]!.push(ratio);
      const off = offset(k, near);
      if (off === null) continue;
      offsets[tooth]!.push(off.degrees);
      doubts[tooth]!.push(off.doubt);
    }
    const heightNoise = pooledDeviation(heights);
    const offNoise = pooledDeviation(offsets);
    // What all teeth are off by comes from the curve, from hum in step with the turn or the like, not from a tooth.
    const usualOff =
      3 * (median(offsets.filter((list) => list.length > 0).map((list) => Math.abs(mean(list)!))) ?? 0);
    const usualHeight =
      3 * (median(heights.filter((list) => list.length > 0).map((list) => Math.abs(mean(list)! - 1))) ?? 0);
    let worst: (IrregularTooth & { off: number }) | null = null;
    let badness = 1;
    for (let tooth = 1; tooth <= teeth; tooth += 1) {
      const limit = Math.max(OFF_DEGREES, usualOff) + (median(doubts[tooth]!) ?? 0);
      const ratio = consistent(heights[tooth]!, heightNoise, 1, (value) =>
        value < Math.min(LOW, 1 - usualHeight) ? -1 : value > Math.max(HIGH, 1 + usualHeight) ? 1 : 0,
      );
      const off = consistent(offsets[tooth]!, offNoise, 0, (value) =>
        value < -limit ? -1 : value > limit ? 1 : 0,
      );
      const bad = Math.max(
        ratio === null ? 0 : 1 + Math.abs(Math.log(ratio)) / 0.16,
        off === null ? 0 : 1 + Math.abs(off) / limit,
      );
      if (bad > badness) {
        badness = bad;
        worst = {
          tooth,
          height_ratio: heights[tooth]!.length > 0 ? mean(heights[tooth]!) : null,
          spacing_ratio: off === null ? null : 1 + (off * places!) / 360,
          off: off ?? 0,
        };
      }
    }
    return worst;
  }

  /** The two nearest teeth that are not flagged on either side, at most four places away. */
  function neighbours(k: number): number[] {
    const out: number[] = [];
    for (const by of [-1, 1]) {
      let taken = 0;
      for (let j = k + by; j >= 0 && j < most && taken < 2; j += by) {
        if (Math.abs(place[j]! - place[k]!) > REACH) break;
        if (flagged.has(number[j]!) || crossesBreak(j, k)) continue;
        out.push(j);
        taken += 1;
      }
    }
    return out;
  }

  function crossesBreak(a: number, b: number): boolean {
    for (let k = Math.min(a, b) + 1; k <= Math.max(a, b); k += 1) if (starts.has(k)) return true;
    return false;
  }

  /** Over the mean of its neighbours, and over a cubic through them where they lie on a bend: the one nearer to 1. */
  function heightRatio(k: number, near: readonly number[]): number | null {
    const usable = near.filter((j) => !beside.has(number[j]!) && halfWidth![j] === halfWidth![k]);
    if (!usable.some((j) => j < k) || !usable.some((j) => j > k)) return null;
    const around = mean(usable.map((j) => height![j]!));
    if (!around) return null;
    const plain = height![k]! / around;
    if (usable.length < 4) return plain;
    const bent =
      height![k]! /
      interpolated(
        usable.map((j) => place[j]! - place[k]!),
        usable.map((j) => height![j]!),
        0,
      );
    const nearer = Math.abs(bent - 1) < Math.abs(plain - 1) ? bent : plain;
    // With few teeth the two differ widely: what lies between them is no fault of the tooth.
    return places! < FEWEST_PLACES && Math.abs(bent - plain) > 0.1 ? null : nearer;
  }

  /**
   * Degrees by which tooth k comes late, against the cubic through its four neighbours' times. What the curve itself
   * may be wrong by is judged from how far it is from the straight line through the two nearest.
   */
  function offset(k: number, near: readonly number[]): { degrees: number; doubt: number } | null {
    if (places! < FEWEST_PLACES) return null;
    const usable = near.filter((j) => !strange.has(number[j]!));
    const before = usable.filter((j) => j < k);
    const after = usable.filter((j) => j > k);
    if (before.length < 2 || after.length < 2) return null;
    const x = usable.map((j) => place[j]! - place[k]!);
    const y = usable.map((j) => timesS[j]! - timesS[k]!);
    const due = interpolated(x, y, 0);
    const b = before[0]!;
    const a = after[0]!;
    const line = interpolated(
      [place[b]! - place[k]!, place[a]! - place[k]!],
      [timesS[b]! - timesS[k]!, timesS[a]! - timesS[k]!],
      0,
    );
    const perPlace = (timesS[a]! - timesS[b]!) / (place[a]! - place[b]!);
    const toDegrees = 360 / places! / perPlace;
    return { degrees: -due * toDegrees, doubt: Math.abs(line - due) * toDegrees * curveError };
  }
}

/**
 * Mean of the values when at least 80 % of them lie on one side (by `side`), at least two, and the mean is clear of
 * chance: four deviations of the mean away from `usual`. Else null.
 */
function consistent(
  values: readonly number[],
  noise: number,
  usual: number,
  side: (value: number) => number,
): number | null {
  if (values.length < 2) return null;
  let above = 0;
  let below = 0;
  for (const value of values) {
    const where = side(value);
    if (where > 0) above += 1;
    if (where < 0) below += 1;
  }
  if (Math.max(above, below) < SHARE * values.length) return null;
  const middle = mean(values)!;
  return Math.abs(middle - usual) > (4 * noise) / Math.sqrt(values.length) ? middle : null;
}

/** Deviation of a tooth from turn to turn, over all teeth. */
function pooledDeviation(lists: readonly (readonly number[])[]): number {
  let squares = 0;
  let count = 0;
  for (const list of lists) {
    const all = spread(list);
    if (!all || all.n < 2) continue;
    squares += all.sd ** 2 * (all.n - 1);
    count += all.n - 1;
  }
  return count > 0 ? Math.sqrt(squares / count) : Infinity;
}

/** Value at `at` of the polynomial through all points (Lagrange). */
function interpolated(x: readonly number[], y: readonly number[], at: number): number {
  let sum = 0;
  for (let i = 0; i < x.length; i += 1) {
    let weight = 1;
    for (let j = 0; j < x.length; j += 1) if (j !== i) weight *= (at - x[j]!) / (x[i]! - x[j]!);
    sum += weight * y[i]!;
  }
  return sum;
}
