import { type KeyboardEvent, type PointerEvent, useRef } from 'react';
import { Dimension } from './Evidence.tsx';
import { duration, time } from './format.ts';
import { type Lane, stackHeight } from './lanes.ts';
import type { PlotModel } from './model.ts';
import { useStore } from './useStore.ts';
import { shareOfTime, timeAtShare } from './view.ts';

/** The dimension line of the span, inside the overlay's SVG. */
export function SpanLines({
  model,
  lanes,
  width,
}: {
  model: PlotModel;
  lanes: readonly Lane[];
  width: number;
}) {
  const span = useStore(model.span);
  const view = useStore(model.view);
  if (span === null) return null;
  const from = shareOfTime(view, span.from) * width;
  const to = shareOfTime(view, span.to) * width;
  const height = stackHeight(lanes);
  return (
    <g className="plot-span">
      <rect x={from} y={0} width={Math.max(to - from, 0)} height={height} />
      <path d={`M${from} 0v${height}M${to} 0v${height}`} />
      <Dimension from={from} to={to} y={height / 2} width={width} text={duration(span.to - span.from)} />
    </g>
  );
}

/** The two handles: dragged, or moved by arrow keys. */
export function SpanHandles({ model, height }: { model: PlotModel; height: number }) {
  const span = useStore(model.span);
  const view = useStore(model.view);
  const held = useRef<'from' | 'to' | null>(null);
  if (span === null) return null;
  const set = (part: 'from' | 'to', timeS: number) => {
    const next = {
      ...span,
      [part]: Math.min(Math.max(timeS, model.bounds.whole.from), model.bounds.whole.to),
    };
    model.span.set(next.from <= next.to ? next : { from: next.to, to: next.from });
    if (next.from > next.to) held.current = part === 'from' ? 'to' : 'from';
  };
  const drag = (event: PointerEvent<HTMLElement>) => {
    const stage = event.currentTarget.parentElement?.getBoundingClientRect();
    if (held.current === null || stage === undefined) return;
    set(held.current, timeAtShare(view, (event.clientX - stage.left) / stage.width));
  };
  const handle = (part: 'from' | 'to', label: string) => (
    <div
      role="slider"
      tabIndex={0}
      aria-label={label}
      aria-valuemin={model.bounds.whole.from}
      aria-valuemax={model.bounds.whole.to}
      aria-valuenow={span[part]}
      aria-valuetext={time(span[part], view.to - view.from)}
      className="plot-handle"
      style={{ left: `${shareOfTime(view, span[part]) * 100}%`, height }}
      onPointerDown={(event) => {
        event.stopPropagation();
        event.currentTarget.setPointerCapture(event.pointerId);
        held.current = part;
      }}
      onPointerMove={drag}
      onPointerUp={() => {
        held.current = null;
      }}
      onKeyDown={(event: KeyboardEvent) => {
        const sign = event.key === 'ArrowLeft' ? -1 : event.key === 'ArrowRight' ? 1 : 0;
        if (sign === 0) return;
        event.preventDefault();
        event.stopPropagation();
        set(part, span[part] + (sign * (view.to - view.from)) / (event.shiftKey ? 20 : 400));
      }}
    />
  );
  return (
    <>
      {handle('from', 'Start of the span')}
      {handle('to', 'End of the span')}
    </>
  );
}
