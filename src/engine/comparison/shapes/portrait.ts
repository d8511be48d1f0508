import { sampleCount, timeAt } from '../../signal/time.ts';
import { cycleOriginDeg } from '../cycle-origin.ts';
import { overDegrees } from '../over-degrees.ts';
import { overSeconds } from '../over-seconds.ts';
import type { Side } from '../types.ts';
import { eventsOf, extremes } from './resample.ts';

/** Points of a portrait. */
export const PORTRAIT_POINTS = 160;

/**
 * A small picture of a signal. `points` run from 0 (lowest) to 255 (highest) over equal steps of the axis, null where there is
 * nothing: degrees about the gap or of the cycle, widths of the event from switch-off, or seconds.
 */
export interface Portrait {
  readonly axis: 'deg' | 'width' | 's';
  readonly from: number;
  readonly to: number;
  readonly low: number;
  readonly high: number;
  readonly points: readonly (number | null)[];
}

type Stretch = {
  readonly axis: Portrait['axis'];
  readonly from: number;
  readonly to: number;
  readonly values: Float64Array;
};

function stretchOf(side: Side): Stretch | null {
  const { wheel } = side;
  if (side.circuit.startsWith('crank-') && wheel) {
    const step = 120 / (PORTRAIT_POINTS - 1);
    return {
      axis: 'deg',
      from: -60,
      to: 60,
      values: overDegrees(side, wheel, -60, 360, step).slice(0, PORTRAIT_POINTS),
    };
  }
  const origin = side.circuit.startsWith('cam-') && wheel ? cycleOriginDeg(side, wheel) : null;
  if (wheel && origin !== null) {
    const values = overDegrees(side, wheel, origin, 720, 720 / (PORTRAIT_POINTS - 1));
    return { axis: 'deg', from: 0, to: 720, values };
  }
  const event = eventsOf(side)[0];
  if (event) {
    const width = event.to - event.from;
    const step = (3 * width) / (PORTRAIT_POINTS - 1);
    const values = overSeconds(side, event.to - 1.5 * width, step, PORTRAIT_POINTS);
    return { axis: 'width', from: -1.5, to: 1.5, values };
  }
  const startS = timeAt(side.axis, 0);
  const endS = timeAt(side.axis, sampleCount(side.axis) - 1);
  if (!(endS > startS)) return null;
  const values = overSeconds(side, startS, (endS - startS) / (PORTRAIT_POINTS - 1), PORTRAIT_POINTS);
  return { axis: 's', from: 0, to: endS - startS, values };
}

/** Null for a signal of fewer than two samples or of holes only. */
export function portraitOf(side: Side): Portrait | null {
  if (sampleCount(side.axis) < 2) return null;
  const stretch = stretchOf(side);
  const ends = stretch && extremes(stretch.values);
  if (!stretch || !ends) return null;
  const [low, high] = ends;
  const scale = high > low ? 255 / (high - low) : 0;
  const points = Array.from(stretch.values, (value) =>
    Number.isNaN(value) ? null : Math.round((value - low) * scale),
  );
  return { axis: stretch.axis, from: stretch.from, to: stretch.to, low, high, points };
}
