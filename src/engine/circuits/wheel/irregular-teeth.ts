import { mean, median } from '../../signal/statistics.ts';
import { absent, type Evidence, type IrregularTooth, type Value } from '../../value.ts';
import { type FoundWheel, stretchStarts, toothNumbers } from './train.ts';

const LOW = 0.85;
const HIGH = 1.15;
const OFF_DEGREES = 0.2;
/** In this share of the turns. */
const SHARE = 0.8;
const MOST_TURNS = 200;
/** Neighbours looked at on either side. */
const REACH = 3;

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
export function irregularTeeth(wheel: FoundWheel): Irregular {
  const { pattern, timesS, swing } = wheel;
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
    for (let k = 1; k + 1 < most; k += 1) {
      const tooth = number[k]!;
      if (flagged.has(tooth) || beside.has(tooth)) continue;
      const near = neighbours(k);
      const height = swing ? heightRatio(k, near) : null;
      if (height !== null) heights[tooth]!.push(height);
      const off = offset(k, near);
      if (off !== null) offsets[tooth]!.push(off);
    }
    const middles = offsets.map((list) => (list.length > 0 ? Math.abs(median(list)!) : Number.NaN));
    // What all teeth are off by is the curve's own error, or noise: stay clear of it.
    const limit = Math.max(OFF_DEGREES, 3 * (median(middles) ?? 0));
    let worst: (IrregularTooth & { off: number }) | null = null;
    let badness = 1;
    for (let tooth = 1; tooth <= teeth; tooth += 1) {
      const height = consistent(heights[tooth]!, (ratio) => (ratio < LOW ? -1 : ratio > HIGH ? 1 : 0));
      const off = consistent(offsets[tooth]!, (degrees) => (degrees < -limit ? -1 : degrees > limit ? 1 : 0));
      const bad = Math.max(
        height === null ? 0 : 1 + Math.abs(Math.log(height)) / 0.16,
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

  function neighbours(k: number): number[] {
    const out: number[] = [];
    for (let j = k - REACH; j <= k + REACH; j += 1) {
      if (j < 0 || j >= most || j === k) continue;
      if (flagged.has(number[j]!) || Math.abs(place[j]! - place[k]!) > REACH + 1) continue;
      if (crossesBreak(j, k)) continue;
      out.push(j);
    }
    return out;
  }

  function crossesBreak(a: number, b: number): boolean {
    for (let k = Math.min(a, b) + 1; k <= Math.max(a, b); k += 1) if (starts.has(k)) return true;
    return false;
  }

  function heightRatio(k: number, near: readonly number[]): number | null {
    const usable = near.filter((j) => !beside.has(number[j]!) && Math.abs(j - k) <= 2 && swing![j]! > 0);
    if (!usable.some((j) => j < k) && !usable.some((j) => j > k)) return null;
    const around = mean(usable.map((j) => swing![j]!));
    return around ? swing![k]! / around : null;
  }

  /** Degrees by which tooth k comes late, against a cubic (or the line, where neighbours are few) through its neighbours. */
  function offset(k: number, near: readonly number[]): number | null {
    const usable = near.filter((j) => !beside.has(number[j]!));
    const before = usable.filter((j) => j < k).length;
    const after = usable.length - before;
    if (before < 1 || after < 1 || usable.length < 4) return null;
    const x = usable.map((j) => place[j]! - place[k]!);
    const y = usable.map((j) => timesS[j]! - timesS[k]!);
    const degree = usable.length >= 5 ? 3 : 2;
    const fit = polynomial(x, y, degree);
    if (!fit || !(fit[1]! > 0)) return null;
    // The curve says when place 0 is due; fit[1] is seconds a place there.
    return ((-fit[0]! / fit[1]!) * 360) / places!;
  }
}

/** Mean of the values when at least 80 % of them lie on one side (by `side`), at least two; else null. */
function consistent(values: readonly number[], side: (value: number) => number): number | null {
  if (values.length < 2) return null;
  let above = 0;
  let below = 0;
  for (const value of values) {
    const where = side(value);
    if (where > 0) above += 1;
    if (where < 0) below += 1;
  }
  return Math.max(above, below) >= SHARE * values.length ? mean(values) : null;
}

/** Least-squares polynomial through few points, coefficients from the constant up; normal equations, Gauss with pivots. */
function polynomial(x: readonly number[], y: readonly number[], degree: number): number[] | null {
  const n = degree + 1;
  const rows = Array.from({ length: n }, (_, r) => {
    const row = Array.from({ length: n }, (_, c) => x.reduce((sum, value) => sum + value ** (r + c), 0));
    row.push(x.reduce((sum, value, i) => sum + value ** r * y[i]!, 0));
    return row;
  });
  for (let c = 0; c < n; c += 1) {
    let pivot = c;
    for (let r = c + 1; r < n; r += 1) if (Math.abs(rows[r]![c]!) > Math.abs(rows[pivot]![c]!)) pivot = r;
    [rows[c], rows[pivot]] = [rows[pivot]!, rows[c]!];
    const head = rows[c]![c]!;
    if (Math.abs(head) < 1e-12) return null;
    for (let r = 0; r < n; r += 1) {
      if (r === c) continue;
      const factor = rows[r]![c]! / head;
      for (let i = c; i <= n; i += 1) rows[r]![i]! -= factor * rows[c]![i]!;
    }
  }
  return rows.map((row, r) => row[n]! / row[r]!);
}
