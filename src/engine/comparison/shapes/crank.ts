import { median, quantileSorted } from '../../signal/statistics.ts';
import { overDegrees } from '../over-degrees.ts';
import type { Side } from '../types.ts';
import { extremes, finished, numberOf } from './resample.ts';

const STEP_DEG = 0.5;
const AROUND = 48;
const TURN = 48;
const ORDER = 32;
/** A fault at one tooth must weigh more by its kind than by its place, so that like lies near like wherever it is. */
const PLACE_WEIGHT = 0.35;
const ORDER_WEIGHT = 1.5;

/**
 * A crank signal over crank degrees: 48 numbers of the trace about the gap (24 degrees to either side, in halves of the
 * median swing), 48 of the swing around the turn (7.5 degrees each, in median swings), 31 of the teeth's swings in rising
 * order, and the swing at 200 rev/min. Null without a wheel.
 */
export function crankShape(side: Side): Float32Array | null {
  const { wheel } = side;
  if (!wheel || wheel.marksS.length === 0) return null;
  const turn = overDegrees(side, wheel, -24, 360, STEP_DEG);
  const pitch = 360 / (wheel.places ?? wheel.teethPerTurn);
  const reach = Math.ceil(Math.max(360 / TURN, pitch * 1.2) / STEP_DEG / 2);
  const swingAt = (place: number) => {
    const found = extremes(turn, Math.max(place - reach, 0), Math.min(place + reach + 1, turn.length));
    return found ? found[1] - found[0] : Number.NaN;
  };
  const swings = Float64Array.from({ length: TURN }, (_, bin) =>
    swingAt((((bin + 0.5) * turn.length) / TURN) | 0),
  );
  const middle = median(swings);
  if (middle === null || !(middle > 0)) return null;
  const ends = extremes(turn)!;
  const centre = side.circuit === 'crank-hall' ? (ends[0] + ends[1]) / 2 : 0;
  const around = Float64Array.from(
    { length: AROUND },
    (_, i) => ((turn[Math.round((i + 0.5) / STEP_DEG)] ?? Number.NaN) - centre) / (middle / 2),
  );
  return finished([
    around,
    swings.map((swing) => PLACE_WEIGHT * (swing / middle)),
    orderOf(wheel.toothHeights, wheel.toothAnglesDeg, pitch),
    [0.4 * Math.log2(Math.max((middle * 200) / (numberOf(side, 'rpm_mean') ?? 200), 1e-3))],
  ]);
}

/**
 * The teeth's swings over their median in rising order: the eight smallest, fifteen quantiles between, the eight largest.
 * A three-wire sensor has no swings: there it is each tooth's distance to the next one over the pitch.
 */
function orderOf(
  heights: readonly number[] | null,
  anglesDeg: readonly number[],
  pitch: number,
): Float64Array {
  const raw =
    heights ??
    anglesDeg.flatMap((angle, i) => {
      const step = (anglesDeg[i + 1] ?? Number.NaN) - angle;
      return step < 1.5 * pitch ? [step / pitch] : [];
    });
  const middle = median(raw) ?? 1;
  const sorted = [...raw].map((value) => value / middle).sort((a, b) => a - b);
  const count = ORDER - 1;
  if (sorted.length === 0) return new Float64Array(count);
  const last = sorted.length - 1;
  return Float64Array.from({ length: count }, (_, i) => {
    const value =
      i < 8
        ? sorted[Math.min(i, last)]!
        : i >= count - 8
          ? sorted[Math.max(last - (count - 1 - i), 0)]!
          : quantileSorted(sorted, (i - 7) / 16);
    return ORDER_WEIGHT * (value - 1);
  });
}
