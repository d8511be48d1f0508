import type { CauseId } from './data/causes.ts';
import type { CautionId } from './data/cautions.ts';

/** What the engine does. Each has its own causes; `cranks-no-start` is the main one. */
export const COMPLAINTS = ['cranks-no-start', 'slow-crank', 'misfire', 'stall'] as const;
export type Complaint = (typeof COMPLAINTS)[number];

export const RESULTS = ['good', 'bad', 'unclear', 'skipped'] as const;
export type Result = (typeof RESULTS)[number];

/** Where a number or a rule comes from. `practice`: common practice, no source. `memory`: recalled, not looked up. */
export type SourceKind = 'published' | 'arithmetic' | 'practice' | 'memory' | 'maker';
export interface Source {
  readonly kind: SourceKind;
  readonly text: string;
}

/** A value to judge a reading by. `low` and `high` in the reading's own unit. */
export interface Expected {
  readonly text: string;
  readonly low?: number;
  readonly high?: number;
  readonly source: Source;
}

/** A stretch of values that decides what was found; outside every stretch the person judges. */
export interface Band {
  readonly from?: number;
  readonly to?: number;
  readonly finding: string;
}

export interface ReadingSpec {
  readonly what: string;
  readonly unit: string;
  readonly expected?: Expected;
  readonly bands?: readonly Band[];
}

/** One thing that a check can show. `fits`: causes under which it is what one expects to see. */
export interface Finding {
  readonly result: 'good' | 'bad';
  readonly says: string;
  readonly fits?: readonly CauseId[];
  readonly rulesOut?: readonly CauseId[];
}

/** "check:finding" */
export type FindingRef = `${string}:${string}`;

export interface Check {
  readonly title: string;
  readonly question: string;
  readonly how: string;
  readonly stage: Stage;
  readonly needs: readonly string[];
  readonly minutes: number;
  /** 0 none, 1 some, 2 raised, 3 high: to people first, then to the vehicle. */
  readonly risk: 0 | 1 | 2 | 3;
  readonly cranks?: true;
  /** A step that makes another one safe; it settles no cause by itself. */
  readonly safety?: true;
  /** Only a hint: what does not fit is set back less. */
  readonly hint?: true;
  /** Halvings of the doubt that the table cannot see, as what trouble codes point at (chosen for this program). */
  readonly pointsBits?: number;
  /** Shows the moment only: of a fault that comes and goes a good result rules nothing out. */
  readonly momentary?: true;
  readonly complaints?: readonly Complaint[];
  readonly readings: Readonly<Record<string, ReadingSpec>>;
  readonly findings: Readonly<Record<string, Finding>>;
  readonly cautions: readonly CautionId[];
  /** Each line must hold before the check is proposed: one of its findings has been recorded. */
  readonly first?: readonly (readonly FindingRef[])[];
  /** Alerts during which it is not proposed. */
  readonly notWhile?: readonly string[];
  /** Where the method or its limits come from. */
  readonly source: Source;
}

export const STAGES = ['before', 'spark', 'signals', 'fuel', 'compression', 'air', 'running'] as const;
export type Stage = (typeof STAGES)[number];

export interface Cause {
  readonly name: string;
  readonly part: string;
  readonly because: string;
  /** How often it is met, 1 rare to 5 common, by complaint (common practice, no source). Absent: not a cause of it. */
  readonly weight: Readonly<Partial<Record<Complaint, number>>>;
  /** Each line proves it: all of its findings together. */
  readonly proof: readonly (readonly FindingRef[])[];
  readonly prove: string;
}

/** A danger that some finding raises and another takes away. */
export interface Alert {
  readonly text: string;
  readonly raisedBy: readonly FindingRef[];
  readonly raisedByCodes?: readonly string[];
  readonly raisedByComplaint?: readonly Complaint[];
  readonly clearedBy: readonly FindingRef[];
}

/** Two findings that cannot both be true of one engine at one time. */
export interface Conflict {
  readonly one: FindingRef;
  readonly other: FindingRef;
  readonly why: string;
}

export interface Code {
  readonly title: string;
  readonly synonyms?: readonly string[];
  readonly titleFrom: 'named' | 'listing' | 'memory';
  readonly causes: readonly CauseId[];
  readonly checks: readonly string[];
}
