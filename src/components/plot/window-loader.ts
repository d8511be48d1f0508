import type { DecodedWindow } from './decode-window.ts';
import { type FetchWindow, WindowRefused } from './fetch-window.ts';
import { createStore, type Store } from './store.ts';
import type { View } from './types.ts';
import {
  bestWindow,
  emptyCache,
  neededRequest,
  type WindowCache,
  type WindowRequest,
  willDo,
  withOverview,
  withWindow,
} from './window-cache.ts';

/** What the drawing sees. `trouble` is a sentence while the last request failed; what is there stays. */
export interface Loaded {
  readonly cache: WindowCache;
  readonly trouble: string | null;
  /** True when asking again does not help. */
  readonly refused: boolean;
}

export interface WindowLoader {
  readonly state: Store<Loaded>;
  /** The view changed: draws from what is there, asks for what is missing, gives up what is no longer needed. */
  show(view: View, pixels: number): void;
  best(view: View, pixels: number): DecodedWindow | null;
  close(): void;
}

interface Timers {
  set(run: () => void, ms: number): ReturnType<typeof setTimeout>;
  clear(timer: ReturnType<typeof setTimeout>): void;
}
const clock: Timers = { set: (run, ms) => setTimeout(run, ms), clear: (timer) => clearTimeout(timer) };

/** Moves come faster than answers: a request waits this long for the next move. */
const SETTLE_MS = 40;
const RETRY_MS = [500, 1000, 2000, 4000, 8000];

/** One request at a time; a stale one is aborted. The overview of the whole capture comes first and is never given up. */
export function createWindowLoader(
  whole: View,
  fetchWindow: FetchWindow,
  timers: Timers = clock,
): WindowLoader {
  const state = createStore<Loaded>({ cache: emptyCache, trouble: null, refused: false });
  let running: { request: WindowRequest; abort: AbortController } | null = null;
  let overviewRunning = false;
  let timer: ReturnType<typeof setTimeout> | null = null;
  let tries = 0;
  let wanted: { view: View; pixels: number } | null = null;
  let closed = false;
  const overviewAbort = new AbortController();

  const later = (ms: number) => {
    if (timer !== null) timers.clear(timer);
    timer = timers.set(() => {
      timer = null;
      request();
    }, ms);
  };

  const failed = (error: unknown) => {
    if (closed || (error instanceof DOMException && error.name === 'AbortError')) return;
    const refused = error instanceof WindowRefused;
    const words = refused
      ? error.message
      : 'No connection to the samples. What is drawn stays; trying again.';
    state.set({ ...state.get(), trouble: words, refused });
    if (!refused) later(RETRY_MS[Math.min(tries++, RETRY_MS.length - 1)] ?? 8000);
  };

  const arrived = (cache: WindowCache) => {
    tries = 0;
    state.set({ cache, trouble: null, refused: false });
    if (wanted) later(0);
  };

  const request = () => {
    if (closed || !wanted || state.get().refused) return;
    const { cache } = state.get();
    if (cache.overview === null) {
      if (overviewRunning) return;
      overviewRunning = true;
      const columns = Math.min(Math.max(Math.round(wanted.pixels), 200), 4096);
      fetchWindow({ ...whole, columns }, overviewAbort.signal)
        .then((window) => !closed && arrived(withOverview(state.get().cache, window)), failed)
        .finally(() => {
          overviewRunning = false;
        });
      return;
    }
    const needed = neededRequest(cache, wanted.view, wanted.pixels, whole);
    if (needed === null) return;
    if (running && willDo(running.request, wanted.view, wanted.pixels)) return;
    running?.abort.abort();
    const mine = { request: needed, abort: new AbortController() };
    running = mine;
    fetchWindow(needed, mine.abort.signal).then(
      (window) => {
        if (running === mine) running = null;
        if (!closed) arrived(withWindow(state.get().cache, window));
      },
      (error) => {
        if (running === mine) running = null;
        failed(error);
      },
    );
  };

  return {
    state,
    show(view, pixels) {
      wanted = { view, pixels };
      if (state.get().cache.overview === null) request();
      else if (running && !willDo(running.request, view, pixels)) later(SETTLE_MS);
      else if (!running && timer === null) later(SETTLE_MS);
    },
    best: (view, pixels) => bestWindow(state.get().cache, view, pixels),
    close() {
      closed = true;
      overviewAbort.abort();
      running?.abort.abort();
      if (timer !== null) timers.clear(timer);
    },
  };
}
