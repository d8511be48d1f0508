/** Shapes of what the engine says. Units are UCUM codes (`V`, `A`, `ms`, `deg`, `1` …) or the trade's `rpm`. */

/** A stretch of the capture's own time axis, in seconds. */
export interface Evidence {
  readonly from: number;
  readonly to: number;
}

/** A tooth that differs from its neighbours in at least 80 % of turns; tooth 1 is the reference mark. */
export interface IrregularTooth {
  readonly tooth: number;
  readonly height_ratio: number | null;
  readonly spacing_ratio: number | null;
}

export type Measured = number | string | boolean | readonly (number | null)[] | readonly IrregularTooth[];

/**
 * One measured quantity with the samples behind it. `value` is null exactly when `reason` is there.
 * Where `value` is a list, `min`, `max` and `sd` are lists in the same order.
 */
export interface Value {
  readonly key: string;
  readonly value: Measured | null;
  readonly unit: string;
  readonly n?: number;
  readonly min?: number | readonly number[];
  readonly max?: number | readonly number[];
  readonly sd?: number | readonly number[];
  readonly reason?: string;
  readonly evidence: readonly Evidence[];
}

export type Severity = 'info' | 'watch' | 'bad';

/** What a reader should know beside the numbers: what it usually means and what it cannot tell. `code` is kebab-case. */
export interface Notice {
  readonly code: string;
  readonly severity: Severity;
  readonly text: string;
  readonly evidence: readonly Evidence[];
}

/** A value that cannot be had, with the reason in words a technician understands. */
export function absent(key: string, unit: string, reason: string, evidence: readonly Evidence[] = []): Value {
  return { key, value: null, unit, reason, evidence };
}
