import { digitsFor, fixed } from './format.ts';
import { multiples, niceStep } from './ticks.ts';
import type { View } from './types.ts';

/** The scale in seconds: alternate fields of one step, a label at each, finer ticks between. Pixels from the left. */
export interface TimeScale {
  readonly fields: readonly { readonly from: number; readonly to: number; readonly dark: boolean }[];
  readonly labels: readonly { readonly at: number; readonly text: string }[];
  readonly ticks: readonly number[];
}

const APART = 76;

/** Labels in ms when the view is short and near zero enough to read, else in seconds; told from `originS`. */
export function timeScale(own: View, widthPx: number, originS = 0): TimeScale {
  const view = { from: own.from - originS, to: own.to - originS };
  const span = view.to - view.from;
  const pixelsPerS = widthPx / span;
  const step = niceStep(APART / pixelsPerS);
  const px = (timeS: number) => (timeS - view.from) * pixelsPerS;
  const inMs = Math.max(Math.abs(view.from), Math.abs(view.to)) < 0.5;
  const label = (timeS: number) =>
    inMs ? `${fixed(timeS * 1e3, digitsFor(step * 1e3))} ms` : `${fixed(timeS, digitsFor(step))} s`;
  const first = Math.floor(view.from / step);
  const fields: { from: number; to: number; dark: boolean }[] = [];
  for (let i = first; i * step < view.to && fields.length < 200; i += 1) {
    const from = Math.max(px(i * step), 0);
    const to = Math.min(px((i + 1) * step), widthPx);
    if (to > from) fields.push({ from, to, dark: ((i % 2) + 2) % 2 === 0 });
  }
  return {
    fields,
    labels: multiples(view.from, view.to, step).map((timeS) => ({ at: px(timeS), text: label(timeS) })),
    ticks: multiples(view.from, view.to, step / 5).map(px),
  };
}
