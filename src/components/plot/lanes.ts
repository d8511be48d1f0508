import type { DecodedWindow } from './decode-window.ts';
import { extentOf } from './line-data.ts';
import { laneRange } from './ticks.ts';
import type { PlotSignal } from './types.ts';

/** Where a lane stands in the stack (CSS pixels) and which values it spans (the signal's unit). */
export interface Lane {
  readonly signal: PlotSignal;
  readonly role: string;
  readonly dash: readonly number[];
  readonly top: number;
  readonly height: number;
  readonly low: number;
  readonly high: number;
}

export const LANE_GAP = 4;
export const LEAST_LANE = 96;

export interface LaneLine {
  readonly signal: PlotSignal;
  readonly role: string;
  readonly dash: readonly number[];
}

/**
 * Lanes share the height by weight (1 unless dragged); none is lower than 96 px, then the stack is higher than the place
 * and scrolls. The value range is that of the whole capture, so it stands still while the view moves.
 */
export function layLanes(
  lines: readonly LaneLine[],
  height: number,
  overview: DecodedWindow | null,
  weights: ReadonlyMap<number, number> = new Map(),
): Lane[] {
  const free = Math.max(height - LANE_GAP * (lines.length - 1), 0);
  const weightOf = (line: LaneLine) => weights.get(line.signal.index) ?? 1;
  const sum = lines.reduce((total, line) => total + weightOf(line), 0);
  let top = 0;
  return lines.map((line) => {
    const own = Math.max(Math.floor((free * weightOf(line)) / sum), LEAST_LANE);
    const extent = overview === null ? null : extentOf(overview, line.signal);
    const { low, high } = laneRange(extent?.lowest ?? Number.NaN, extent?.highest ?? Number.NaN);
    const lane: Lane = { ...line, top, height: own, low, high };
    top += own + LANE_GAP;
    return lane;
  });
}

export const stackHeight = (lanes: readonly Lane[]) =>
  lanes.reduce((bottom, lane) => Math.max(bottom, lane.top + lane.height), 0);

/** Pixel of a value from the top of the stack. */
export const yOf = (lane: Lane, value: number) =>
  lane.top + ((lane.high - value) / (lane.high - lane.low)) * lane.height;

export const valueAtY = (lane: Lane, y: number) =>
  lane.high - ((y - lane.top) / lane.height) * (lane.high - lane.low);

/** The lane under a pixel; between two lanes the one above. */
export function laneAtY(lanes: readonly Lane[], y: number): Lane | null {
  let found: Lane | null = null;
  for (const lane of lanes) if (lane.top <= y) found = lane;
  return found;
}
