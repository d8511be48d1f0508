import { degreesAt } from '../plot/degrees.ts';
import type { Steps } from '../plot/steps.ts';
import type { PlotWheel, View } from '../plot/types.ts';

/** One row: a stretch of the trace, laid so that its `origin` stands at 0 of the axis across. */
export interface TurnRow {
  /** "Turn 2", "Part", "Firing 3". */
  readonly name: string;
  /** What of it was recorded, in seconds. */
  readonly stretch: View;
  /** Degrees (unwrapped) or seconds that lie at 0 across. */
  readonly origin: number;
  /** A turn of which the capture holds only a part. */
  readonly part: 'start' | 'end' | null;
}

/** Rows and what lies across them: degrees within a turn or cycle, or seconds from each row's origin. */
export interface Rows {
  readonly axis: 'deg' | 's';
  readonly across: View;
  readonly rows: readonly TurnRow[];
}

/** Turns, or cycles of two, over degrees; with what is there of a turn before the first mark and after the last. */
export function degreeRows(wheel: PlotWheel, cycleDeg: 360 | 720): Rows | null {
  const { marksS, teethS, teethDeg } = wheel;
  const turns = marksS.length - 1;
  const step = cycleDeg / 360;
  if (turns < 1 || teethS.length < 2) return null;
  const rows: TurnRow[] = [];
  const first = teethDeg[0]!;
  if (first < -1e-6) {
    const origin = Math.floor(first / cycleDeg) * cycleDeg;
    if (origin >= -cycleDeg)
      rows.push({ name: 'Part', stretch: { from: teethS[0]!, to: marksS[0]! }, origin, part: 'start' });
  }
  let turn = 0;
  for (; turn + step <= turns; turn += step) {
    const name = step === 1 ? `Turn ${turn + 1}` : `Turns ${turn + 1}, ${turn + 2}`;
    rows.push({
      name,
      stretch: { from: marksS[turn]!, to: marksS[turn + step]! },
      origin: turn * 360,
      part: null,
    });
  }
  const lastS = teethS[teethS.length - 1]!;
  if (lastS > marksS[turn]! + 1e-9)
    rows.push({ name: 'Part', stretch: { from: marksS[turn]!, to: lastS }, origin: turn * 360, part: 'end' });
  return { axis: 'deg', across: { from: 0, to: cycleDeg }, rows };
}

/** Steps over time, each from its own origin: its switch-off where it has one, else its start. */
export function timeRows(steps: Steps): Rows | null {
  const { stretches, originsS, margin, word } = steps;
  if (stretches.length === 0) return null;
  const extra = word === 'Turn' ? 0 : margin;
  let from = 0;
  let to = 0;
  const rows = stretches.map((stretch, place) => {
    const free = (stretch.to - stretch.from) * extra;
    const origin = originsS?.[place] ?? stretch.from;
    const wide = { from: stretch.from - free, to: stretch.to + free };
    from = Math.min(from, wide.from - origin);
    to = Math.max(to, wide.to - origin);
    return { name: `${word} ${place + 1}`, stretch: wide, origin, part: null };
  });
  return { axis: 's', across: { from, to }, rows };
}

/** Where a time lies across a row; null where no angle is known. */
export function acrossAt(
  row: TurnRow,
  axis: Rows['axis'],
  wheel: PlotWheel | null,
  timeS: number,
): number | null {
  if (axis === 's') return timeS - row.origin;
  const degrees = wheel === null ? null : degreesAt(wheel, timeS);
  return degrees === null ? null : degrees - row.origin;
}
