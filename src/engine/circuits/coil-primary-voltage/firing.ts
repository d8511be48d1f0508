import type { TimeAxis } from '../../capture.ts';
import type { OnPeriod } from '../switched-load/on-periods.ts';
import type { LoadStates } from '../switched-load/states.ts';

/** The trace as every piece of a firing needs it. */
export interface CoilTrace {
  readonly values: Float32Array;
  readonly axis: TimeAxis;
  readonly states: LoadStates & { readonly on: number };
}

/** Kick after a switch-off. Indices are fractional sample indices. */
export interface Kick {
  readonly peak: number;
  readonly at: number;
  /** First and last sample of the kick above half its height over the feed. */
  readonly from: number;
  readonly to: number;
  /** Samples in that range; few of them can miss the top. */
  readonly samples: number;
  /** The top is flat: most of the upper half lies within 2 % of the peak, for at least four samples and 16 µs. */
  readonly flat: boolean;
  /** Highest point may lie above what was recorded: at the input's rail, or too few samples. */
  readonly clipped: boolean;
}

export interface Burn {
  readonly start: number;
  /** null: the capture ends before the collapse. */
  readonly end: number | null;
  readonly level: number;
}

/** One switch-off with what follows it up to the next time the driver is on, or the end of the capture. */
export interface Firing {
  readonly on: OnPeriod & { readonly end: number };
  /** First sample that belongs to the next driver-on time, or the number of samples. */
  readonly until: number;
  readonly kick: Kick | null;
  readonly burn: Burn | null;
  /** Local extremes after the burn; null when the capture ends before the ring does. */
  readonly rings: number | null;
  /** Index at which the firing is over and the trace rests again. */
  readonly over: number;
}
