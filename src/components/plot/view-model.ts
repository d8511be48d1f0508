import { createStore, type Store } from './store.ts';
import type { View } from './types.ts';
import { type Bounds, clampView } from './view.ts';

/** What a pointer on the lanes does. */
export type Tool = 'move' | 'span' | 'mark';

/** What pointers and keys move: a view on one axis, with cursor, span and tool. */
export interface ViewModel {
  readonly bounds: Bounds;
  readonly view: Store<View>;
  readonly cursorS: Store<number | null>;
  readonly span: Store<View | null>;
  readonly tool: Store<Tool>;
  show(view: View): void;
}

export function createViewModel(bounds: Bounds, initial: View | null = null): ViewModel {
  const view = createStore<View>(initial === null ? bounds.whole : clampView(initial, bounds));
  return {
    bounds,
    view,
    cursorS: createStore<number | null>(null),
    span: createStore<View | null>(null),
    tool: createStore<Tool>('move'),
    show: (next) => view.set(clampView(next, bounds)),
  };
}
