import { CAUSES, type CauseId } from './data/causes.ts';
import { CHECKS, type CheckId } from './data/checks.ts';
import { effectOf } from './effect.ts';
import { type Known, outcomeAt } from './outcomes.ts';
import type { Complaint, FindingRef } from './types.ts';

/** Chosen for this program: proving the cause outright is worth as much as halving the doubt twice. */
const PROOF_BITS = 2;

export interface Gain {
  /** Expected halvings of the doubt, with what it adds to a proof. */
  readonly bits: number;
  /** How likely each finding is, by the weights. */
  readonly likely: Readonly<Record<string, number>>;
}

export type Shares = ReadonlyMap<CauseId, number>;

/** How much a check is expected to settle: the fall of the entropy of the causes' shares, plus its part in proofs. */
export function gainOf(check: CheckId, shares: Shares, known: Known, complaint: Complaint): Gain {
  const ids = Object.keys(CHECKS[check].findings);
  const likelihoods = new Map(
    [...shares.keys()].map((cause) => [cause, likelihood(check, ids, cause, complaint)]),
  );
  const likely: Record<string, number> = {};
  let left = 0;
  for (const finding of ids) {
    const joint = [...shares].map(([cause, share]) => share * (likelihoods.get(cause)?.[finding] ?? 0));
    const total = joint.reduce((sum, one) => sum + one, 0);
    likely[finding] = total;
    if (total > 0) left += total * entropy(joint.map((one) => one / total));
  }
  let proof = 0;
  for (const [cause, share] of shares) {
    proof +=
      share *
      Math.max(
        0,
        ...CAUSES[cause].proof.map((line) => partOf(line, check, known, likelihoods.get(cause) ?? {})),
      );
  }
  const seen = Math.max(0, entropy([...shares.values()]) - left);
  return { bits: seen + PROOF_BITS * proof + (CHECKS[check].pointsBits ?? 0), likely };
}

/** What a check adds to one proof: the chance of the finding it needs, over the findings still missing; 0 when the proof is off. */
function partOf(
  line: readonly FindingRef[],
  check: CheckId,
  known: Known,
  likely: Readonly<Record<string, number>>,
): number {
  const missing = line.filter((ref) => outcomeAt(known.outcomes, ref) === null);
  if (
    missing.some(
      (ref) =>
        known.outcomes.has(ref.split(':')[0] as CheckId) || known.skipped.has(ref.split(':')[0] as CheckId),
    )
  )
    return 0;
  const mine = missing.find((ref) => ref.startsWith(`${check}:`));
  return mine === undefined ? 0 : (likely[mine.split(':')[1] ?? ''] ?? 0) / missing.length;
}

/** The chance of each finding under a cause: what fits or says nothing counts whole, what does not fit by its factor. */
function likelihood(
  check: CheckId,
  ids: readonly string[],
  cause: CauseId,
  complaint: Complaint,
): Record<string, number> {
  const bad = ids.filter((id) => CHECKS[check].findings[id]?.result === 'bad').length;
  const raw = ids.map((id) => {
    const { effect, factor } = effectOf(check, id, cause, complaint);
    return effect === 'against' && CHECKS[check].findings[id]?.result === 'bad'
      ? factor / Math.max(1, bad)
      : factor;
  });
  const total = raw.reduce((sum, one) => sum + one, 0);
  return Object.fromEntries(ids.map((id, index) => [id, total === 0 ? 0 : (raw[index] ?? 0) / total]));
}

const entropy = (shares: readonly number[]): number => {
  const total = shares.reduce((sum, one) => sum + one, 0);
  if (total === 0) return 0;
  return -shares.reduce((sum, one) => (one > 0 ? sum + (one / total) * Math.log2(one / total) : sum), 0);
};
