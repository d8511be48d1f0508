import { sortedRange } from '../../signal/range.ts';
import { quantileSorted } from '../../signal/statistics.ts';
import { timeAt } from '../../signal/time.ts';
import type { Burn, CoilTrace, Kick } from './firing.ts';

/** A burn shorter than this cannot be told from half a swing of the ringing coil. Common practice, no source. */
const SHORTEST_S = 0.2e-3;
/** The leakage ring right after breakdown dips below the feed for less than this. Common practice, no source. */
const DIP_S = 30e-6;

/**
 * The burn line after a kick: the time the voltage stays above the feed once the kick has fallen, if that is long and
 * level enough. It starts at half the kick on its falling side: the kick stands on the burn line, so its half height is midway
 * between its peak and that line, as the other end is midway between the line and the feed. It ends at the last passage of halfway from burn to feed before the voltage first drops to the feed. Level: median.
 * null: no burn line; the half swings of a ringing coil are shorter, or rounder than a line.
 */
export function findBurn(trace: CoilTrace, kick: Kick, until: number): Burn | null {
  const { values, axis, states } = trace;
  const swing = states.rest - states.on;
  const floor = states.rest + Math.max(0.15 * swing, 4 * states.noise);
  let below = -1;
  let drop = -1;
  for (let i = kick.at; i < until; i += 1) {
    const value = values[i]!;
    if (Number.isNaN(value)) continue;
    if (value > floor) below = -1;
    else {
      if (below < 0) below = i;
      if (timeAt(axis, i) - timeAt(axis, below) >= DIP_S || timeAt(axis, i + 1) - timeAt(axis, i) > DIP_S) {
        drop = below;
        break;
      }
    }
  }
  const last = drop < 0 ? until : drop;
  const rough = sortedRange(values, kick.at + 1 + 0.15 * (last - kick.at), last);
  if (rough.length < 3) return null;
  const roughLevel = quantileSorted(rough, 0.5);
  const start = fallThrough(values, kick.at, last, (kick.peak + roughLevel) / 2);
  if (start === null) return null;
  const line = sortedRange(values, start, last);
  if (line.length < 3) return null;
  const level = quantileSorted(line, 0.5);
  const height = level - states.rest;
  const spreadOfLine = quantileSorted(line, 0.75) - quantileSorted(line, 0.25);
  if (timeAt(axis, Math.min(last, values.length - 1)) - timeAt(axis, start) < SHORTEST_S) return null;
  if (height < Math.max(0.3 * swing, 6 * states.noise) || spreadOfLine > 0.6 * height) return null;
  if (drop < 0) return { start, end: null, level };
  return {
    start,
    end: lastFallThrough(values, start, Math.min(drop + 1, until), (level + states.rest) / 2),
    level,
  };
}

/** First falling passage of `level` after sample `from`, as a fractional index. */
function fallThrough(values: Float32Array, from: number, to: number, level: number): number | null {
  for (let i = from + 1; i < to; i += 1) {
    if (values[i]! < level) return i - 1 + fraction(values[i - 1]!, values[i]!, level);
  }
  return null;
}

/** Last falling passage of `level` before sample `to`; null where there is none. */
function lastFallThrough(values: Float32Array, from: number, to: number, level: number): number | null {
  for (let i = Math.min(to, values.length - 1); i > from; i -= 1) {
    if (values[i]! < level && values[i - 1]! >= level)
      return i - 1 + fraction(values[i - 1]!, values[i]!, level);
  }
  return null;
}

const fraction = (before: number, after: number, level: number) =>
  before > after ? (before - level) / (before - after) : 0;
