import type { PlotModel } from './model.ts';
import type { PlotWheel, View } from './types.ts';
import { panBy, viewAround } from './view.ts';

/** What repeats in a capture and can be gone through one after the other: turns of the wheel, firings of a coil, pulses. */
export interface Steps {
  readonly word: 'Turn' | 'Firing' | 'Pulse';
  /** In order of time. */
  readonly stretches: readonly View[];
  /** Free time on both sides of a shown step, as a share of its length. */
  readonly margin: number;
  /** The moment of each step that time is told from (a coil's switch-off); null: the capture's own time. */
  readonly originsS: readonly number[] | null;
  /** How many there are; more than `stretches` where the list of a long capture was thinned out. */
  readonly total: number;
}

/** The complete turns of a wheel; null without one. */
export function turnsOf(wheel: PlotWheel | null): Steps | null {
  if (wheel === null || wheel.marksS.length < 2) return null;
  const stretches = wheel.marksS.slice(0, -1).map((from, turn) => ({ from, to: wheel.marksS[turn + 1]! }));
  return { word: 'Turn', stretches, margin: 0.1, originsS: null, total: stretches.length };
}

/** The step that holds the middle of the view, else the nearest one; null without steps. */
export function stepInView(model: PlotModel): number | null {
  const steps = model.steps.get();
  if (steps === null || steps.stretches.length === 0) return null;
  const { from, to } = model.view.get();
  const middle = (from + to) / 2;
  let best = 0;
  let least = Number.POSITIVE_INFINITY;
  steps.stretches.forEach((stretch, place) => {
    const away = Math.max(stretch.from - middle, middle - stretch.to, 0);
    if (away < least) {
      least = away;
      best = place;
    }
  });
  return best;
}

/** Shows one step with a little of what is around it. */
export function showStep(model: PlotModel, place: number): void {
  const steps = model.steps.get();
  const stretch = steps?.stretches[place];
  if (steps !== null && stretch !== undefined) model.show(viewAround(stretch, steps.margin, model.bounds));
}

/** Next or previous step; where nothing repeats the view moves by its own length. */
export function stepBy(model: PlotModel, by: 1 | -1): void {
  const steps = model.steps.get();
  const place = stepInView(model);
  const view = model.view.get();
  if (steps === null || place === null) {
    model.show(panBy(view, by * (view.to - view.from), model.bounds));
    return;
  }
  // From between two steps the next one is that ahead, not the one after the nearest.
  const middle = (view.from + view.to) / 2;
  const here = steps.stretches[place]!;
  const between = by === 1 ? middle < here.from : middle > here.to;
  showStep(model, Math.min(Math.max(between ? place : place + by, 0), steps.stretches.length - 1));
}
