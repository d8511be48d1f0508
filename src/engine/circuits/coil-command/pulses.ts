import type { TimeAxis } from '../../capture.ts';
import { crossings } from '../../signal/crossings.ts';
import type { StateLevels } from '../../signal/levels.ts';
import { timeAt } from '../../signal/time.ts';
import type { Evidence } from '../../value.ts';

/** Pulses of a two-level trace, and which of the states is the active one. */
export interface Pulses {
  readonly activeHigh: boolean;
  /** How sure that is: share of the time spent in the active state, 0 to 0.5. */
  readonly activeShare: number;
  /** Complete pulses: both edges in the capture. */
  readonly complete: readonly Evidence[];
  /** Interruptions and blips shorter than 20 µs that were passed over. */
  readonly glitches: number;
}

/** Edges closer than this are pick-up, not a command. Common practice, no source. */
const GLITCH_S = 20e-6;

/**
 * Pulses between mesial crossings. The active state is the one held for less time, because a coil is charged for a small part
 * of the turn. No edge: null.
 */
export function findPulses(values: Float32Array, axis: TimeAxis, states: StateLevels): Pulses | null {
  const holds = axis.kind === 'uneven' && axis.holds;
  const found = crossings(values, {
    level: states.mesial,
    hysteresis: 0.5 * (states.high - states.low),
    holds,
  });
  const edges: Array<{ readonly at: number; readonly rising: boolean }> = [];
  let glitches = 0;
  for (let k = 0; k < found.count; k += 1) {
    const at = timeAt(axis, found.at[k]!);
    const before = edges[edges.length - 1];
    if (before && at - before.at < GLITCH_S) {
      edges.pop();
      glitches += 1;
    } else edges.push({ at, rising: found.rising[k] === 1 });
  }
  if (edges.length === 0) return null;
  const startS = timeAt(axis, 0);
  const endS = timeAt(axis, values.length - 1);
  let highS = 0;
  edges.forEach((edge, k) => {
    const next = edges[k + 1]?.at ?? endS;
    if (edge.rising) highS += next - edge.at;
    else if (k === 0) highS += edge.at - startS;
  });
  const highShare = endS > startS ? highS / (endS - startS) : 0;
  const activeHigh = highShare <= 0.5;
  const complete = edges.flatMap((edge, k) => {
    const next = edges[k + 1];
    return edge.rising === activeHigh && next && next.rising !== edge.rising
      ? [{ from: edge.at, to: next.at }]
      : [];
  });
  return { activeHigh, activeShare: activeHigh ? highShare : 1 - highShare, complete, glitches };
}
