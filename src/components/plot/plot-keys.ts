import { turnAt } from './degrees.ts';
import type { PlotModel } from './model.ts';
import type { PlotWheel } from './types.ts';
import { panBy, viewAround, zoomAt } from './view.ts';

/** Keys while the plot has focus: what `?` lists. */
export const PLOT_KEYS: readonly (readonly [keys: string, does: string])[] = [
  ['← →', 'move the view'],
  ['Shift ← →', 'move the cursor'],
  ['+ −', 'zoom at the cursor'],
  ['n p', 'next and previous turn'],
  ['0', 'show all'],
  ['m', 'mark at the cursor'],
  ['s', 'span: measure between two handles'],
  ['Esc', 'put cursor, span and tool away'],
  ['?', 'this list'],
];

export interface KeyActions {
  readonly mark: () => void;
  readonly help: () => void;
}

/** True when the key was taken. */
export function actOnKey(
  key: string,
  shift: boolean,
  model: PlotModel,
  wheel: PlotWheel | null,
  actions: KeyActions,
): boolean {
  const view = model.view.get();
  const span = view.to - view.from;
  const cursor = model.cursorS.get();
  const centre =
    cursor !== null && cursor > view.from && cursor < view.to ? cursor : (view.from + view.to) / 2;
  switch (key) {
    case 'ArrowLeft':
    case 'ArrowRight': {
      const sign = key === 'ArrowLeft' ? -1 : 1;
      if (shift) model.cursorS.set(Math.min(Math.max(centre + (sign * span) / 100, view.from), view.to));
      else model.show(panBy(view, (sign * span) / 10, model.bounds));
      return true;
    }
    case '+':
    case '=':
      model.show(zoomAt(view, centre, 0.6, model.bounds));
      return true;
    case '-':
    case '−':
      model.show(zoomAt(view, centre, 1 / 0.6, model.bounds));
      return true;
    case 'n':
    case 'p':
      stepTurn(model, wheel, key === 'n' ? 1 : -1);
      return true;
    case '0':
      model.show(model.bounds.whole);
      return true;
    case 's':
      toggleSpan(model);
      return true;
    case 'm':
      actions.mark();
      return true;
    case '?':
      actions.help();
      return true;
    case 'Escape':
      model.cursorS.set(null);
      model.span.set(null);
      model.tool.set('move');
      return true;
    default:
      return false;
  }
}

/** The turn whose middle is nearest the middle of the view; null without complete turns. */
export function turnInView(model: PlotModel, wheel: PlotWheel | null): number | null {
  if (wheel === null || wheel.marksS.length < 2) return null;
  const { from, to } = model.view.get();
  const middle = (from + to) / 2;
  const inside = turnAt(wheel, middle);
  if (inside !== null) return inside;
  return middle < wheel.marksS[0]! ? 0 : wheel.marksS.length - 2;
}

/** Shows one turn with a little of its neighbours. */
export function showTurn(model: PlotModel, wheel: PlotWheel, turn: number): void {
  const from = wheel.marksS[turn];
  const to = wheel.marksS[turn + 1];
  if (from !== undefined && to !== undefined) model.show(viewAround({ from, to }, 0.1, model.bounds));
}

/** Next or previous turn; without a wheel the view moves by its own length. */
export function stepTurn(model: PlotModel, wheel: PlotWheel | null, step: 1 | -1): void {
  const view = model.view.get();
  const turn = turnInView(model, wheel);
  if (wheel === null || turn === null) {
    model.show(panBy(view, step * (view.to - view.from), model.bounds));
    return;
  }
  showTurn(model, wheel, Math.min(Math.max(turn + step, 0), wheel.marksS.length - 2));
}

export function toggleSpan(model: PlotModel): void {
  if (model.span.get() !== null) {
    model.span.set(null);
    return;
  }
  const { from, to } = model.view.get();
  const third = (to - from) / 3;
  model.span.set({ from: from + third, to: to - third });
}
