import { digitsFor, fixed } from '../plot/format.ts';
import { multiples, niceStep } from '../plot/ticks.ts';
import type { TimeScale } from '../plot/time-scale.ts';
import type { View } from '../plot/types.ts';

const APART = 64;

/** Alternate fields with a number at each step: hertz, or orders when `unit` is the frequency of order 1. */
export function frequencyScale(view: View, widthPx: number, unit = 1): TimeScale {
  const from = view.from / unit;
  const to = view.to / unit;
  const pixels = widthPx / (to - from);
  const least = niceStep(APART / pixels);
  const step = unit === 1 ? least : Math.max(least, 0.5);
  const px = (at: number) => (at - from) * pixels;
  const fields = multiples(Math.floor(from / step) * step, to, step)
    .map((at) => ({
      from: Math.max(px(at), 0),
      to: Math.min(px(at + step), widthPx),
      dark: Math.abs(Math.round(at / step)) % 2 === 0,
    }))
    .filter((field) => field.to > field.from);
  return {
    fields,
    labels: multiples(from, to, step).map((at) => ({ at: px(at), text: fixed(at, digitsFor(step)) })),
    ticks: multiples(from, to, step / 5).map(px),
  };
}
