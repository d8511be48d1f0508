import { type KeyboardEvent, type PointerEvent, useRef } from 'react';
import type { LaneSetup } from '../plot/lane-setup.ts';
import { type Lane, LEAST_LANE } from '../plot/lanes.ts';

interface LaneGripsProps {
  lanes: readonly Lane[];
  setup: LaneSetup;
  onSetup: (setup: LaneSetup) => void;
}

interface Held {
  readonly place: number;
  readonly startY: number;
  readonly heights: readonly number[];
}

const KEY_STEP_PX = 24;

/** A two-bar grip between each two lanes: by drag or by arrow keys one grows as the other shrinks. */
export function LaneGrips({ lanes, setup, onSetup }: LaneGripsProps) {
  const held = useRef<Held | null>(null);
  const share = (place: number, by: number, heights: readonly number[]) => {
    const upper = heights[place]!;
    const lower = heights[place + 1]!;
    const moved = Math.min(Math.max(by, LEAST_LANE - upper), lower - LEAST_LANE);
    const weights = new Map(setup.weights);
    lanes.forEach((lane, at) => {
      const height = heights[at]! + (at === place ? moved : at === place + 1 ? -moved : 0);
      weights.set(lane.signal.index, height);
    });
    onSetup({ ...setup, weights });
  };
  const heightsNow = () => lanes.map(({ height }) => height);
  return (
    <>
      {lanes.slice(0, -1).map((lane, place) => {
        const below = lanes[place + 1]!;
        const up = () => {
          held.current = null;
        };
        return (
          <div
            key={lane.signal.index}
            role="slider"
            aria-orientation="vertical"
            aria-label={`Height of ${lane.signal.name} and ${below.signal.name}`}
            aria-valuenow={lane.height}
            aria-valuemin={LEAST_LANE}
            aria-valuemax={lane.height + below.height - LEAST_LANE}
            tabIndex={0}
            className="lane-grip"
            style={{ top: below.top }}
            onPointerDown={(event: PointerEvent<HTMLElement>) => {
              event.currentTarget.setPointerCapture(event.pointerId);
              held.current = { place, startY: event.clientY, heights: heightsNow() };
            }}
            onPointerMove={(event: PointerEvent) => {
              const from = held.current;
              if (from !== null) share(from.place, event.clientY - from.startY, from.heights);
            }}
            onPointerUp={up}
            onPointerCancel={up}
            onKeyDown={(event: KeyboardEvent) => {
              const sign = event.key === 'ArrowUp' ? -1 : event.key === 'ArrowDown' ? 1 : 0;
              if (sign === 0) return;
              event.preventDefault();
              event.stopPropagation();
              share(place, sign * KEY_STEP_PX, heightsNow());
            }}
          >
            <i />
          </div>
        );
      })}
    </>
  );
}
