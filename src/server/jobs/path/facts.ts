import type { CauseId } from './data/causes.ts';
import type { CheckId } from './data/checks.ts';
import type { Result } from './types.ts';

/** A number somebody read from a gauge or meter. `what`: a reading of the check, or words of one's own, kept and not judged. */
export interface TypedReading {
  readonly what: string;
  readonly value: number;
  readonly unit: string;
}

/** What somebody recorded for a check. */
export interface CheckRecord {
  readonly check: CheckId;
  readonly result: Result;
  /** Which of the check's findings, when it was said. */
  readonly finding: string | null;
  readonly readings: readonly TypedReading[];
  readonly codes: readonly string[];
  /** Why this stands although something speaks against it; empty: it does not claim to. */
  readonly stands: string;
}

/** A value that a linked capture gives to a check by itself. */
export interface MeasuredReading {
  readonly check: CheckId;
  readonly reading: string;
  readonly value: number;
  readonly unit: string;
  readonly captureId: string;
  /** Signal and key it was measured as, in words. */
  readonly from: string;
  /** What it shows; null: the person judges. */
  readonly finding: string | null;
  /** What it cannot tell. */
  readonly remark: string | null;
}

/** A person's word over the reasoning. */
export interface Overrule {
  readonly cause: CauseId;
  readonly decision: 'put back' | 'set aside';
  readonly why: string;
  readonly by: string;
}

export interface Facts {
  /** The complaint in the customer's words; used only while the check "complaint" is open. */
  readonly complaintText: string;
  /** In the order in which they were recorded. */
  readonly records: readonly CheckRecord[];
  /** Codes noted with the job itself. */
  readonly codes: readonly string[];
  readonly measured: readonly MeasuredReading[];
  readonly overrules: readonly Overrule[];
}

export const noFacts: Facts = { complaintText: '', records: [], codes: [], measured: [], overrules: [] };
