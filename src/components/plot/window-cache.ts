import { columnS, type DecodedWindow } from './decode-window.ts';
import type { View } from './types.ts';
import { covers } from './view.ts';

/** A stretch to ask for, and in how many columns. */
export interface WindowRequest extends View {
  readonly columns: number;
}

export const MOST_COLUMNS = 8192;
/** How many windows are kept besides the overview of the whole capture. */
const KEPT = 10;
/** A column may be this many device pixels wide before a finer window is asked for: four points stand in each. */
const FINE_ENOUGH = 1.5;

/** Windows that were fetched, newest last, the overview apart. Values never change under one samples version. */
export interface WindowCache {
  readonly overview: DecodedWindow | null;
  readonly windows: readonly DecodedWindow[];
}

export const emptyCache: WindowCache = { overview: null, windows: [] };

export const withOverview = (cache: WindowCache, overview: DecodedWindow): WindowCache => ({
  ...cache,
  overview,
});

export const withWindow = (cache: WindowCache, window: DecodedWindow): WindowCache => ({
  ...cache,
  windows: [...cache.windows, window].slice(-KEPT),
});

/** Seconds a device pixel stands for. */
export const pixelS = (view: View, pixels: number) => (view.to - view.from) / Math.max(pixels, 1);

export function isFineEnough(window: DecodedWindow, view: View, pixels: number): boolean {
  return columnS(window) <= FINE_ENOUGH * pixelS(view, pixels);
}

/**
 * What to draw now: of the windows that cover the view, the coarsest that is fine enough (fewest points), else the finest
 * there is. Where none covers it, the overview, which always does. Null before anything came.
 */
export function bestWindow(cache: WindowCache, view: View, pixels: number): DecodedWindow | null {
  const slack = pixelS(view, pixels) / 2;
  const covering = [...cache.windows, ...(cache.overview ? [cache.overview] : [])].filter((window) =>
    covers(window, view, slack),
  );
  const fine = covering.filter((window) => isFineEnough(window, view, pixels));
  if (fine.length > 0) return fine.reduce((a, b) => (columnS(b) > columnS(a) ? b : a));
  if (covering.length > 0) return covering.reduce((a, b) => (columnS(b) < columnS(a) ? b : a));
  return cache.overview;
}

/** What to ask for so that the view is covered finely enough; null when that is there already. */
export function neededRequest(
  cache: WindowCache,
  view: View,
  pixels: number,
  whole: View,
): WindowRequest | null {
  const best = bestWindow(cache, view, pixels);
  if (best && covers(best, view, pixelS(view, pixels) / 2) && isFineEnough(best, view, pixels)) return null;
  return requestFor(view, pixels, whole);
}

/**
 * The view with half its length on either side, its ends on a grid of powers of two, so that small moves ask for nothing
 * and the same places give the same addresses.
 */
export function requestFor(view: View, pixels: number, whole: View): WindowRequest {
  const length = view.to - view.from;
  const grid = 2 ** Math.floor(Math.log2(length / 4));
  const from = Math.max(Math.floor((view.from - length / 2) / grid) * grid, whole.from);
  const to = Math.min(Math.ceil((view.to + length / 2) / grid) * grid, whole.to);
  const columns = Math.ceil((to - from) / pixelS(view, pixels));
  return { from, to, columns: Math.min(Math.max(columns, 1), MOST_COLUMNS) };
}

/** Whether the answer to `request` will do for the view. */
export function willDo(request: WindowRequest, view: View, pixels: number): boolean {
  const column = (request.to - request.from) / request.columns;
  return covers(request, view) && column <= FINE_ENOUGH * pixelS(view, pixels);
}
