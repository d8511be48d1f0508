import type { NotedCode } from './codes-of.ts';
import { CAUSE_IDS, CAUSES, type CauseId } from './data/causes.ts';
import { CHECKS, type CheckId } from './data/checks.ts';
import { effectOfAny } from './effect.ts';
import type { Overrule } from './facts.ts';
import { type Contradiction, type Known, outcomeAt, wordsOf } from './outcomes.ts';
import { parseRef } from './ref.ts';
import type { Complaint } from './types.ts';

export interface Because {
  readonly effect: 'rules out' | 'against' | 'fits' | 'shows' | 'code' | 'put back' | 'set aside';
  readonly check: CheckId | null;
  readonly text: string;
}

export interface FollowedCause {
  readonly cause: CauseId;
  readonly state: 'possible' | 'ruled out' | 'shown';
  /** Share of the weight of all causes that are still open, 0 to 1; 0 when ruled out. */
  readonly share: number;
  readonly because: readonly Because[];
}

/** Chosen for this program: a code that points at a cause triples its weight. It proves nothing. */
const POINTED = 3;

/**
 * Set elimination with weights. Each cause begins with how often it is met, loses by what does not fit, goes by what rules it out, and is
 * shown when all findings of one of its proofs are there. A person's word comes last and wins, and is named.
 */
export function followCauses(
  known: Known,
  codes: readonly NotedCode[],
  complaint: Complaint,
  overrules: readonly Overrule[],
): { causes: FollowedCause[]; contradictions: Contradiction[] } {
  const contradictions: Contradiction[] = [];
  const weighed = CAUSE_IDS.filter((cause) => (CAUSES[cause].weight[complaint] ?? 0) > 0).map((cause) => {
    const because: Because[] = [];
    let weight = CAUSES[cause].weight[complaint] ?? 0;
    let out = false;
    for (const { check, findings } of known.outcomes.values()) {
      if (CHECKS[check].safety) continue;
      const { effect, factor } = effectOfAny(check, findings, cause, complaint);
      weight *= factor === 0 ? 1 : factor;
      out ||= effect === 'rules out';
      if (effect !== 'neutral')
        because.push({ effect, check, text: `${CHECKS[check].title}: ${wordsOf(check, findings)}` });
    }
    for (const { code, known: entry } of codes) {
      if (!entry?.causes.includes(cause)) continue;
      weight *= POINTED;
      because.push({ effect: 'code', check: 'codes', text: `${code} points here: ${entry.title}` });
    }
    const proof = CAUSES[cause].proof.find((line) =>
      line.every((ref) => outcomeAt(known.outcomes, ref) !== null),
    );
    let state: FollowedCause['state'] = out ? 'ruled out' : proof === undefined ? 'possible' : 'shown';
    if (proof !== undefined) {
      const checks = proof.map((ref) => parseRef(ref).check);
      because.push({ effect: 'shows', check: checks[0] ?? null, text: CAUSES[cause].prove });
      if (out) {
        const against = because.filter(({ effect }) => effect === 'rules out');
        contradictions.push({
          kind: 'shown and ruled out',
          checks: [...checks, ...against.flatMap(({ check }) => (check === null ? [] : [check]))],
          text: `${CAUSES[cause].name} is shown by one result and ruled out by another: ${against.map(({ text }) => text).join('; ')}.`,
        });
        state = 'possible';
      }
    }
    const word = overrules.findLast((one) => one.cause === cause);
    if (word !== undefined) {
      because.push({ effect: word.decision, check: null, text: `${word.by}: ${word.why}` });
      if (word.decision === 'set aside') state = 'ruled out';
      else if (state === 'ruled out') state = 'possible';
    }
    return { cause, state, weight, because };
  });
  const total = weighed.reduce((sum, { state, weight }) => sum + (state === 'ruled out' ? 0 : weight), 0);
  if (total === 0) contradictions.push(nothingLeft(known));
  const causes = weighed.map(({ cause, state, weight, because }) => ({
    cause,
    state,
    share: state === 'ruled out' || total === 0 ? 0 : weight / total,
    because,
  }));
  return { causes, contradictions };
}

function nothingLeft(known: Known): Contradiction {
  return {
    kind: 'nothing left',
    checks: [...known.outcomes.keys()].filter((check) => !CHECKS[check].safety),
    text: 'Every cause is ruled out: a result is wrong, or the cause is not in the list. Take the doubtful check again, or put a cause back.',
  };
}
