import { type KeyboardEvent, type PointerEvent, useEffect, useRef } from 'react';
import { time } from './format.ts';
import type { LaneLine } from './lanes.ts';
import type { PlotModel } from './model.ts';
import { createStripCanvas } from './strip-canvas.ts';
import type { PlotMark, PlotWheel, View } from './types.ts';
import { useStore } from './useStore.ts';
import { panBy, shareOfTime, timeAtShare } from './view.ts';

interface StripProps {
  model: PlotModel;
  lines: readonly LaneLine[];
  marks: readonly PlotMark[];
  wheel: PlotWheel | null;
}

type Held = { part: 'from' | 'to' | 'window'; startX: number; view: View };

/** The whole capture; its window can be dragged and stretched, by pointer or by keys on its grips. */
export function Strip({ model, lines, marks, wheel }: StripProps) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const box = useRef<HTMLDivElement>(null);
  const held = useRef<Held | null>(null);
  const view = useStore(model.view);
  const { whole, least } = model.bounds;
  const span = whole.to - whole.from;
  const key = lines.map((line) => line.signal.index).join();

  // biome-ignore lint/correctness/useExhaustiveDependencies: the lines only change with their indices
  useEffect(() => {
    if (canvas.current === null) return;
    return createStripCanvas(canvas.current, model, lines);
  }, [model, key]);

  const move = (part: Held['part'], seconds: number, start: View) => {
    if (part === 'window') model.show(panBy(start, seconds, model.bounds));
    else if (part === 'from')
      model.show({ ...start, from: Math.min(start.from + seconds, start.to - least) });
    else model.show({ ...start, to: Math.max(start.to + seconds, start.from + least) });
  };
  const down = (part: Held['part']) => (event: PointerEvent<HTMLElement>) => {
    event.stopPropagation();
    event.currentTarget.setPointerCapture(event.pointerId);
    held.current = { part, startX: event.clientX, view: model.view.get() };
  };
  const drag = (event: PointerEvent<HTMLElement>) => {
    if (held.current === null || box.current === null) return;
    const seconds = ((event.clientX - held.current.startX) / box.current.clientWidth) * span;
    move(held.current.part, seconds, held.current.view);
  };
  const up = () => {
    held.current = null;
  };
  /** A press beside the window brings its middle there. */
  const jump = (event: PointerEvent<HTMLDivElement>) => {
    const bounds = event.currentTarget.getBoundingClientRect();
    const at = timeAtShare(whole, (event.clientX - bounds.left) / bounds.width);
    const { from, to } = model.view.get();
    if (at < from || at > to) model.show(panBy({ from, to }, at - (from + to) / 2, model.bounds));
  };
  const keys = (part: Held['part']) => (event: KeyboardEvent) => {
    const sign = event.key === 'ArrowLeft' ? -1 : event.key === 'ArrowRight' ? 1 : 0;
    if (sign === 0) return;
    event.preventDefault();
    event.stopPropagation();
    move(part, (sign * span) / 100, model.view.get());
  };
  const left = Math.max(shareOfTime(whole, view.from), 0) * 100;
  const right = (1 - Math.min(shareOfTime(whole, view.to), 1)) * 100;
  // Grips of a short window stand beside it, so that each can still be taken.
  const thin = model.widthPx.get() * ((view.to - view.from) / span) < 32;
  const grip = (part: 'from' | 'to', label: string) => (
    <div
      role="slider"
      tabIndex={0}
      aria-label={label}
      aria-valuemin={whole.from}
      aria-valuemax={whole.to}
      aria-valuenow={view[part]}
      aria-valuetext={time(view[part], span)}
      className={`strip-grip strip-grip-${part}`}
      onPointerDown={down(part)}
      onPointerMove={drag}
      onPointerUp={up}
      onPointerCancel={up}
      onKeyDown={keys(part)}
    />
  );
  return (
    <div className="plot-strip">
      <div ref={box} className="strip-box" onPointerDown={jump}>
        <i className="strip-lit" style={{ left: `${left}%`, right: `${right}%` }} />
        <canvas ref={canvas} className="strip-canvas" />
        {wheel?.marksS.length !== undefined &&
          wheel.marksS.length < 60 &&
          wheel.marksS.map((mark) => (
            <i key={mark} className="strip-turn" style={{ left: `${shareOfTime(whole, mark) * 100}%` }} />
          ))}
        <div
          className={thin ? 'strip-window strip-window-thin' : 'strip-window'}
          style={{ left: `${left}%`, right: `${right}%` }}
          onPointerDown={down('window')}
          onPointerMove={drag}
          onPointerUp={up}
          onPointerCancel={up}
        >
          {grip('from', 'Start of the view')}
          {grip('to', 'End of the view')}
        </div>
        {marks.map((mark) => (
          <i
            key={mark.id}
            className="strip-dot"
            style={{ left: `${shareOfTime(whole, mark.from) * 100}%` }}
          />
        ))}
      </div>
      <div className="strip-names" aria-hidden="true">
        <span>{time(whole.from, span)}</span>
        {wheel !== null &&
          wheel.marksS.length < 14 &&
          wheel.marksS.slice(0, -1).map((mark, turn) => (
            <span
              key={mark}
              className="strip-turn-name"
              style={{ left: `${shareOfTime(whole, (mark + wheel.marksS[turn + 1]!) / 2) * 100}%` }}
            >
              turn {turn + 1}
            </span>
          ))}
        <span>{time(whole.to, span)}</span>
      </div>
    </div>
  );
}
