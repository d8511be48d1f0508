import type { Placed } from './places.ts';

/** A gap or a tooth too many, on the place of the tooth before it. */
export interface Feature {
  readonly place: number;
  readonly size: number;
  /** Kept event after the feature. */
  readonly event: number;
}

export interface Laid {
  readonly placed: Placed;
  /** Place of every kept event. */
  readonly place: Int32Array;
  readonly features: readonly Feature[];
}
