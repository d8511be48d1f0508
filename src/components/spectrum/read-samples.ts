import type { FetchWindow } from '../plot/fetch-window.ts';
import type { PlotCapture, PlotSignal, View } from '../plot/types.ts';
import { MOST_COLUMNS } from '../plot/window-cache.ts';

/** A window of so many columns holds samples when there are fewer than four a column. */
const PIECE = MOST_COLUMNS * 4 - 8;
/** More than this many samples are not transformed: the middle of the window is taken. */
export const MOST_SAMPLES = 1 << 18;

export interface Taken {
  /** In the signal's unit; NaN is a hole. */
  readonly values: Float64Array;
  readonly sampleRateHz: number;
  readonly from: number;
  readonly to: number;
  /** The window holds more samples than were taken. */
  readonly shortened: boolean;
}

/** Samples of one signal in a stretch of an even axis, whole pieces in parallel. Null where it holds none. */
export async function readSamples(
  capture: PlotCapture,
  signal: PlotSignal,
  view: View,
  fetchWindow: FetchWindow,
  abort: AbortSignal,
): Promise<Taken | null> {
  const stepS = capture.durationS / Math.max(capture.samples - 1, 1);
  const first = Math.max(Math.ceil((view.from - capture.startS) / stepS - 1e-6), 0);
  const last = Math.min(Math.floor((view.to - capture.startS) / stepS + 1e-6), capture.samples - 1);
  const inView = last - first + 1;
  if (!(stepS > 0) || inView < 1) return null;
  const count = Math.min(inView, MOST_SAMPLES);
  const start = first + ((inView - count) >> 1);
  const values = new Float64Array(count).fill(Number.NaN);
  const timeOf = (index: number) => capture.startS + index * stepS;
  const pieces: Promise<void>[] = [];
  for (let at = 0; at < count; at += PIECE) {
    const end = Math.min(at + PIECE, count);
    const stretch = { from: timeOf(start + at), to: timeOf(start + end - 1), columns: MOST_COLUMNS };
    pieces.push(
      fetchWindow(stretch, abort).then((window) => {
        const samples = window.signals.get(signal.index);
        if (window.layout !== 'samples' || samples === undefined) return;
        for (let i = 0; i < window.count; i += 1) {
          const place = Math.round((window.times[i]! - capture.startS) / stepS) - start;
          if (place >= 0 && place < count) values[place] = samples[i]! * signal.factor + signal.offset;
        }
      }),
    );
  }
  await Promise.all(pieces);
  return {
    values,
    sampleRateHz: 1 / stepS,
    from: timeOf(start),
    to: timeOf(start + count - 1),
    shortened: count < inView,
  };
}
