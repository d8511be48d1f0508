import type { Side } from '../types.ts';
import {
  eventsOf,
  extremes,
  finished,
  meanOf,
  meansOverSeconds,
  numberOf,
  peaksOverSeconds,
} from './resample.ts';

const BEFORE = 1.25;

const averaged = (side: Side, part: (from: number, to: number) => Float64Array): Float64Array | null => {
  const events = eventsOf(side);
  return events.length === 0 ? null : meanOf(events.map(({ from, to }) => part(from, to)));
};

/**
 * Volts of a coil or injector: 40 numbers over one and a quarter widths up to switch-off, 24 over the 0.3 ms of the kick,
 * 64 over the 4.8 ms after it. In supply voltages, on an inverse hyperbolic sine: near the supply as they are, the kick as its logarithm.
 */
export function switchedVoltsShape(side: Side): Float32Array | null {
  const supply = numberOf(side, 'supply_level');
  if (supply === null || !(supply > 1)) return null;
  const squash = (value: number) => Math.asinh(value / supply);
  const before = averaged(side, (from, to) => meansOverSeconds(side, to - BEFORE * (to - from), to, 40));
  const kick = averaged(side, (_, to) => peaksOverSeconds(side, to, to + 0.0003, 24));
  const after = averaged(side, (_, to) => meansOverSeconds(side, to + 0.0003, to + 0.0051, 64));
  if (!before || !kick || !after) return null;
  return finished([before.map(squash), kick.map(squash), after.map((value) => 2 * squash(value))]);
}

/** Current or command of an event: 127 numbers from a quarter of its width before switch-on to a quarter after switch-off, in its own peak; then the peak. */
export function switchedOnShape(side: Side): Float32Array | null {
  const mean = averaged(side, (from, to) => {
    const quarter = (to - from) / 4;
    return meansOverSeconds(side, from - quarter, to + quarter, 127);
  });
  const ends = mean && extremes(mean);
  if (!mean || !ends || !(ends[1] > ends[0])) return null;
  const [low, high] = ends;
  const base = side.circuit === 'coil-command' ? low : Math.min(Math.max(0, low), high);
  return finished([
    mean.map((value) => (value - base) / (high - base)),
    [Math.log2(Math.max(high - base, 1e-3))],
  ]);
}
