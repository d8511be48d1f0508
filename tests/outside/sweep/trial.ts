import type { Findings } from '../../../src/engine/capture.ts';
import type { MeasuredSignal } from '../../../src/engine/circuits/types.ts';
import type { Condition } from './conditions.ts';

/** What a key must say. `value` null: it must be null. `within`: largest difference that counts as right. */
export interface Truth {
  readonly key: string;
  readonly value: number | string | boolean | null | readonly number[];
  readonly within?: number;
  /** A list may begin at any of its places. */
  readonly anyTurn?: boolean;
}

export interface Trial {
  readonly signal: MeasuredSignal;
  readonly findings: Findings;
  readonly truths: readonly Truth[];
  /** Codes of notices that must be there, and that must not. */
  readonly notices?: readonly string[];
  readonly noNotices?: readonly string[];
}

export type TrialOf = (condition: Condition, seed: number) => Trial | null;
