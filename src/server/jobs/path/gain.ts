import { CAUSES, type CauseId } from './data/causes.ts';
import { CHECKS, type CheckId } from './data/checks.ts';
import { type Likelihood, likelihoodOf } from './likelihood.ts';
import { type Known, outcomeAt } from './outcomes.ts';
import { parseRef } from './ref.ts';
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
  const likely: Record<string, number> = {};
  const rows = [...shares].map(([cause, share]) => ({ share, row: likelihoodOf(check, cause, complaint) }));
  let left = 0;
  ids.forEach((id, index) => {
    let total = 0;
    let weighed = 0;
    for (const { share, row } of rows) {
      const joint = share * (row[index] ?? 0);
      total += joint;
      if (joint > 0) weighed += joint * Math.log2(joint);
    }
    likely[id] = total;
    // total times the entropy of joint / total
    if (total > 0) left += total * Math.log2(total) - weighed;
  });
  let before = 0;
  for (const { share } of rows) if (share > 0) before -= share * Math.log2(share);
  const seen = Math.max(0, before - left);
  return {
    bits:
      seen + PROOF_BITS * proofPart(check, ids, shares, known, complaint) + (CHECKS[check].pointsBits ?? 0),
    likely,
  };
}

/** The chance that the check brings a proof to its end, each proof by the findings it still misses. */
function proofPart(
  check: CheckId,
  ids: readonly string[],
  shares: Shares,
  known: Known,
  complaint: Complaint,
): number {
  let sum = 0;
  for (const [cause, share] of shares) {
    let best = 0;
    for (const line of CAUSES[cause].proof) {
      if (!line.some((ref) => parseRef(ref).check === check)) continue;
      best = Math.max(best, partOf(line, check, ids, known, likelihoodOf(check, cause, complaint)));
    }
    sum += share * best;
  }
  return sum;
}

/** What a check adds to one proof: the chance of the finding it needs, over the findings still missing; 0 when the proof is off. */
function partOf(
  line: readonly FindingRef[],
  check: CheckId,
  ids: readonly string[],
  known: Known,
  row: Likelihood,
): number {
  const missing = line.filter((ref) => outcomeAt(known.outcomes, ref) === null).map(parseRef);
  if (missing.some((ref) => known.outcomes.has(ref.check) || known.skipped.has(ref.check))) return 0;
  const mine = missing.find((ref) => ref.check === check);
  return mine === undefined ? 0 : (row[ids.indexOf(mine.finding)] ?? 0) / missing.length;
}
