import type { TimeAxis, Wheel } from '../capture.ts';

/** How a derived signal is made. Signals are named by their file column; a derived one by its own negative number. */
export type Recipe =
  | { readonly kind: 'low-pass'; readonly of: number; readonly cutoffHz: number }
  | { readonly kind: 'moving-mean'; readonly of: number; readonly lengthS: number }
  | { readonly kind: 'derivative'; readonly of: number }
  | { readonly kind: 'integral'; readonly of: number }
  | { readonly kind: 'absolute'; readonly of: number }
  | { readonly kind: 'difference'; readonly of: number; readonly less: number }
  | { readonly kind: 'speed'; readonly of: number };

/** A signal that something is derived from: values with factor and offset applied. */
export interface Source {
  readonly name: string;
  readonly unit: string;
  readonly values: Float32Array;
}

export interface DeriveInput {
  readonly axis: TimeAxis;
  /** By column; undefined where the capture has none. */
  source(column: number): Source | undefined;
  /** The wheel found in a signal; null without one. */
  wheelOf(column: number): Wheel | null;
}

export interface Derived {
  readonly name: string;
  /** UCUM code. */
  readonly unit: string;
  /** Every sample a hole where `reason` says why nothing could be made. */
  readonly values: Float32Array;
  /** How it was made, in words. */
  readonly made: string;
  readonly reason: string | null;
}
