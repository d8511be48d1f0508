import type { TimeAxis } from '../../capture.ts';
import { crossings } from '../../signal/crossings.ts';
import { highestIn, rangeMedian } from '../../signal/range.ts';
import { indexAtOrAfter, timeAt } from '../../signal/time.ts';
import type { LoadStates } from './states.ts';

/**
 * One time of the driver on. Indices are fractional: `start` where the voltage falls through the mesial level (null: it
 * was on before the capture began), `end` at the release (null: still on when the capture ends).
 */
export interface OnPeriod {
  readonly start: number | null;
  readonly end: number | null;
  /** Short releases inside it were bridged: the driver chops. */
  readonly chopped: boolean;
}

export interface OnPeriodOptions {
  /** Shorter stretches are no driver-on times. */
  readonly shortestS: number;
  /** Releases shorter than this, without a kick of half the swing above rest, belong to one driver-on time that is chopped. */
  readonly bridgeS?: number;
}

/** Interruptions shorter than this are pick-up from other circuits, not a release. Common practice, no source. */
const GLITCH_S = 25e-6;
/** From the feed to the kick takes no longer than this. Common practice, no source. */
const FLANK_S = 30e-6;

/**
 * Stretches in which the driver holds the load near its on level. Short swings through zero (a ringing load) are left
 * out: they are shorter than `shortestS` or a fifth of the longest stretch, or their middle is not at the on level.
 */
export function onPeriods(
  values: Float32Array,
  axis: TimeAxis,
  states: LoadStates & { readonly on: number },
  { shortestS, bridgeS = 0 }: OnPeriodOptions,
): OnPeriod[] {
  const { rest, on } = states;
  const span = rest - on;
  const level = (rest + on) / 2;
  const found = crossings(values, { level, hysteresis: 0.4 * span });
  const periods: OnPeriod[] = [];
  let start: number | null = null;
  let chopped = false;
  let open =
    found.count > 0 ? found.rising[0] === 1 : (rangeMedian(values, 0, values.length) ?? rest) < level;
  for (let k = 0; k < found.count; k += 1) {
    const at = found.at[k]!;
    if (found.rising[k] === 0) {
      const last = periods[periods.length - 1];
      const gapS = last?.end == null ? Number.POSITIVE_INFINITY : timeAt(axis, at) - timeAt(axis, last.end);
      const calm = () => values[highestIn(values, last?.end ?? at, at + 1)]! < rest + 0.5 * span;
      if (!open && last && (gapS < GLITCH_S || (gapS < bridgeS && calm()))) {
        periods.pop();
        start = last.start;
        chopped = last.chopped || gapS >= GLITCH_S;
      } else {
        start = at;
        chopped = false;
      }
      open = true;
    } else if (open) {
      const end = release(values, axis, at, states);
      periods.push({ start, end, chopped });
      start = null;
      chopped = false;
      open = false;
    }
  }
  if (open) periods.push({ start, end: null, chopped });

  const lengthS = (period: OnPeriod) =>
    timeAt(axis, period.end ?? values.length - 1) - timeAt(axis, period.start ?? 0);
  const steady = periods.filter((period) => {
    if (period.chopped) return true;
    const from = period.start ?? 0;
    const to = period.end ?? values.length;
    const middle = rangeMedian(values, from + 0.1 * (to - from), to - 0.1 * (to - from));
    return middle !== null && Math.abs(middle - on) < 0.4 * span;
  });
  const longestS = Math.max(0, ...steady.filter((p) => p.start !== null && p.end !== null).map(lengthS));
  return steady.filter((period) => {
    const cut = period.start === null || period.end === null;
    return lengthS(period) >= (cut ? shortestS : Math.max(shortestS, 0.2 * longestS));
  });
}

/**
 * The release: where the voltage leaves the on state for good. A driver that limits its current lets the voltage climb
 * part of the way to the feed before it opens; then the release is the jump that ends this climb.
 */
function release(
  values: Float32Array,
  axis: TimeAxis,
  at: number,
  states: LoadStates & { on: number },
): number {
  const { rest, on } = states;
  const span = rest - on;
  const jump = rest + 0.5 * span;
  const climbed = rest - 0.12 * span;
  const limitS = timeAt(axis, at) + 0.03;
  for (let i = Math.ceil(at); i < values.length && timeAt(axis, i) < limitS; i += 1) {
    const value = values[i]!;
    if (value < on + 0.2 * span) return at;
    if (value <= climbed) continue;
    const ahead = indexAtOrAfter(axis, timeAt(axis, i) + FLANK_S);
    if (i - at <= 1 || !(values[highestIn(values, i, Math.max(i, ahead) + 1)]! > jump)) return at;
    const before = values[i - 1]!;
    return i - 1 + (before < climbed ? (climbed - before) / (value - before) : 0);
  }
  return at;
}
