import { degreesAt, lastAtOrBefore, timeAtDegrees, turnSpeedRpm } from './degrees.ts';
import type { PlotWheel, View } from './types.ts';

/** Everything the scale above the lanes shows, in pixels from the left of the lanes. */
export interface DegreeScale {
  /** Alternate fields of the bar; the bar is broken at the gap. */
  readonly fields: readonly { readonly from: number; readonly to: number; readonly dark: boolean }[];
  readonly degrees: readonly { readonly at: number; readonly text: string; readonly reference: boolean }[];
  readonly teeth: readonly number[];
  readonly toothNumbers: readonly { readonly at: number; readonly tooth: number }[];
  readonly marks: readonly { readonly at: number; readonly timeS: number }[];
  readonly turns: readonly {
    readonly from: number;
    readonly to: number;
    readonly turn: number;
    readonly rpm: number;
  }[];
}

const DEGREE_STEPS = [0.1, 0.2, 0.5, 1, 2, 5, 10, 30, 60, 90, 180, 360];
const FIELD_STEPS = [1, 5, 10, 30, 90, 180, 360];
/** Numbers thin out when they would stand closer than this. */
const APART = 40;

/** Null where the view shows no tooth event pair: then the scale stays in seconds. */
export function degreeScale(wheel: PlotWheel, view: View, widthPx: number): DegreeScale | null {
  const { teethS, teethDeg, marksS } = wheel;
  if (teethS.length < 2 || widthPx <= 0) return null;
  const from = Math.max(view.from, teethS[0]!);
  const to = Math.min(view.to, teethS[teethS.length - 1]!);
  const first = degreesAt(wheel, from);
  const last = degreesAt(wheel, to);
  if (first === null || last === null || last <= first) return null;

  const pixelsPerS = widthPx / (view.to - view.from);
  const px = (timeS: number) => (timeS - view.from) * pixelsPerS;
  const at = (degrees: number) => px(timeAtDegrees(wheel, degrees) ?? from);
  const pixelsPerDegree = (px(to) - px(from)) / (last - first);

  const visible = { low: lastAtOrBefore(teethS, from), high: lastAtOrBefore(teethS, to) + 1 };
  const gaps = gapsBetween(wheel, Math.max(visible.low, 0), Math.min(visible.high, teethS.length - 1));
  const fieldStep = FIELD_STEPS.find((step) => step >= 30 && step * pixelsPerDegree >= 7) ?? 360;
  const finerField = FIELD_STEPS.find((step) => step * pixelsPerDegree >= 60) ?? 360;
  const degreeStep = DEGREE_STEPS.find((step) => step * pixelsPerDegree >= APART + 6) ?? null;

  const markIndex = new Set(marksS.map((mark) => lastAtOrBefore(teethS, mark + 1e-9)));
  return {
    fields: fieldsBetween(first, last, Math.min(fieldStep, finerField), gaps, at),
    degrees: degreeStep === null ? [] : labels(first, last, degreeStep, at),
    ...teethBetween(wheel, visible, markIndex, pixelsPerDegree, px, teethDeg, widthPx),
    marks: marksS
      .filter((mark) => mark >= view.from && mark <= view.to)
      .map((mark) => ({ at: px(mark), timeS: mark })),
    turns: marksS.slice(0, -1).flatMap((mark, turn) => {
      const next = marksS[turn + 1]!;
      const rpm = turnSpeedRpm(wheel, turn);
      if (rpm === null || next <= view.from || mark >= view.to) return [];
      return [{ from: Math.max(px(mark), 0), to: Math.min(px(next), widthPx), turn, rpm }];
    }),
  };
}

/** Stretches (in degrees) without teeth: longer than one and a half places. */
function gapsBetween({ teethDeg, places }: PlotWheel, low: number, high: number): View[] {
  if (places === null) return [];
  const gaps: View[] = [];
  for (let i = low; i < high; i += 1) {
    const from = teethDeg[i]!;
    const to = teethDeg[i + 1]!;
    if (to - from > (1.5 * 360) / places) gaps.push({ from, to });
  }
  return gaps;
}

function fieldsBetween(
  first: number,
  last: number,
  step: number,
  gaps: readonly View[],
  at: (degrees: number) => number,
) {
  const fields: { from: number; to: number; dark: boolean }[] = [];
  for (let i = Math.floor(first / step); i * step < last && fields.length < 400; i += 1) {
    const dark = ((i % 2) + 2) % 2 === 0;
    let from = Math.max(i * step, first);
    const to = Math.min((i + 1) * step, last);
    for (const gap of gaps) {
      if (gap.to <= from || gap.from >= to) continue;
      if (gap.from > from) fields.push({ from: at(from), to: at(gap.from), dark });
      from = Math.max(from, gap.to);
    }
    if (to > from) fields.push({ from: at(from), to: at(to), dark });
  }
  return fields;
}

function labels(first: number, last: number, step: number, at: (degrees: number) => number) {
  const found: { at: number; text: string; reference: boolean }[] = [];
  const digits = step < 1 ? 1 : 0;
  for (let i = Math.ceil(first / step - 1e-6); i * step <= last + 1e-6 && found.length < 200; i += 1) {
    const degrees = Math.min(Math.max(i * step, first), last);
    const inTurn = (((i * step) % 360) + 360) % 360;
    found.push({ at: at(degrees), text: `${inTurn.toFixed(digits)}°`, reference: inTurn < 1e-6 });
  }
  return found;
}

function teethBetween(
  wheel: PlotWheel,
  visible: { low: number; high: number },
  markIndex: ReadonlySet<number>,
  pixelsPerDegree: number,
  px: (timeS: number) => number,
  teethDeg: readonly number[],
  widthPx: number,
) {
  const teeth: number[] = [];
  const toothNumbers: { at: number; tooth: number }[] = [];
  const pitchPx = (360 / Math.max(wheel.teethPerTurn, 1)) * pixelsPerDegree;
  const every = [1, 2, 5, 10, 20, 30].find((step) => step * pitchPx >= APART * 0.75) ?? null;
  let sinceMark: number | null = null;
  const start = Math.max(visible.low, 0);
  for (let i = start; i >= 0 && i > start - 2 * wheel.teethPerTurn - 2; i -= 1) {
    if (markIndex.has(i)) {
      sinceMark = start - i;
      break;
    }
  }
  // Before the first mark: counted backwards from it, by its angle's turn.
  if (sinceMark === null) {
    const firstMark = [...markIndex].sort((a, b) => a - b)[0];
    if (firstMark !== undefined && firstMark > start) sinceMark = wheel.teethPerTurn - (firstMark - start);
  }
  for (let i = start; i <= Math.min(visible.high, teethDeg.length - 1); i += 1) {
    if (markIndex.has(i)) sinceMark = 0;
    const at = px(wheel.teethS[i]!);
    const inside = at > -0.5 && at < widthPx + 0.5;
    if (pitchPx >= 3 && inside) teeth.push(at);
    if (sinceMark !== null && sinceMark >= 0) {
      const tooth = sinceMark + 1;
      const shown = every !== null && (tooth === 1 || tooth % every === 0);
      if (shown && inside) toothNumbers.push({ at, tooth });
      sinceMark += 1;
    }
  }
  return { teeth, toothNumbers };
}
