import { alertsUp } from './alerts-up.ts';
import { codesOf, type NotedCode } from './codes-of.ts';
import { complaintOf } from './complaint-of.ts';
import type { AlertId } from './data/alerts.ts';
import type { Facts } from './facts.ts';
import { type FollowedCause, followCauses } from './follow-causes.ts';
import { type Held, nextChecks, type Proposal, sharesOf } from './next-checks.ts';
import { type Contradiction, type Known, outcomesOf } from './outcomes.ts';
import type { Complaint } from './types.ts';

export interface Reasoned {
  readonly complaint: Complaint;
  /** Whether it was guessed from the customer's words. */
  readonly complaintGuessed: boolean;
  readonly known: Known;
  readonly codes: readonly NotedCode[];
  readonly alerts: ReadonlySet<AlertId>;
  /** Open ones first, heaviest first; then those ruled out. */
  readonly causes: readonly FollowedCause[];
  readonly contradictions: readonly Contradiction[];
  readonly proposals: readonly Proposal[];
  readonly held: readonly Held[];
}

/** From what is known to the causes that remain and the checks left, best first. The same facts give the same answer. */
export function reason(facts: Facts): Reasoned {
  const known = outcomesOf(facts);
  const { complaint, guessed } = complaintOf(known.outcomes.get('complaint'), facts.complaintText);
  const codes = codesOf(facts.records, facts.codes);
  const alerts = alertsUp(known, codes, complaint);
  const followed = followCauses(known, codes, complaint, facts.overrules);
  const contradictions = [...known.contradictions, ...followed.contradictions];
  const { proposals, held } = nextChecks({
    known,
    complaint,
    alerts,
    codes,
    contradictions,
    shares: sharesOf(followed.causes),
  });
  const rank = { shown: 0, possible: 1, 'ruled out': 2 } as const;
  const causes = followed.causes.toSorted((a, b) => rank[a.state] - rank[b.state] || b.share - a.share);
  return {
    complaint,
    complaintGuessed: guessed,
    known,
    codes,
    alerts,
    causes,
    contradictions,
    proposals,
    held,
  };
}
