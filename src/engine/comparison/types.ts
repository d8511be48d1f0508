import type { TimeAxis, Wheel } from '../capture.ts';
import type { Circuit } from '../circuit.ts';
import type { Value } from '../value.ts';

/** One of the two signals that are compared. `values` have factor and offset applied and are in `unit`. */
export interface Side {
  readonly name: string;
  readonly circuit: Circuit;
  readonly unit: string;
  readonly axis: TimeAxis;
  readonly values: Float32Array;
  readonly wheel: Wheel | null;
  /** The signal's own values and those of relations that it is part of, all by one engine version. */
  readonly measured: readonly Value[];
}

export type AlignedBy = 'reference mark' | 'switch-off' | 'edge' | 'correlation' | 'none';

export interface Alignment {
  readonly by: AlignedBy;
  /** Seconds to add to a time here to reach the same moment there; null when they could not be aligned. */
  readonly shiftS: number | null;
  /** 0 to 1. */
  readonly confidence: number;
  /** What had to be allowed for, in words: another polarity, a probe factor, a missing cam or crank. */
  readonly notes: readonly string[];
  /** How far the reference was moved by hand, on top of what was found. */
  readonly byHand: ByHand | null;
}

/** A shift set by a person: the reference comes so much later on the overlay's axis. */
export interface ByHand {
  readonly shift: number;
  readonly axis: 'deg' | 's';
}

/** How far a cam lies from the reference against the crank, when all of its edges moved alike. */
export interface CamShift {
  readonly deg: number;
  readonly edges: number;
  /** In teeth of the belt or chain, when the crank sprocket's count is known. */
  readonly teeth: number | null;
  readonly sprocketTeeth: number | null;
}

/** What the numbers say to somebody who has to act on them; all four or none. */
export interface Says {
  readonly measured: string;
  readonly usually: string;
  readonly next: string;
  readonly cannotTell: string;
}

export type Verdict = 'inside' | 'outside' | 'undecided';
type Cell = number | string | boolean | null;

export interface Row {
  readonly key: string;
  /** Which of a list of values, from 1; null for a single value. */
  readonly part: number | null;
  readonly unit: string;
  readonly here: Cell;
  readonly reference: Cell;
  readonly low: number | null;
  readonly high: number | null;
  /** References behind the row. */
  readonly n: number;
  readonly verdict: Verdict;
  readonly why: string;
}

/** Traces on equal steps of one axis; null where there is no sample. */
export interface Overlay {
  readonly axis: 'deg' | 's';
  readonly start: number;
  readonly step: number;
  readonly here: readonly (number | null)[];
  readonly reference: readonly (number | null)[];
  /** Lowest and highest of the references; null with fewer than three, and `reference` is then the first of them, else their median. */
  readonly low: readonly (number | null)[] | null;
  readonly high: readonly (number | null)[] | null;
  /** Here less the reference. */
  readonly difference: readonly (number | null)[];
}

export interface ShapePart {
  readonly from: number;
  readonly to: number;
  readonly axis: 'deg' | 's';
  readonly text: string;
}

export interface Shape {
  /** Root mean square of the difference over the reference's span; null when the two could not be laid on each other. */
  readonly difference: number | null;
  readonly parts: readonly ShapePart[];
}

export interface ComparisonFindings {
  readonly alignment: Alignment;
  readonly rows: readonly Row[];
  readonly shape: Shape;
  readonly overlay: Overlay | null;
  readonly camShift: CamShift | null;
  readonly says: Says;
  readonly text: string;
}
