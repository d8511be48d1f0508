import type { DecodedWindow } from '../plot/decode-window.ts';

export interface Frame {
  readonly width: number;
  readonly top: number;
  readonly height: number;
}

const HOLE_FREE = (value: number) => Number.isFinite(value);

/** Lowest and highest recorded value of a signal in the window; null when it holds only holes. */
export function valueRange(values: Float32Array): { low: number; high: number } | null {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (const value of values) {
    if (value < low) low = value;
    if (value > high) high = value;
  }
  return low <= high ? { low, high } : null;
}

/**
 * SVG path of one signal of a window, filling the frame from lowest to highest. Four points a column keep every one-sample
 * spike; a hole breaks the line. A negative factor turns the picture over, as it does the values.
 * Empty when there is nothing to draw; a flat signal lies in the middle.
 */
export function thumbnailPath(window: DecodedWindow, signal: number, factor: number, frame: Frame): string {
  const values = window.signals.get(signal);
  if (values === undefined || values.length === 0) return '';
  const range = valueRange(values);
  if (range === null) return '';
  const span = range.high - range.low;
  const y = (value: number) => {
    const part = span === 0 ? 0.5 : (value - range.low) / span;
    return frame.top + frame.height * (factor < 0 ? part : 1 - part);
  };
  const length = window.to - window.from;
  const x = (index: number) => {
    if (window.layout === 'samples')
      return length > 0 ? ((window.times[index]! - window.from) / length) * frame.width : 0;
    return ((Math.floor(index / 4) + (index % 4) / 4 + 0.125) / window.count) * frame.width;
  };
  const holds = window.layout === 'samples' && window.holds;
  let path = '';
  let pen = false;
  let lastY = '';
  for (let index = 0; index < values.length; index++) {
    const value = values[index]!;
    if (!HOLE_FREE(value)) {
      pen = false;
      continue;
    }
    const atX = x(index).toFixed(1);
    const atY = y(value).toFixed(1);
    if (holds && pen) path += `L${atX} ${lastY}`;
    path += `${pen ? 'L' : 'M'}${atX} ${atY}`;
    pen = true;
    lastY = atY;
  }
  return path;
}
