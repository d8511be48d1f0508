import { cssColour, onThemeChange } from './colours.ts';
import type { DecodedWindow } from './decode-window.ts';
import { extentOf, lineData } from './line-data.ts';
import type { PlotModel } from './model.ts';
import type { PlotSignal } from './types.ts';

export interface StripLine {
  readonly signal: PlotSignal;
  readonly role: string;
  readonly dash: readonly number[];
}

/** The whole capture, each signal in its own band from its lowest to its highest. Drawn when the overview or the theme changes. */
export function createStripCanvas(canvas: HTMLCanvasElement, model: PlotModel, lines: readonly StripLine[]) {
  let frame = 0;
  let drawn: DecodedWindow | null = null;
  const draw = () => {
    frame = 0;
    const { overview } = model.loader.state.get().cache;
    const ratio = devicePixelRatio || 1;
    const width = Math.round(canvas.clientWidth * ratio);
    const height = Math.round(canvas.clientHeight * ratio);
    if (overview === null || width === 0) return;
    drawn = overview;
    canvas.width = width;
    canvas.height = height;
    const context = canvas.getContext('2d');
    if (context === null) return;
    const { from, to } = model.bounds.whole;
    const band = height / Math.max(lines.length, 1);
    lines.forEach(({ signal, role, dash }, place) => {
      const extent = extentOf(overview, signal);
      if (extent === null) return;
      const span = extent.highest - extent.lowest || 1;
      const { xs, ys } = lineData(overview, signal, model.capture.axis === 'holds');
      context.strokeStyle = cssColour(role);
      context.lineWidth = Math.min(ratio, 1.25);
      context.setLineDash(dash.map((length) => length * ratio));
      context.beginPath();
      let pen = false;
      ys.forEach((y, i) => {
        if (y === null) {
          pen = false;
          return;
        }
        const px = ((xs[i]! - from) / (to - from)) * width;
        const py = band * (place + 0.88 - (0.76 * (y - extent.lowest)) / span);
        if (pen) context.lineTo(px, py);
        else context.moveTo(px, py);
        pen = true;
      });
      context.stroke();
    });
  };
  const later = () => {
    if (frame === 0) frame = requestAnimationFrame(draw);
  };
  const stops = [
    model.loader.state.subscribe(() => {
      if (model.loader.state.get().cache.overview !== drawn) later();
    }),
    onThemeChange(later),
  ];
  const observer = new ResizeObserver(later);
  observer.observe(canvas);
  return () => {
    for (const stop of stops) stop();
    observer.disconnect();
    cancelAnimationFrame(frame);
  };
}
