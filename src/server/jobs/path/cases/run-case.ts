import { costOf } from '../cost-of.ts';
import type { CauseId } from '../data/causes.ts';
import { CHECKS, type CheckId } from '../data/checks.ts';
import type { CheckRecord, Facts, TypedReading } from '../facts.ts';
import { type Reasoned, reason } from '../reason.ts';

/** What a vehicle answers when a check is asked of it. */
export interface Answer {
  /** Of the check's findings; absent: unclear, or judged from the readings alone. */
  readonly finding?: string;
  readonly readings?: readonly TypedReading[];
  readonly codes?: readonly string[];
  /** The words of whoever wrote the case. */
  readonly words?: string;
}

export interface TradeCase {
  readonly name: string;
  readonly complaint: string;
  readonly cause: CauseId;
  readonly answers: Readonly<Partial<Record<CheckId, Answer>>>;
  /** `good`: what is not listed reads good. `nothing`: what is not listed is not known and is skipped. */
  readonly others: 'good' | 'nothing';
}

export interface CaseEnd {
  readonly shown: CauseId | null;
  /** The cause with the largest share at the end. */
  readonly leading: CauseId | null;
  readonly share: number;
  readonly minutes: number;
  readonly asked: readonly CheckId[];
  readonly contradictions: readonly string[];
}

/** Steps that make safe are done, and unremarkable, when they are asked for and the case has nothing to say about them. */
const DONE: Readonly<Partial<Record<CheckId, string>>> = {
  'high-voltage': 'none',
  'fuel-leak': 'dry',
  'fluid-allowed': 'yes',
  'pressure-relieved': 'done',
  'turn-by-hand': 'free',
};

export type Choose = (reasoned: Reasoned) => CheckId | null;
export const bestFirst: Choose = ({ proposals }) => proposals[0]?.check ?? null;

/** Plays a case: asks check after check and reveals the answer to each, until a cause is shown or nothing is left to ask. */
export function runCase(one: TradeCase, choose: Choose = bestFirst): CaseEnd {
  const records: CheckRecord[] = [];
  const unanswered = new Set<CheckId>();
  let minutes = 0;
  for (let step = 0; step < 90; step++) {
    const facts: Facts = { complaintText: one.complaint, records, codes: [], measured: [], overrules: [] };
    const reasoned = reason(facts);
    const shown = reasoned.causes.filter(({ state }) => state === 'shown');
    const [leading] = reasoned.causes;
    const check = shown.length > 0 ? null : choose(reasoned);
    if (check === null) {
      return {
        shown: shown.length === 1 ? (shown[0]?.cause ?? null) : null,
        leading: leading?.state === 'ruled out' ? null : (leading?.cause ?? null),
        share: leading?.share ?? 0,
        minutes,
        asked: records.map((record) => record.check),
        contradictions: reasoned.contradictions.map(({ text }) => text),
      };
    }
    const record = answerOf(one, check);
    if (record.result === 'skipped') unanswered.add(check);
    else minutes += costOf(check);
    const at = records.findIndex((present) => present.check === check);
    // Asked again of the same vehicle: it says the same; then it is left as it is.
    if (at >= 0) records[at] = { ...record, result: 'skipped', finding: null };
    else records.push(record);
  }
  throw new Error(`${one.name}: does not end`);
}

function answerOf(one: TradeCase, check: CheckId): CheckRecord {
  const { findings } = CHECKS[check];
  const listed = one.answers[check];
  const other =
    one.others === 'good' ? Object.keys(findings).find((id) => findings[id]?.result === 'good') : undefined;
  const finding = listed === undefined ? (DONE[check] ?? other) : listed.finding;
  const result =
    finding === undefined ? (listed === undefined ? 'skipped' : 'unclear') : findings[finding]?.result;
  if (result === undefined) throw new Error(`${one.name}: ${check} has no finding ${finding}`);
  return {
    check,
    result,
    finding: finding ?? null,
    readings: listed?.readings ?? [],
    codes: listed?.codes ?? [],
    stands: '',
  };
}
