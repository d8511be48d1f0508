import type { NextJson } from '../../../contract/areas/path.ts';
import { ALERT_LIST } from './data/alerts.ts';
import { CAUSES } from './data/causes.ts';
import { CAUTIONS } from './data/cautions.ts';
import { CHECKS } from './data/checks.ts';
import { settlesOf, whyOf } from './explain.ts';
import type { Facts } from './facts.ts';
import { measuredJson, recordJson } from './job-check-json.ts';
import { type JobCheckRow, pathOfJob } from './path-of-job.ts';
import { type Reasoned, reason } from './reason.ts';

/** The path of a job: causes with why, the checks left best first, what was taken and what it did, and what does not agree. */
export async function nextOfJob(job: Parameters<typeof pathOfJob>[0]): Promise<NextJson> {
  const { facts, rows } = await pathOfJob(job);
  return nextJson(facts, rows);
}

export function nextJson(facts: Facts, rows: readonly JobCheckRow[]): NextJson {
  const reasoned = reason(facts);
  return {
    complaint: reasoned.complaint,
    complaintGuessed: reasoned.complaintGuessed,
    causes: reasoned.causes.map(({ because, ...one }) => ({
      ...one,
      name: CAUSES[one.cause].name,
      prove: CAUSES[one.cause].prove,
      because: [...because],
    })),
    checks: reasoned.proposals.map((proposal) => {
      const { title, minutes, risk, needs, cautions } = CHECKS[proposal.check];
      return {
        check: proposal.check,
        title,
        why: whyOf(proposal, reasoned),
        settles: settlesOf(proposal.check, reasoned),
        minutes,
        risk,
        needs: [...needs],
        cautions: cautions.map((one) => CAUTIONS[one]),
        before: proposal.before,
        again: proposal.again,
      };
    }),
    steps: stepsOf(facts, rows, reasoned),
    contradictions: reasoned.contradictions.map(({ kind, checks, text }) => ({
      kind,
      checks: [...checks],
      text,
    })),
    alerts: [...reasoned.alerts].map((alert) => ALERT_LIST[alert].text),
    held: reasoned.held.map(({ check, alerts, hybrid }) => ({
      check,
      title: CHECKS[check].title,
      why: hybrid
        ? 'A high-voltage machine may turn this engine, or that is not known: cranking checks do not apply.'
        : alerts.map((alert) => ALERT_LIST[alert].text).join(' '),
    })),
    codes: reasoned.codes.map(({ code, known }) => ({
      code,
      title: known?.title ?? null,
      titleFrom: known?.titleFrom ?? null,
      checks: [...(known?.checks ?? [])],
    })),
  };
}

/** What was recorded, in order, then what captures alone have settled. */
function stepsOf(facts: Facts, rows: readonly JobCheckRow[], reasoned: Reasoned): NextJson['steps'] {
  const recorded = facts.records.map((record) => record.check);
  const settled = [...reasoned.known.outcomes.keys()].filter((check) => !recorded.includes(check));
  return [...recorded, ...settled].map((check) => {
    const row = rows.find((one) => one.check === check);
    const outcome = reasoned.known.outcomes.get(check);
    const { title, findings } = CHECKS[check];
    const [first = ''] = outcome?.findings ?? [];
    const seen = outcome?.findings ?? (row?.finding ? [row.finding] : []);
    return {
      check,
      title,
      result: row?.result ?? findings[first]?.result ?? 'unclear',
      says: seen.length === 1 ? (findings[seen[0] ?? '']?.says ?? '') : '',
      by: row === undefined ? ('capture' as const) : ('person' as const),
      record: row === undefined ? null : recordJson(row),
      measured: measuredJson(check, facts.measured),
      ruledOut: reasoned.causes
        .filter(({ because }) => because.some((one) => one.check === check && one.effect === 'rules out'))
        .map(({ cause }) => CAUSES[cause].name),
      otherwise: Object.entries(findings)
        .filter(([id]) => !seen.includes(id))
        .map(([, { says, fits = [] }]) => ({
          says,
          pointsAt: fits.slice(0, 3).map((cause) => CAUSES[cause].name),
        })),
    };
  });
}
