import type { TimeAxis } from '../../capture.ts';
import { highestIn } from '../../signal/range.ts';
import { indexAtOrAfter, timeAt } from '../../signal/time.ts';
import type { OnPeriod } from '../switched-load/on-periods.ts';
import type { LoadStates } from '../switched-load/states.ts';
import { findHump, type Hump } from './hump.ts';

/** One pulse with what follows its release. Indices are sample indices, fractions allowed. */
export interface InjectorPulse {
  readonly on: OnPeriod;
  /** Highest sample after the release and its index; null when nothing rises above the feed. */
  readonly clamp: { readonly peak: number; readonly at: number } | null;
  readonly hump: Hump | null;
  /** First sample at which the trace rests again. */
  readonly over: number;
}

/** The kick comes within this time of the release, and the decay ends within the next. Common practice, no source. */
const KICK_S = 2e-3;
const DECAY_S = 6e-3;

export function injectorPulse(
  values: Float32Array,
  axis: TimeAxis,
  states: LoadStates & { readonly on: number },
  on: OnPeriod,
  until: number,
): InjectorPulse {
  const { rest, noise } = states;
  if (on.end === null) return { on, clamp: null, hump: null, over: values.length };
  const first = Math.ceil(on.end);
  const after = (timeS: number) => Math.min(until, indexAtOrAfter(axis, timeAt(axis, on.end!) + timeS));
  const top = highestIn(values, first, after(KICK_S));
  const swing = rest - states.on;
  if (top < 0 || values[top]! < rest + Math.max(0.25 * swing, 6 * noise))
    return { on, clamp: null, hump: null, over: first };
  const peak = values[top]!;
  let from = top;
  while (from < until && values[from]! > rest + 0.85 * (peak - rest)) from += 1;
  const over = settled(values, from, after(DECAY_S), rest, Math.max(4 * noise, 0.01 * (peak - rest)));
  return { on, clamp: { peak, at: top }, hump: findHump(values, axis, from, over, rest, noise), over };
}

/** First of twenty samples in a row that stay within `reach` of the rest level; `to` when there is none. */
function settled(values: Float32Array, from: number, to: number, rest: number, reach: number): number {
  let calm = 0;
  for (let i = from; i < to; i += 1) {
    calm = Math.abs(values[i]! - rest) <= reach ? calm + 1 : 0;
    if (calm === 20) return i;
  }
  return to;
}
