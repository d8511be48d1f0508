import type { CaptureJson } from '../../contract/areas/captures.ts';
import type { PlotModel } from '../plot/model.ts';
import { type Steps, showStep, stepInView } from '../plot/steps.ts';
import type { View } from '../plot/types.ts';
import { viewAround } from '../plot/view.ts';

/** Where a capture opens: at one step where something repeats (the second when there are several), else all of it. */
export function openingView(steps: Steps | null, narrow: boolean): View | null {
  if (steps === null) return null;
  const stretch = steps.stretches[steps.stretches.length > 2 ? 1 : 0];
  if (stretch === undefined) return null;
  const length = stretch.to - stretch.from;
  // A phone shows the first two thirds of a turn: its teeth would touch.
  const to =
    narrow && steps.word === 'Turn' ? stretch.from + length * 0.62 : stretch.to + length * steps.margin;
  return { from: stretch.from - length * (narrow ? 0.04 : steps.margin), to };
}

export type Preset = 'whole' | 'step' | 'tooth';

/** Which of the set views is shown, roughly; null in between. */
export function presetOf(
  view: View,
  whole: View,
  steps: Steps | null,
  teethPerTurn: number | null,
): Preset | null {
  const length = view.to - view.from;
  if (length >= (whole.to - whole.from) * 0.999) return 'whole';
  if (steps === null || steps.stretches.length === 0) return null;
  const step = steps.stretches.reduce((sum, { from, to }) => sum + to - from, 0) / steps.stretches.length;
  if (length > step * 0.6 && length < step * (1.4 + 2 * steps.margin)) return 'step';
  if (teethPerTurn !== null && length < (step / teethPerTurn) * 6) return 'tooth';
  return null;
}

export function showPreset(preset: Preset, model: PlotModel, teethPerTurn: number | null): void {
  if (preset === 'whole') model.show(model.bounds.whole);
  const step = stepInView(model);
  const stretch = step === null ? undefined : model.steps.get()?.stretches[step];
  if (step === null || stretch === undefined) return;
  if (preset === 'step') showStep(model, step);
  if (preset === 'tooth' && teethPerTurn !== null) {
    const { from, to } = model.view.get();
    const middle = (from + to) / 2;
    const pitch = (stretch.to - stretch.from) / teethPerTurn;
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
