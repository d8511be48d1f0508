import { type KeyboardEvent, type PointerEvent, useEffect, useRef, useState } from 'react';
import type { MarkJson } from '../../contract/areas/marks.ts';
import { time } from '../plot/format.ts';
import type { PlotModel } from '../plot/model.ts';
import { useStore } from '../plot/useStore.ts';
import { shareOfTime, timeAtShare } from '../plot/view.ts';

interface MarkHandlesProps {
  model: PlotModel;
  mark: MarkJson;
  /** The new place, once the hand rests. */
  onMove: (mark: MarkJson, place: { readonly from: number; readonly to: number | null }) => void;
}

type Part = 'from' | 'to';

const RESTED_MS = 700;

/** The chosen mark's place, to be dragged or moved by arrow keys; a range has a handle at each end. */
export function MarkHandles({ model, mark, onMove }: MarkHandlesProps) {
  const view = useStore(model.view);
  const [place, setPlace] = useState<{ from: number; to: number | null }>({ from: mark.from, to: mark.to });
  const held = useRef<Part | null>(null);
  const timer = useRef<ReturnType<typeof setTimeout> | undefined>(undefined);
  useEffect(() => setPlace({ from: mark.from, to: mark.to }), [mark]);
  useEffect(() => () => clearTimeout(timer.current), []);
  const { whole } = model.bounds;
  const moved = (part: Part, timeS: number) => {
    const at = Math.min(Math.max(timeS, whole.from), whole.to);
    if (mark.to === null || place.to === null) return { from: at, to: null };
    return part === 'from'
      ? { from: Math.min(at, place.to), to: place.to }
      : { from: place.from, to: Math.max(at, place.from) };
  };
  const send = (next: { from: number; to: number | null }) => {
    if (next.from !== mark.from || next.to !== mark.to) onMove(mark, next);
  };
  const handle = (part: Part, at: number) => (
    <div
      key={part}
      role="slider"
      tabIndex={0}
      aria-label={
        mark.to === null ? 'Place of the mark' : part === 'from' ? 'Start of the mark' : 'End of the mark'
      }
      aria-valuemin={whole.from}
      aria-valuemax={whole.to}
      aria-valuenow={at}
      aria-valuetext={time(at, view.to - view.from)}
      className="mark-handle"
      style={{ left: `${shareOfTime(view, at) * 100}%` }}
      onPointerDown={(event) => {
        event.stopPropagation();
        event.currentTarget.setPointerCapture(event.pointerId);
        held.current = part;
      }}
      onPointerMove={(event: PointerEvent<HTMLElement>) => {
        const stage = event.currentTarget.parentElement?.getBoundingClientRect();
        if (held.current !== part || stage === undefined) return;
        setPlace(moved(part, timeAtShare(view, (event.clientX - stage.left) / stage.width)));
      }}
      onPointerUp={() => {
        held.current = null;
        send(place);
      }}
      onPointerCancel={() => {
        held.current = null;
        setPlace({ from: mark.from, to: mark.to });
      }}
      onKeyDown={(event: KeyboardEvent) => {
        const sign = event.key === 'ArrowLeft' ? -1 : event.key === 'ArrowRight' ? 1 : 0;
        if (sign === 0) return;
        event.preventDefault();
        event.stopPropagation();
        const next = moved(part, at + (sign * (view.to - view.from)) / (event.shiftKey ? 20 : 400));
        setPlace(next);
        clearTimeout(timer.current);
        timer.current = setTimeout(() => send(next), RESTED_MS);
      }}
    />
  );
  return (
    <>
      {handle('from', place.from)}
      {place.to !== null && handle('to', place.to)}
    </>
  );
}
