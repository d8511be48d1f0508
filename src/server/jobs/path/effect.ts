import type { CauseId } from './data/causes.ts';
import { CHECKS, type CheckId } from './data/checks.ts';
import type { Complaint } from './types.ts';

/**
 * What a finding says of a cause. `fits`: expected under it. `neutral`: says nothing. `against`: not expected, the cause stays open with
 * less weight. `rules out`: cannot be.
 */
export type Effect = 'rules out' | 'against' | 'neutral' | 'fits';

/** Chosen for this program: a finding that does not fit divides a cause's weight by ten, a mere hint by two and a half. */
const AGAINST = 0.1;
const AGAINST_BY_HINT = 0.4;
const AGAINST_FOR_THE_MOMENT = 0.6;

export interface Judged {
  readonly effect: Effect;
  readonly factor: number;
}

const NEUTRAL: Judged = { effect: 'neutral', factor: 1 };

/** The data do not change while the program runs, so each cell of the table is worked out once. */
const tables = {
  any: new Map<string, Map<CauseId, Judged>>(),
  stall: new Map<string, Map<CauseId, Judged>>(),
};

export function effectOf(check: CheckId, findingId: string, cause: CauseId, complaint: Complaint): Judged {
  const table = complaint === 'stall' ? tables.stall : tables.any;
  const key = `${check}:${findingId}`;
  let row = table.get(key);
  if (row === undefined) {
    row = new Map();
    table.set(key, row);
  }
  let judged = row.get(cause);
  if (judged === undefined) {
    judged = judge(check, findingId, cause, complaint);
    row.set(cause, judged);
  }
  return judged;
}

function judge(check: CheckId, findingId: string, cause: CauseId, complaint: Complaint): Judged {
  const { findings, hint, momentary } = CHECKS[check];
  const finding = findings[findingId];
  if (finding === undefined) return NEUTRAL;
  const passing = momentary === true && complaint === 'stall' && finding.result === 'good';
  if (finding.rulesOut?.includes(cause)) {
    return passing
      ? { effect: 'against', factor: AGAINST_FOR_THE_MOMENT }
      : { effect: 'rules out', factor: 0 };
  }
  if (finding.fits?.includes(cause)) return { effect: 'fits', factor: 1 };
  if (finding.result === 'good' && (hint === true || !isMentioned(check, cause))) return NEUTRAL;
  // A bad finding without causes of its own (a step that makes safe, codes stored) says nothing.
  if (finding.result === 'bad' && finding.fits === undefined) return NEUTRAL;
  if (passing) return { effect: 'against', factor: AGAINST_FOR_THE_MOMENT };
  return { effect: 'against', factor: hint === true ? AGAINST_BY_HINT : AGAINST };
}

/** Whether some bad finding of the check is expected under the cause: then a good one is not. */
const isMentioned = (check: CheckId, cause: CauseId): boolean =>
  Object.values(CHECKS[check].findings).some(({ result, fits }) => result === 'bad' && fits?.includes(cause));

/** The same when one of several findings holds, not known which: what speaks least against the cause. */
export function effectOfAny(
  check: CheckId,
  findings: readonly string[],
  cause: CauseId,
  complaint: Complaint,
): Judged {
  const each = findings.map((finding) => effectOf(check, finding, cause, complaint));
  return each.reduce((best, one) =>
    one.factor > best.factor || (one.factor === best.factor && one.effect === 'fits') ? one : best,
  );
}
