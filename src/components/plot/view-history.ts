import { createStore, type Store } from './store.ts';
import type { View } from './types.ts';
import { sameView } from './view.ts';

/** Views that were rested in, to go back to and forward again. */
export interface ViewHistory {
  readonly can: Store<{ readonly back: boolean; readonly forward: boolean }>;
  back(): void;
  forward(): void;
}

/** Moves closer together than this are one move. */
const REST_MS = 600;
const MOST = 100;

/** Notes where a view rested before it moved on; going back changes nothing that is noted. */
export function createViewHistory(
  view: Store<View>,
  now: () => number = () => performance.now(),
): ViewHistory {
  let past: View[] = [];
  let ahead: View[] = [];
  let last = view.get();
  let rested = last;
  let movedAt = Number.NEGATIVE_INFINITY;
  let going = false;
  const can = createStore({ back: false, forward: false });
  const tell = () => can.set({ back: past.length > 0, forward: ahead.length > 0 });

  view.subscribe(() => {
    const next = view.get();
    if (!going && !sameView(next, last)) {
      if (now() - movedAt > REST_MS) {
        rested = last;
        past = [...past, rested].slice(-MOST);
      }
      ahead = [];
      movedAt = now();
      tell();
    }
    last = next;
  });
  const go = (from: View[], to: View[]) => {
    const target = from.pop();
    if (target === undefined) return;
    to.push(view.get());
    going = true;
    view.set(target);
    going = false;
    movedAt = Number.NEGATIVE_INFINITY;
    tell();
  };
  return { can, back: () => go(past, ahead), forward: () => go(ahead, past) };
}
