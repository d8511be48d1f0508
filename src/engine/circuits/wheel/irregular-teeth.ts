import { mean, median, spread } from '../../signal/statistics.ts';
import { absent, type Evidence, type IrregularTooth, type Value } from '../../value.ts';
import { runOutOf } from './run-out.ts';
import { type FoundWheel, stretchStarts, toothNumbers } from './train.ts';

const LOW = 0.85;
const HIGH = 1.15;
const OFF_DEGREES = 0.2;
/** In this share of the turns. */
const SHARE = 0.8;
const MOST_TURNS = 60;
/** With fewer places the speed swings too much from tooth to tooth to say where one is due. */
const FEWEST_PLACES = 20;
/** So many teeth on either side show what is usual around one. */
const AROUND = 5;
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
  if (places === null || pattern.marks.length < 3 || wheel.coarse) {
    const reason = wheel.coarse
      ? 'too few samples fall on a tooth to compare single teeth'
      : places === null
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

  const flux = height ? toothFlux(height, timesS, place, starts, most) : null;
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
    const plains: number[][] = Array.from({ length: teeth + 1 }, () => []);
    const offsets: number[][] = Array.from({ length: teeth + 1 }, () => []);
    const doubts: number[][] = Array.from({ length: teeth + 1 }, () => []);
    const round = flux
      ? runOutOf(flux, number, place, places!, teeth, (tooth) => flagged.has(tooth) || beside.has(tooth))
      : null;
    for (let k = 1; k + 1 < most; k += 1) {
      const tooth = number[k]!;
      if (flagged.has(tooth) || beside.has(tooth)) continue;
      const near = neighbours(k);
      const ratio = height ? heightRatio(k, near, round) : null;
      if (ratio !== null) {
        heights[tooth]!.push(ratio);
        plains[tooth]!.push(
          overNeighbours(
            Number.isNaN(flux![k]!) ? height! : flux!,
            k,
            near.filter((j) => !Number.isNaN(flux![j]!)),
          ) ?? 1,
        );
      }
      const off = offset(k, near);
      if (off === null) continue;
      offsets[tooth]!.push(off.degrees);
      doubts[tooth]!.push(off.doubt);
    }
    // With few teeth nothing tells a swing of speed between two of them from a tooth of another height.
    const swings = places! < FEWEST_PLACES ? speedSwings() : [];
    const heightNoise = pooledDeviation(heights);
    const offNoise = pooledDeviation(offsets);
    // What the teeth around are off by comes from the curve, from run-out, from hum in step with the turn or the like.
    const usualOff = usualAround(offsets, 0);
    const usualHeight = usualAround(plains, 1);
    let worst: (IrregularTooth & { off: number }) | null = null;
    let badness = 1;
    for (let tooth = 1; tooth <= teeth; tooth += 1) {
      const limit = Math.max(OFF_DEGREES, usualOff(tooth)) + (median(doubts[tooth]!) ?? 0);
      const low = Math.min(LOW, 1 - usualHeight(tooth)) - (swings[tooth] ?? 0);
      const high = Math.max(HIGH, 1 + usualHeight(tooth)) + (swings[tooth] ?? 0);
      const ratio = consistent(heights[tooth]!, heightNoise, 1, (value) =>
        value < low ? -1 : value > high ? 1 : 0,
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

  /** Spread of the tooth periods about each tooth, as a part of their mean, over the turns: the middle one. */
  function speedSwings(): number[] {
    const lists: number[][] = Array.from({ length: teeth + 1 }, () => []);
    for (let k = 2; k + 2 < most; k += 1) {
      if (crossesBreak(k - 2, k + 2)) continue;
      const periods = [k - 2, k - 1, k, k + 1].map(
        (j) => (timesS[j + 1]! - timesS[j]!) / (place[j + 1]! - place[j]!),
      );
      lists[number[k]!]!.push((Math.max(...periods) - Math.min(...periods)) / mean(periods)!);
    }
    return lists.map((list) => median(list) ?? 0);
  }

  /** What the single passages of the teeth around each are off by: three and a half deviations, robustly. */
  function usualAround(lists: readonly (readonly number[])[], usual: number): (tooth: number) => number {
    const off = lists.map((list) => list.map((value) => Math.abs(value - usual)));
    return (tooth) => {
      const around: number[] = [];
      for (let i = -AROUND; i <= AROUND; i += 1)
        around.push(...off[((tooth - 1 + i + 2 * teeth) % teeth) + 1]!);
      return 3.5 * 1.4826 * (median(around) ?? 0);
    };
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

  /**
   * Over the mean of its neighbours, over a cubic through them where they lie on a bend, both also with the speed taken
   * out, and over the wheel's run-out: the one nearest to 1, for only a tooth that none of these explains is irregular.
   */
  function heightRatio(
    k: number,
    near: readonly number[],
    round: ((k: number) => number | null) | null,
  ): number | null {
    const usable = near.filter((j) => !beside.has(number[j]!) && halfWidth![j] === halfWidth![k]);
    if (!usable.some((j) => j < k) || !usable.some((j) => j > k)) return null;
    const plain = overNeighbours(height!, k, usable);
    if (plain === null) return null;
    const found = [plain];
    const level = usable.every((j) => !Number.isNaN(flux![j]!)) && !Number.isNaN(flux![k]!);
    if (level) found.push(overNeighbours(flux!, k, usable) ?? plain);
    if (usable.length === 4) {
      const bent = overBend(height!, k, usable);
      // With few teeth the two differ widely: what lies between them is no fault of the tooth.
      if (places! < FEWEST_PLACES && Math.abs(bent - plain) > 0.1 && round === null) return null;
      found.push(bent);
      if (level) found.push(overBend(flux!, k, usable));
    }
    const due = round?.(k) ?? null;
    if (due !== null && level) found.push(flux![k]! / due);
    if (Math.min(...found) < 1 && Math.max(...found) > 1) return 1;
    return found.reduce((best, ratio) => (Math.abs(ratio - 1) < Math.abs(best - 1) ? ratio : best));
  }

  function overNeighbours(of: Float64Array, k: number, near: readonly number[]): number | null {
    const around = mean(near.map((j) => of[j]!));
    return around ? of[k]! / around : null;
  }

  function overBend(of: Float64Array, k: number, near: readonly number[]): number {
    return (
      of[k]! /
      interpolated(
        near.map((j) => place[j]! - place[k]!),
        near.map((j) => of[j]!),
        0,
      )
    );
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
 * chance: six deviations of the mean away from `usual`. Else null.
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
  // On the far side of a run-out a tooth has more noise than the others; two turns say little of their own.
  const own = spread(values)!.sd * (values.length < 4 ? 1.5 : 1);
  return Math.abs(middle - usual) > (6 * Math.max(noise, own)) / Math.sqrt(values.length) ? middle : null;
}

/** Height over the speed at each tooth (a pick-up's voltage is in proportion to it); NaN where that is not known. */
function toothFlux(
  height: Float64Array,
  timesS: Float64Array,
  place: Int32Array,
  starts: ReadonlySet<number>,
  most: number,
): Float64Array {
  const out = new Float64Array(most).fill(Number.NaN);
  for (let k = 1; k + 1 < most; k += 1) {
    if (starts.has(k) || starts.has(k + 1)) continue;
    out[k] = (height[k]! * (timesS[k + 1]! - timesS[k - 1]!)) / (place[k + 1]! - place[k - 1]!);
  }
  return out;
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
