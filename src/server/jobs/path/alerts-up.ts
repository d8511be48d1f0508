import type { NotedCode } from './codes-of.ts';
import { ALERT_LIST, type AlertId } from './data/alerts.ts';
import { type Known, outcomeAt } from './outcomes.ts';
import type { Complaint } from './types.ts';

/**
 * The dangers that stop checks now. Anything that was said or measured raises one, also what is contradicted; only a result that
 * counts takes it away.
 */
export function alertsUp(
  known: Known,
  codes: readonly NotedCode[],
  complaint: Complaint,
): ReadonlySet<AlertId> {
  const up = new Set<AlertId>();
  for (const [id, alert] of Object.entries(ALERT_LIST) as [AlertId, (typeof ALERT_LIST)[AlertId]][]) {
    const raised =
      alert.raisedBy.some((ref) => known.said.has(ref)) ||
      codes.some(({ code }) => alert.raisedByCodes?.includes(code)) ||
      alert.raisedByComplaint?.includes(complaint);
    const cleared = alert.clearedBy.some((ref) => outcomeAt(known.outcomes, ref) !== null);
    if (raised && !cleared) up.add(id);
  }
  return up;
}
