import type { CauseId } from './data/causes.ts';
import { CHECKS, type CheckId } from './data/checks.ts';
import { effectOf } from './effect.ts';
import type { Complaint } from './types.ts';

/** The chance of each finding of a check under one cause, in the order of the findings. */
export type Likelihood = readonly number[];

const tables = new Map<CheckId, Map<CauseId, Likelihood>>();
const tablesOfStalling = new Map<CheckId, Map<CauseId, Likelihood>>();

/** What fits or says nothing counts whole, what does not fit by its factor (shared among the bad findings). Worked out once. */
export function likelihoodOf(check: CheckId, cause: CauseId, complaint: Complaint): Likelihood {
  const byCheck = complaint === 'stall' ? tablesOfStalling : tables;
  let table = byCheck.get(check);
  if (table === undefined) {
    table = new Map();
    byCheck.set(check, table);
  }
  let present = table.get(cause);
  if (present === undefined) {
    present = workOut(check, cause, complaint);
    table.set(cause, present);
  }
  return present;
}

function workOut(check: CheckId, cause: CauseId, complaint: Complaint): Likelihood {
  const findings = Object.entries(CHECKS[check].findings);
  const bad = findings.filter(([, { result }]) => result === 'bad').length;
  const raw = findings.map(([id, { result }]) => {
    const { effect, factor } = effectOf(check, id, cause, complaint);
    return effect === 'against' && result === 'bad' ? factor / Math.max(1, bad) : factor;
  });
  const total = raw.reduce((sum, one) => sum + one, 0);
  return raw.map((one) => (total === 0 ? 0 : one / total));
}
