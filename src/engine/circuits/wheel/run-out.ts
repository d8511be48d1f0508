import { median } from '../../signal/statistics.ts';

/** Fewest teeth through which one wave a turn can be laid and still leave something to judge by. */
const FEWEST_ROUND = 7;

/**
 * What run-out makes of each tooth: mean and one wave a turn through the middle flux of all other teeth. Null with too
 * few teeth.
 */
export function runOutOf(
  flux: Float64Array,
  number: Int32Array,
  place: Int32Array,
  places: number,
  teeth: number,
  leftOut: (tooth: number) => boolean,
): ((k: number) => number | null) | null {
  const lists: number[][] = Array.from({ length: teeth + 1 }, () => []);
  const angle = new Float64Array(teeth + 1);
  for (let k = 0; k < flux.length; k += 1) {
    const tooth = number[k]!;
    if (tooth < 1 || Number.isNaN(flux[k]!) || leftOut(tooth)) continue;
    lists[tooth]!.push(flux[k]!);
    angle[tooth] = (2 * Math.PI * place[k]!) / places;
  }
  const points = lists.flatMap((list, tooth) => (list.length > 0 ? [{ tooth, value: median(list)! }] : []));
  if (points.length < FEWEST_ROUND + 1) return null;
  const due = new Map<number, number>();
  for (const left of points) {
    const others = points.filter((point) => point !== left);
    const wave = oneWave(
      others.map(({ tooth }) => angle[tooth]!),
      others.map(({ value }) => value),
    );
    if (wave) due.set(left.tooth, wave(angle[left.tooth]!));
  }
  return (k) => due.get(number[k]!) ?? null;
}

/** Least squares of a + b cos x + c sin x; null where the points do not settle it. */
function oneWave(x: readonly number[], y: readonly number[]): ((at: number) => number) | null {
  const rows = x.map((at) => [1, Math.cos(at), Math.sin(at)] as const);
  const m = [0, 1, 2].map((i) => [
    ...[0, 1, 2].map((j) => rows.reduce((sum, row) => sum + row[i]! * row[j]!, 0)),
    rows.reduce((sum, row, k) => sum + row[i]! * y[k]!, 0),
  ]);
  for (let i = 0; i < 3; i += 1) {
    const pivot = m[i]![i]!;
    if (!(Math.abs(pivot) > 1e-9 * x.length)) return null;
    for (let r = 0; r < 3; r += 1) {
      if (r === i) continue;
      const share = m[r]![i]! / pivot;
      for (let c = i; c < 4; c += 1) m[r]![c]! -= share * m[i]![c]!;
    }
  }
  const [a, b, c] = m.map((row, i) => row[3]! / row[i]!) as [number, number, number];
  return (at) => a + b * Math.cos(at) + c * Math.sin(at);
}
