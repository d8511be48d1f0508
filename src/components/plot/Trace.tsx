import { useEffect, useRef } from 'react';
import type { Lane } from './lanes.ts';
import type { PlotModel } from './model.ts';
import { createTraceCanvas, type TraceCanvas } from './trace-canvas.ts';

/** One lane's trace. React only places it; the canvas watches the model by itself. */
export function Trace({ lane, width, model }: { lane: Lane; width: number; model: PlotModel }) {
  const host = useRef<HTMLDivElement>(null);
  const canvas = useRef<TraceCanvas | null>(null);
  const { signal, role, dash, low, high, top, height, inverted } = lane;
  const dashKey = dash.join(' ');

  // biome-ignore lint/correctness/useExhaustiveDependencies: range and size are handed on below, without a new canvas
  useEffect(() => {
    if (host.current === null) return;
    const made = createTraceCanvas(host.current, model, {
      signal,
      role,
      dash,
      range: { low, high },
      inverted,
    });
    canvas.current = made;
    return () => {
      made.close();
      canvas.current = null;
    };
  }, [model, signal, role, dashKey, inverted]);
  useEffect(() => canvas.current?.setRange({ low, high }), [low, high]);
  useEffect(() => canvas.current?.resize(width, height), [width, height]);

  return (
    <div
      ref={host}
      className="plot-lane"
      data-signal={signal.index}
      style={{ top, height }}
      aria-hidden="true"
    />
  );
}
