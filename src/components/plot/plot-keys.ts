import type { PlotModel } from './model.ts';
import { stepBy } from './steps.ts';
import { panBy, zoomAt } from './view.ts';

/** Keys while the plot has focus: what `?` lists. */
export const PLOT_KEYS: readonly (readonly [keys: string, does: string])[] = [
  ['← →', 'move the view'],
  ['Shift ← →', 'move the cursor'],
  ['+ −', 'zoom at the cursor'],
  ['n p', 'next and previous turn, firing or pulse'],
  ['0', 'show all'],
  ['b f', 'back to the view before, and forward again'],
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
export function actOnKey(key: string, shift: boolean, model: PlotModel, actions: KeyActions): boolean {
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
      stepBy(model, key === 'n' ? 1 : -1);
      return true;
    case 'b':
      model.history.back();
      return true;
    case 'f':
      model.history.forward();
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

export function toggleSpan(model: PlotModel): void {
  if (model.span.get() !== null) {
    model.span.set(null);
    return;
  }
  const { from, to } = model.view.get();
  const third = (to - from) / 3;
  model.span.set({ from: from + third, to: to - third });
}
