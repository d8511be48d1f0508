import type { Circuit } from './circuit.ts';
import type { Notice, Value } from './value.ts';

/**
 * When the samples were taken, in seconds.
 * - `even`: sample i at `startS + i * stepS` (doubles, never float32).
 * - `uneven`: a float64 column, never falling. `holds` true: changes only, each value holds until the next row.
 */
export type TimeAxis =
  | { readonly kind: 'even'; readonly startS: number; readonly stepS: number; readonly count: number }
  | { readonly kind: 'uneven'; readonly timesS: Float64Array; readonly holds: boolean };

/** One column as recorded. NaN is a hole and means only that. `factor` and `offset` apply on reading: v = sample * factor + offset. */
export interface SignalInput {
  readonly index: number;
  readonly name: string;
  readonly circuit: Circuit;
  /** UCUM code of the value after factor and offset. */
  readonly unit: string;
  readonly factor: number;
  readonly offset: number;
  readonly samples: Float32Array;
  /** The input's rail in recorded units where the file named it (over-range words); samples at the rail are clipped. */
  readonly rail?: { readonly low: number | null; readonly high: number | null };
}

export interface CaptureInput {
  readonly axis: TimeAxis;
  readonly signals: readonly SignalInput[];
  readonly cylinders: number | null;
}

/** What one circuit's measuring gives: values and notices of that signal. */
export interface Findings {
  readonly values: readonly Value[];
  readonly notices: readonly Notice[];
}

export interface SignalFindings extends Findings {
  readonly index: number;
  readonly circuit: Circuit;
}

export interface RelationFindings extends Findings {
  readonly signals: readonly number[];
}

/**
 * The trigger wheel as found in one crank signal: what turns seconds into crank degrees.
 * `marksS` are the reference marks (first tooth event after the gap that makes the pattern unique).
 * `teethS[i]` is a tooth event and `teethDeg[i]` its angle, unwrapped: 360 * turn + angle in the turn, 0 at the first mark;
 * events before the first mark have negative angles. Strictly rising in both.
 */
export interface Wheel {
  readonly signal: number;
  readonly pattern: string;
  /** Equal places round the wheel, missing ones included; null for added-tooth and uneven wheels. */
  readonly places: number | null;
  readonly teethPerTurn: number;
  readonly marksS: readonly number[];
  readonly teethS: readonly number[];
  readonly teethDeg: readonly number[];
  /** Mean swing of each tooth of a turn (two-wire), tooth 1 first; null for three-wire. */
  readonly toothHeights: readonly number[] | null;
  /** Mean angle of each tooth in the turn, degrees, tooth 1 at 0. */
  readonly toothAnglesDeg: readonly number[];
}

export interface CaptureFindings {
  readonly engine: string;
  readonly signals: readonly SignalFindings[];
  readonly relations: readonly RelationFindings[];
  /** The wheel that the capture's degree scale uses: that of the first crank signal in which one was found. */
  readonly wheel: Wheel | null;
}
