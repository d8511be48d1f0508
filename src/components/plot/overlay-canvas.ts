import uPlot from 'uplot';
import { cssColour, onThemeChange } from './colours.ts';
import type { ViewModel } from './view-model.ts';

type Values = readonly (number | null)[];

/** Two traces on one axis at equal steps, and the band of the reference where there is one. */
export interface OverlayData {
  readonly start: number;
  readonly step: number;
  readonly here: Values;
  readonly reference: Values;
  readonly low: Values | null;
  readonly high: Values | null;
}

export interface OverlayCanvas {
  resize(width: number, height: number): void;
  close(): void;
}

/** Lowest and highest of all that is drawn, for the value scale. */
export function overlayExtent(data: OverlayData): { lowest: number; highest: number } {
  let lowest = Number.POSITIVE_INFINITY;
  let highest = Number.NEGATIVE_INFINITY;
  for (const list of [data.here, data.reference, data.low ?? [], data.high ?? []])
    for (const value of list) {
      if (value === null) continue;
      if (value < lowest) lowest = value;
      if (value > highest) highest = value;
    }
  return { lowest, highest };
}

/** What was recorded here in full, the reference in the same hue, thinner and dashed, its band pale. */
export function createOverlayCanvas(
  host: HTMLElement,
  model: ViewModel,
  data: OverlayData,
  role: string,
  range: { readonly low: number; readonly high: number },
): OverlayCanvas {
  const xs = data.here.map((_, i) => data.start + i * data.step);
  const pale = () => `color-mix(in srgb, ${cssColour(role)} 22%, transparent)`;
  const none = { show: false };
  let frame = 0;
  const chart = new uPlot(
    {
      width: Math.max(host.clientWidth, 1),
      height: Math.max(host.clientHeight, 1),
      padding: [0, 0, 0, 0],
      cursor: none,
      legend: none,
      axes: [none, none],
      scales: {
        x: { time: false, auto: false, range: () => [model.view.get().from, model.view.get().to] },
        y: { auto: false, range: () => [range.low, range.high] },
      },
      series: [
        {},
        { width: 0, points: none, stroke: pale, show: data.low !== null },
        { width: 0, points: none, stroke: pale, show: data.high !== null },
        { width: 1, dash: [5, 3], points: none, pxAlign: 0, stroke: () => cssColour(role), alpha: 0.85 },
        { width: 1.5, points: none, pxAlign: 0, stroke: () => cssColour(role) },
      ],
      bands: data.low === null ? [] : [{ series: [2, 1], fill: pale }],
      hooks: {
        draw: [() => host.setAttribute('data-draws', String(Number(host.dataset.draws ?? 0) + 1))],
      },
    },
    [
      xs,
      [...(data.low ?? data.reference)],
      [...(data.high ?? data.reference)],
      [...data.reference],
      [...data.here],
    ],
    host,
  );
  const draw = () => {
    frame = 0;
    const { from, to } = model.view.get();
    chart.setScale('x', { min: from, max: to });
    chart.redraw(true, false);
  };
  const later = () => {
    if (frame === 0) frame = requestAnimationFrame(draw);
  };
  const stops = [model.view.subscribe(later), onThemeChange(later)];
  later();
  return {
    resize(width, height) {
      if (width > 0 && height > 0) chart.setSize({ width, height });
      later();
    },
    close() {
      for (const stop of stops) stop();
      cancelAnimationFrame(frame);
      chart.destroy();
    },
  };
}
