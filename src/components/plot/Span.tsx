import { type KeyboardEvent, type PointerEvent, useRef } from 'react';
import { degreesAt } from './degrees.ts';
import { Dimension } from './Evidence.tsx';
import { count, digitsFor, duration, fixed, frequency, time, withUnit } from './format.ts';
import { type Lane, stackHeight } from './lanes.ts';
import type { PlotModel } from './model.ts';
import { spanStatistics } from './span-statistics.ts';
import type { PlotWheel, View } from './types.ts';
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

interface SpanFiguresProps {
  model: PlotModel;
  lanes: readonly Lane[];
  wheel: PlotWheel | null;
}

/** What lies between the handles: length, frequency, angle, and each lane's figures. */
export function SpanFigures({ model, lanes, wheel }: SpanFiguresProps) {
  const span = useStore(model.span);
  const view = useStore(model.view);
  useStore(model.loader.state);
  if (span === null) return null;
  const length = span.to - span.from;
  const window = model.loader.best(covering(view, span), model.devicePixels());
  const angle = angleOf(wheel, span);
  return (
    <section className="plot-figures" aria-label="Span">
      <p>
        <b>Span</b> <span className="figures">{duration(length)}</span>
        {length > 0 && <span className="figures"> {frequency(1 / length)}</span>}
        {angle !== null && <span className="figures"> {fixed(angle, 1)}°</span>}
      </p>
      {window !== null &&
        lanes.map((lane) => {
          const { n, lowest, highest, mean, difference } = spanStatistics(
            window,
            lane.signal,
            span.from,
            span.to,
          );
          const text = (value: number) =>
            withUnit(fixed(value, digitsFor((lane.high - lane.low) / 2000)), lane.signal.unit);
          const slope = difference !== null && length > 0 ? difference / length : null;
          return (
            <p key={lane.signal.index}>
              <span className="text-soft">{lane.signal.name}</span>{' '}
              <span className="figures">
                {lowest === null || highest === null ? 'no sample' : `${text(lowest)} to ${text(highest)}`}
                {mean !== null && `, mean ${text(mean)}`}
                {difference !== null && `, change ${text(difference)}`}
                {slope !== null &&
                  lane.signal.unit !== '1' &&
                  `, slope ${slopeText(slope, lane.signal.unit)}`}
                {n !== null && `, n = ${count(n)}`}
              </span>
              {mean === null && lowest !== null && <span className="text-soft"> mean: zoom in</span>}
            </p>
          );
        })}
    </section>
  );
}

const covering = (view: View, span: View): View => ({
  from: Math.min(view.from, span.from),
  to: Math.max(view.to, span.to),
});

function slopeText(perSecond: number, unit: string): string {
  const perMs = perSecond / 1000;
  return Math.abs(perMs) >= 0.1
    ? `${fixed(perMs, digitsFor(Math.abs(perMs) / 1000))} ${unit}/ms`
    : `${fixed(perSecond, digitsFor(Math.abs(perSecond) / 1000))} ${unit}/s`;
}

function angleOf(wheel: PlotWheel | null, span: View): number | null {
  if (wheel === null) return null;
  const from = degreesAt(wheel, span.from);
  const to = degreesAt(wheel, span.to);
  return from === null || to === null ? null : to - from;
}
