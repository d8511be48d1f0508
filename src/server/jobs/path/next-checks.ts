import type { NotedCode } from './codes-of.ts';
import { costOf } from './cost-of.ts';
import type { AlertId } from './data/alerts.ts';
import type { CauseId } from './data/causes.ts';
import { CHECK_IDS, CHECKS, type CheckId } from './data/checks.ts';
import { gainOf, type Shares } from './gain.ts';
import type { Contradiction, Known } from './outcomes.ts';
import type { Complaint } from './types.ts';
import { isOpen, stepsBefore } from './unlock.ts';

export interface Proposal {
  readonly check: CheckId;
  /** Halvings of the doubt for a minute of cost: the order of the list. */
  readonly score: number;
  readonly bits: number;
  readonly likely: Readonly<Record<string, number>>;
  /** The check that this step makes safe, when it is proposed for its sake. */
  readonly before: CheckId | null;
  /** Codes that point at it. */
  readonly codes: readonly string[];
  /** Recorded as unclear, or contradicted: worth taking again. */
  readonly again: 'unclear' | 'contradicted' | null;
}

/** Held back for safety: it would settle something and may not be taken now. */
export interface Held {
  readonly check: CheckId;
  readonly alerts: readonly AlertId[];
  readonly hybrid: boolean;
}

/** Chosen for this program: less than this settles nothing worth the time (halvings of the doubt). */
const LEAST_BITS = 0.005;

export interface Situation {
  readonly known: Known;
  readonly complaint: Complaint;
  readonly alerts: ReadonlySet<AlertId>;
  readonly codes: readonly NotedCode[];
  readonly contradictions: readonly Contradiction[];
  readonly shares: Shares;
}

/** The checks left, best first: most settled for least cost and risk, and never before its safety conditions. Ties: the trade's order. */
export function nextChecks(situation: Situation): { proposals: Proposal[]; held: Held[] } {
  const { known, complaint, alerts } = situation;
  const best = new Map<CheckId, Proposal>();
  const held: Held[] = [];
  const offer = (proposal: Proposal) => {
    const present = best.get(proposal.check);
    if (present === undefined || proposal.score > present.score) best.set(proposal.check, proposal);
  };
  for (const check of CHECK_IDS) {
    const { safety, complaints } = CHECKS[check];
    if (safety || !isOpen(check, known) || (complaints !== undefined && !complaints.includes(complaint)))
      continue;
    const { bits, likely } = gainOf(check, situation.shares, known, complaint);
    if (bits < LEAST_BITS) continue;
    const steps = stepsBefore(check, known, alerts);
    if (steps === null) {
      const hold = heldBack(check, situation);
      if (hold !== null) held.push(hold);
      continue;
    }
    const pointed = situation.codes
      .filter((code) => code.known?.checks.includes(check))
      .map(({ code }) => code);
    const cost = [...steps, check].reduce((sum, one) => sum + costOf(one), 0);
    const common = { score: bits / cost, bits, codes: pointed };
    const [gate] = steps;
    if (gate === undefined)
      offer({ ...common, check, likely, before: null, again: againOf(check, situation) });
    else offer({ ...common, check: gate, likely: {}, before: check, again: againOf(gate, situation) });
  }
  const order = new Map(CHECK_IDS.map((check, index) => [check, index]));
  const proposals = [...best.values()].sort(
    (a, b) => b.score - a.score || (order.get(a.check) ?? 0) - (order.get(b.check) ?? 0),
  );
  return { proposals, held };
}

function againOf(check: CheckId, { known, contradictions }: Situation): Proposal['again'] {
  if (contradictions.some(({ checks }) => checks.includes(check))) return 'contradicted';
  return known.unclear.has(check) ? 'unclear' : null;
}

/** Why a check may not be taken; null when it only waits for a result that comes later. */
function heldBack(check: CheckId, { known, alerts }: Situation): Held | null {
  const { notWhile = [], cranks } = CHECKS[check];
  const stopping = notWhile.filter((alert) => alerts.has(alert as AlertId)) as AlertId[];
  const hybrid =
    cranks === true && (known.said.has('high-voltage:hybrid') || known.skipped.has('high-voltage'));
  return stopping.length > 0 || hybrid ? { check, alerts: stopping, hybrid } : null;
}

/** Shares of the causes that are open, as a map for the gain. */
export const sharesOf = (causes: readonly { cause: CauseId; state: string; share: number }[]): Shares =>
  new Map(causes.filter(({ state }) => state !== 'ruled out').map(({ cause, share }) => [cause, share]));
