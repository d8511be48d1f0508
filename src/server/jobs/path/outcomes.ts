import { CHECK_IDS, CHECKS, type CheckId } from './data/checks.ts';
import { CONFLICTS } from './data/conflicts.ts';
import type { CheckRecord, Facts, MeasuredReading } from './facts.ts';
import { judgedFinding } from './judged-finding.ts';
import { parseRef } from './ref.ts';

/** Two statements that cannot both be right. Neither counts until one is changed or said to stand. */
export interface Contradiction {
  readonly kind:
    | 'reading against result'
    | 'measured against result'
    | 'measured against measured'
    | 'cannot both be true'
    | 'shown and ruled out'
    | 'nothing left';
  readonly checks: readonly CheckId[];
  readonly text: string;
}

/** What is known of a check. Several findings: one of them, not known which. None: open. */
export interface Outcome {
  readonly check: CheckId;
  readonly findings: readonly string[];
  readonly by: 'result' | 'readings' | 'capture';
  readonly captureIds: readonly string[];
}

export interface Known {
  readonly outcomes: ReadonlyMap<CheckId, Outcome>;
  /** "check:finding" that anything at all has said, also what does not count: enough to raise an alert. */
  readonly said: ReadonlySet<string>;
  readonly contradictions: readonly Contradiction[];
  readonly skipped: ReadonlySet<CheckId>;
  readonly unclear: ReadonlySet<CheckId>;
}

/** From what was recorded and measured to what each check shows, with what does not agree named. */
export function outcomesOf(facts: Facts): Known {
  const outcomes = new Map<CheckId, Outcome>();
  const said = new Set<string>();
  const contradictions: Contradiction[] = [];
  const skipped = new Set<CheckId>();
  const unclear = new Set<CheckId>();
  const records = new Map(facts.records.map((record) => [record.check, record]));
  for (const check of CHECK_IDS) {
    const record = records.get(check);
    const measured = facts.measured.filter((one) => one.check === check);
    if (record?.result === 'skipped') skipped.add(check);
    if (record?.result === 'unclear') unclear.add(check);
    const { outcome, contradiction } = settle(check, record, measured, said);
    if (contradiction !== null) contradictions.push(contradiction);
    if (outcome !== null) outcomes.set(check, outcome);
  }
  suspendConflicting(outcomes, contradictions, records);
  return { outcomes, said, contradictions, skipped, unclear };
}

function settle(
  check: CheckId,
  record: CheckRecord | undefined,
  measured: readonly MeasuredReading[],
  said: Set<string>,
): { outcome: Outcome | null; contradiction: Contradiction | null } {
  const { title, findings } = CHECKS[check];
  const resultOf = (finding: string) => findings[finding]?.result;
  const typed = typedFindings(check, record);
  const read = record === undefined ? null : judgedFinding(check, record.readings);
  const seen = [...new Set(measured.flatMap(({ finding }) => (finding === null ? [] : [finding])))];
  const captureIds = [...new Set(measured.filter((one) => one.finding !== null).map((one) => one.captureId))];
  // Of a vague "bad" nothing definite was said, but any of its dangers may be meant.
  for (const finding of [...typed, ...(read === null ? [] : [read]), ...seen])
    said.add(`${check}:${finding}`);
  const open = (contradiction: Contradiction | null) => ({ outcome: null, contradiction });
  const disagree = (kind: Contradiction['kind'], text: string) =>
    open({ kind, checks: [check], text: `${title}: ${text}` });
  const stands = (record?.stands ?? '') !== '';
  if (typed.length > 0) {
    if (!stands && read !== null && !typed.includes(read)) {
      return disagree(
        'reading against result',
        `the reading shows "${findings[read]?.says}", the result says "${wordsOf(check, typed)}".`,
      );
    }
    const against = seen.find((one) => !typed.includes(one));
    if (!stands && against !== undefined) {
      return disagree(
        'measured against result',
        `a capture shows "${findings[against]?.says}", the result says "${wordsOf(check, typed)}".`,
      );
    }
    const sharper = typed.length > 1 ? (read ?? seen.find((one) => typed.includes(one)) ?? null) : null;
    return {
      outcome: { check, findings: sharper === null ? typed : [sharper], by: 'result', captureIds },
      contradiction: null,
    };
  }
  // "Unclear" and "skipped" are a person's word: numbers do not overrule it.
  if (record !== undefined && (record.result === 'unclear' || record.result === 'skipped')) return open(null);
  if (seen.length > 1) {
    return disagree(
      'measured against measured',
      `captures disagree: ${seen.map((one) => `"${findings[one]?.says}"`).join(' and ')}.`,
    );
  }
  const [only] = seen;
  if (only === undefined || resultOf(only) === undefined) return open(null);
  return { outcome: { check, findings: [only], by: 'capture', captureIds }, contradiction: null };
}

/** The findings that a result leaves: the one named, or all of that result. */
function typedFindings(check: CheckId, record: CheckRecord | undefined): string[] {
  if (record === undefined || record.result === 'unclear' || record.result === 'skipped') return [];
  const { findings } = CHECKS[check];
  if (record.finding !== null && findings[record.finding]?.result === record.result) return [record.finding];
  return Object.keys(findings).filter((finding) => findings[finding]?.result === record.result);
}

export const wordsOf = (check: CheckId, findings: readonly string[]): string =>
  findings.map((finding) => CHECKS[check].findings[finding]?.says ?? finding).join(' or ');

function suspendConflicting(
  outcomes: Map<CheckId, Outcome>,
  contradictions: Contradiction[],
  records: ReadonlyMap<CheckId, CheckRecord>,
): void {
  const suspended = new Set<CheckId>();
  for (const { one, other, why } of CONFLICTS) {
    const [a, b] = [outcomeAt(outcomes, one), outcomeAt(outcomes, other)];
    if (a === null || b === null) continue;
    const [aStands, bStands] = [a, b].map(({ check }) => (records.get(check)?.stands ?? '') !== '');
    if (aStands && bStands) continue;
    if (!aStands) suspended.add(a.check);
    if (!bStands) suspended.add(b.check);
    if (aStands || bStands) continue;
    contradictions.push({
      kind: 'cannot both be true',
      checks: [a.check, b.check],
      text: `${CHECKS[a.check].title}: "${wordsOf(a.check, a.findings)}", but ${CHECKS[b.check].title}: "${wordsOf(b.check, b.findings)}". ${why}`,
    });
  }
  for (const check of suspended) outcomes.delete(check);
}

/** The outcome when it is exactly this finding. */
export function outcomeAt(outcomes: ReadonlyMap<CheckId, Outcome>, ref: string): Outcome | null {
  const { check, finding } = parseRef(ref);
  const outcome = outcomes.get(check);
  return outcome?.findings.length === 1 && outcome.findings[0] === finding ? outcome : null;
}
