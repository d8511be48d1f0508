import type { TimeAxis } from '../capture.ts';
import type { Circuit } from '../circuit.ts';

/**
 * A signal ready to be measured: factor and offset are applied, so `values` are in `unit`. NaN is a hole.
 * Every circuit file exports one function `(signal: MeasuredSignal, ...) => Findings`.
 */
export interface MeasuredSignal {
  readonly circuit: Circuit;
  readonly name: string;
  readonly unit: string;
  readonly values: Float32Array;
  readonly axis: TimeAxis;
  /** The input's rails in `unit`, where the file named them. */
  readonly rail: { readonly low: number | null; readonly high: number | null } | null;
}
