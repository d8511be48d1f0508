import uPlot from 'uplot';
import { cssColour, onThemeChange } from './colours.ts';
import { type LineData, lineData } from './line-data.ts';
import type { PlotModel } from './model.ts';
import type { PlotSignal } from './types.ts';

/** Samples further apart than this many CSS pixels are shown as dots, with nothing invented between them. */
const DOTS_FROM_PX = 8;

export interface TraceOptions {
  readonly signal: PlotSignal;
  readonly role: string;
  readonly dash: readonly number[];
  readonly range: { readonly low: number; readonly high: number };
  readonly inverted: boolean;
}

export interface TraceCanvas {
  resize(width: number, height: number): void;
  setRange(range: TraceOptions['range']): void;
  close(): void;
}

/**
 * One lane's trace: uPlot without axes, cursor or legend. Draws again only when the view, the data at hand, the size or the
 * theme changed. `data-draws` on the host counts the drawings, for tests.
 */
export function createTraceCanvas(host: HTMLElement, model: PlotModel, options: TraceOptions): TraceCanvas {
  const { signal, role, dash, inverted } = options;
  const holds = model.capture.axis === 'holds';
  let range = options.range;
  let shown: unknown = null;
  let data: LineData = { xs: [], ys: [] };
  let dots = false;
  let frame = 0;
  let draws = 0;
  const line = holds ? uPlot.paths.stepped!({ align: 1 }) : uPlot.paths.linear!();

  const chart = new uPlot(
    {
      width: Math.max(host.clientWidth, 1),
      height: Math.max(host.clientHeight, 1),
      padding: [0, 0, 0, 0],
      cursor: { show: false },
      legend: { show: false },
      axes: [{ show: false }, { show: false }],
      scales: {
        x: { time: false, auto: false, range: () => [model.view.get().from, model.view.get().to] },
        y: { auto: false, dir: inverted ? -1 : 1, range: () => [range.low, range.high] },
      },
      series: [
        {},
        {
          stroke: () => cssColour(role),
          dash: [...dash],
          width: 1,
          pxAlign: 0,
          spanGaps: false,
          paths: (u, series, from, to) => (dots && !holds ? null : line(u, series, from, to)),
          points: {
            show: () => dots,
            size: 5,
            width: 0,
            fill: () => cssColour(role),
            stroke: () => cssColour(role),
          },
        },
      ],
      hooks: {
        drawClear: [(u) => drawZero(u)],
        draw: [
          () => {
            draws += 1;
            host.dataset.draws = String(draws);
          },
        ],
      },
    },
    [[], []],
    host,
  );

  const draw = () => {
    frame = 0;
    const view = model.view.get();
    const pixels = model.devicePixels();
    const best = model.loader.best(view, pixels);
    const fresh = best !== shown;
    if (fresh && best !== null) {
      shown = best;
      data = lineData(best, signal, holds);
    }
    const { apartPx, crowded } = spacing(data, view.from, view.to, model.widthPx.get());
    dots = best?.layout === 'samples' && apartPx > DOTS_FROM_PX;
    // A line of about a pixel is the fast path of every canvas; a few points bear one that is easier to see.
    chart.series[1]!.width = crowded ? Math.max(1 / devicePixelRatio, 0.8) : 1.25;
    if (fresh) chart.setData([data.xs, data.ys], false);
    chart.setScale('x', { min: view.from, max: view.to });
    chart.redraw(true, false);
    host.dataset.layout = best?.layout ?? 'none';
  };
  const later = () => {
    if (frame === 0) frame = requestAnimationFrame(draw);
  };
  const stops = [model.view.subscribe(later), model.loader.state.subscribe(later), onThemeChange(later)];
  later();

  return {
    resize(width, height) {
      if (width < 1 || height < 1) return;
      chart.setSize({ width, height });
      later();
    },
    setRange(next) {
      if (next.low === range.low && next.high === range.high) return;
      range = next;
      chart.setScale('y', { min: range.low, max: range.high });
      later();
    },
    close() {
      for (const stop of stops) stop();
      cancelAnimationFrame(frame);
      chart.destroy();
    },
  };
}

function spacing(data: LineData, from: number, to: number, widthPx: number) {
  let inside = 0;
  for (const x of data.xs) if (x >= from && x <= to) inside += 1;
  return { apartPx: inside > 1 ? widthPx / inside : widthPx, crowded: inside > 2 * widthPx };
}

/** The zero line is the only line inside a lane. */
function drawZero(u: uPlot): void {
  const { low, high } = { low: u.scales.y?.min ?? 0, high: u.scales.y?.max ?? 0 };
  if (low > 0 || high < 0) return;
  const y = Math.round(u.valToPos(0, 'y', true)) + 0.5;
  u.ctx.save();
  u.ctx.strokeStyle = cssColour('rule');
  u.ctx.lineWidth = Math.max(1, Math.round(devicePixelRatio));
  u.ctx.beginPath();
  u.ctx.moveTo(u.bbox.left, y);
  u.ctx.lineTo(u.bbox.left + u.bbox.width, y);
  u.ctx.stroke();
  u.ctx.restore();
}
