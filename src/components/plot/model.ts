import type { FetchWindow } from './fetch-window.ts';
import type { Steps } from './steps.ts';
import { createStore, type Store } from './store.ts';
import type { PlotCapture, View } from './types.ts';
import { boundsOf } from './view.ts';
import { createViewHistory, type ViewHistory } from './view-history.ts';
import { createViewModel, type ViewModel } from './view-model.ts';
import { createWindowLoader, type WindowLoader } from './window-loader.ts';

/**
 * One plot's state outside React: the view, the cursor, the span, the samples. Pieces watch what they draw, so a moved
 * cursor redraws no trace and a moved view renders nothing but the plot.
 */
export interface PlotModel extends ViewModel {
  readonly capture: PlotCapture;
  /** Width of the lanes in CSS pixels; 0 before they were laid out. */
  readonly widthPx: Store<number>;
  readonly loader: WindowLoader;
  readonly fetchWindow: FetchWindow;
  /** What n and p go through; null where nothing repeats. */
  readonly steps: Store<Steps | null>;
  readonly history: ViewHistory;
  devicePixels(): number;
  close(): void;
}

/** More device pixels than this a CSS pixel are not worth their bytes. */
const MOST_RATIO = 2;

export function createPlotModel(
  capture: PlotCapture,
  fetchWindow: FetchWindow,
  initial: View | null,
): PlotModel {
  const bounds = boundsOf(capture.startS, capture.durationS, capture.samples);
  const viewModel = createViewModel(bounds, initial);
  const { view } = viewModel;
  const widthPx = createStore(0);
  const loader = createWindowLoader(bounds.whole, fetchWindow);
  const devicePixels = () =>
    Math.round(widthPx.get() * Math.min(globalThis.devicePixelRatio || 1, MOST_RATIO));
  const ask = () => {
    if (widthPx.get() > 0) loader.show(view.get(), devicePixels());
  };
  view.subscribe(ask);
  widthPx.subscribe(ask);
  return {
    ...viewModel,
    steps: createStore<Steps | null>(null),
    history: createViewHistory(view),
    fetchWindow,
    capture,
    widthPx,
    loader,
    devicePixels,
    close: () => loader.close(),
  };
}
