import { ALERT_LIST, type AlertId } from './data/alerts.ts';
import { CHECKS, type CheckId } from './data/checks.ts';
import { type Known, outcomeAt } from './outcomes.ts';
import { parseRef } from './ref.ts';

/**
 * Steps that must come before a check may be proposed, in order; empty: it may be now. Null: something that was found, skipped or
 * cannot be done here forbids it.
 */
export function stepsBefore(
  check: CheckId,
  known: Known,
  alerts: ReadonlySet<AlertId>,
  depth = 0,
): CheckId[] | null {
  if (depth > 6) return null;
  const { first = [], notWhile = [] } = CHECKS[check];
  const steps: CheckId[] = [];
  for (const line of first) {
    if (line.some((ref) => outcomeAt(known.outcomes, ref) !== null)) continue;
    // Only steps that make safe are taken for the sake of another; what else is missing comes when it settles something itself.
    const gate = line.map(checkOf).find((one) => CHECKS[one].safety && isOpen(one, known));
    if (!addChain(steps, gate, known, alerts, depth)) return null;
  }
  for (const alert of notWhile) {
    if (!alerts.has(alert as AlertId)) continue;
    const clearing = ALERT_LIST[alert as AlertId].clearedBy
      .map(checkOf)
      .filter((one) => one !== check && isOpen(one, known));
    const chains = clearing.map((one) => [one, stepsBefore(one, known, alerts, depth + 1)] as const);
    const open =
      chains.find(([, chain]) => chain !== null && chain.length === 0) ??
      chains.find(([, chain]) => chain !== null);
    if (!addChain(steps, open?.[0], known, alerts, depth)) return null;
  }
  return steps;
}

function addChain(
  steps: CheckId[],
  gate: CheckId | undefined,
  known: Known,
  alerts: ReadonlySet<AlertId>,
  depth: number,
): boolean {
  if (gate === undefined) return false;
  const chain = stepsBefore(gate, known, alerts, depth + 1);
  if (chain === null) return false;
  for (const step of [...chain, gate]) if (!steps.includes(step)) steps.push(step);
  return true;
}

const checkOf = (ref: string) => parseRef(ref).check;

/** Not answered, not skipped. What is unclear or contradicted stays open. */
export const isOpen = (check: CheckId, known: Known): boolean =>
  !known.outcomes.has(check) && !known.skipped.has(check);
