import { describe, expect, it } from 'vitest';
import { createStore } from './store.ts';
import type { View } from './types.ts';
import { createViewHistory } from './view-history.ts';

function make() {
  let clock = 0;
  const view = createStore<View>({ from: 0, to: 10 });
  const history = createViewHistory(view, () => clock);
  return {
    view,
    history,
    rest: () => {
      clock += 1000;
    },
  };
}

describe('createViewHistory()', () => {
  it('goes back to where the view rested, not through every step of a drag', () => {
    const { view, history, rest } = make();
    for (let i = 1; i <= 20; i += 1) view.set({ from: i / 10, to: 10 + i / 10 });
    rest();
    view.set({ from: 5, to: 6 });
    rest();
    history.back();
    expect(view.get()).toEqual({ from: 2, to: 12 });
    history.back();
    expect(view.get()).toEqual({ from: 0, to: 10 });
    expect(history.can.get()).toEqual({ back: false, forward: true });
    history.back();
    expect(view.get()).toEqual({ from: 0, to: 10 });
  });

  it('goes forward again until the view is moved by hand', () => {
    const { view, history, rest } = make();
    view.set({ from: 1, to: 2 });
    rest();
    history.back();
    history.forward();
    expect(view.get()).toEqual({ from: 1, to: 2 });
    history.back();
    rest();
    view.set({ from: 3, to: 4 });
    expect(history.can.get()).toEqual({ back: true, forward: false });
    history.back();
    expect(view.get()).toEqual({ from: 0, to: 10 });
  });
});
