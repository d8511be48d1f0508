import type { DecodedWindow } from './decode-window.ts';
import { type LaneSetup, PLAIN_SETUP } from './lane-setup.ts';
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
  /** Drawn upside down. */
  readonly inverted: boolean;
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
 * and scrolls. The value range is that of the whole capture, so it stands still while the view moves; on a common scale it
 * is that of all lanes of the unit.
 */
export function layLanes(
  lines: readonly LaneLine[],
  height: number,
  overview: DecodedWindow | null,
  { weights, inverted, common }: LaneSetup = PLAIN_SETUP,
): Lane[] {
  const free = Math.max(height - LANE_GAP * (lines.length - 1), 0);
  const weightOf = (line: LaneLine) => weights.get(line.signal.index) ?? 1;
  const sum = lines.reduce((total, line) => total + weightOf(line), 0);
  const ranges = lines.map(({ signal }) => (overview === null ? null : extentOf(overview, signal)));
  const rangeOf = (line: LaneLine, place: number) => {
    const shared = lines.flatMap((other, at) =>
      (common && other.signal.unit === line.signal.unit) || at === place ? (ranges[at] ?? []) : [],
    );
    return laneRange(
      shared.length === 0 ? Number.NaN : Math.min(...shared.map(({ lowest }) => lowest)),
      shared.length === 0 ? Number.NaN : Math.max(...shared.map(({ highest }) => highest)),
    );
  };
  let top = 0;
  return lines.map((line, place) => {
    const own = Math.max(Math.floor((free * weightOf(line)) / sum), LEAST_LANE);
    const lane: Lane = {
      ...line,
      top,
      height: own,
      ...rangeOf(line, place),
      inverted: inverted.has(line.signal.index),
    };
    top += own + LANE_GAP;
    return lane;
  });
}

export const stackHeight = (lanes: readonly Lane[]) =>
  lanes.reduce((bottom, lane) => Math.max(bottom, lane.top + lane.height), 0);

/** Pixel of a value from the top of the stack. */
export const yOf = (lane: Lane, value: number) =>
  lane.top + ((lane.inverted ? value - lane.low : lane.high - value) / (lane.high - lane.low)) * lane.height;

export function valueAtY(lane: Lane, y: number): number {
  const down = ((y - lane.top) / lane.height) * (lane.high - lane.low);
  return lane.inverted ? lane.low + down : lane.high - down;
}

/** The lane under a pixel; between two lanes the one above. */
export function laneAtY(lanes: readonly Lane[], y: number): Lane | null {
  let found: Lane | null = null;
  for (const lane of lanes) if (lane.top <= y) found = lane;
  return found;
}
