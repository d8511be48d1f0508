import type { CaptureJson } from '../../contract/areas/captures.ts';
import type { PlotModel } from '../plot/model.ts';
import { showTurn, turnInView } from '../plot/plot-keys.ts';
import type { PlotWheel, View } from '../plot/types.ts';
import { viewAround } from '../plot/view.ts';

/** The view that the address asks for; null without one or with one that makes no sense. */
export function viewFromAddress(search: string): View | null {
  const query = new URLSearchParams(search);
  const from = Number(query.get('from') ?? Number.NaN);
  const to = Number(query.get('to') ?? Number.NaN);
  return Number.isFinite(from) && Number.isFinite(to) && from < to ? { from, to } : null;
}

/** Where a capture opens: at one turn where a wheel is known (the second when there are three or more), else all of it. */
export function openingView(wheel: PlotWheel | null, narrow: boolean): View | null {
  if (wheel === null || wheel.marksS.length < 2) return null;
  const turn = wheel.marksS.length > 3 ? 1 : 0;
  const from = wheel.marksS[turn]!;
  const to = wheel.marksS[turn + 1]!;
  const length = to - from;
  return narrow
    ? { from: from - length * 0.04, to: from + length * 0.62 }
    : { from: from - length * 0.1, to: to + length * 0.1 };
}

export type Preset = 'whole' | 'turn' | 'tooth';

/** Which of the set views is shown, roughly; null in between. */
export function presetOf(view: View, whole: View, wheel: PlotWheel | null): Preset | null {
  const length = view.to - view.from;
  if (length >= (whole.to - whole.from) * 0.999) return 'whole';
  if (wheel === null || wheel.marksS.length < 2) return null;
  const turn = (wheel.marksS[wheel.marksS.length - 1]! - wheel.marksS[0]!) / (wheel.marksS.length - 1);
  if (length > turn * 0.6 && length < turn * 1.5) return 'turn';
  if (length < (turn / wheel.teethPerTurn) * 6) return 'tooth';
  return null;
}

export function showPreset(preset: Preset, model: PlotModel, wheel: PlotWheel | null): void {
  if (preset === 'whole') model.show(model.bounds.whole);
  const turn = turnInView(model, wheel);
  if (wheel === null || turn === null) return;
  if (preset === 'turn') showTurn(model, wheel, turn);
  if (preset === 'tooth') {
    const { from, to } = model.view.get();
    const middle = (from + to) / 2;
    const pitch = (wheel.marksS[turn + 1]! - wheel.marksS[turn]!) / wheel.teethPerTurn;
    model.show({ from: middle - 1.5 * pitch, to: middle + 1.5 * pitch });
  }
}

/** Brings a stretch into the view with room around it, unless it is well in view already. */
export function bringIntoView(model: PlotModel, stretch: View): void {
  const view = model.view.get();
  const length = view.to - view.from;
  const inside = stretch.from >= view.from && stretch.to <= view.to;
  const share = (stretch.to - stretch.from) / length;
  if (inside && share > 0.08 && share < 0.9) return;
  const point = stretch.to === stretch.from;
  const half = Math.min(length, (model.bounds.whole.to - model.bounds.whole.from) / 4) / 2;
  model.show(
    point ? { from: stretch.from - half, to: stretch.from + half } : viewAround(stretch, 1.2, model.bounds),
  );
}

/** How many samples lie in a stretch; null where steps are uneven and only the file could tell. */
export function samplesIn(
  capture: Pick<CaptureJson, 'samples' | 'startS' | 'durationS' | 'axis'>,
  stretch: View,
): number | null {
  if (capture.axis !== 'even' || capture.samples < 2) return null;
  const step = capture.durationS / (capture.samples - 1);
  const first = Math.max(Math.ceil((stretch.from - capture.startS) / step - 1e-6), 0);
  const last = Math.min(Math.floor((stretch.to - capture.startS) / step + 1e-6), capture.samples - 1);
  return Math.max(last - first + 1, 0);
}
