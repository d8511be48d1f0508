import type { JobCheckJson } from '../../../contract/areas/path.ts';
import { ApiError } from '../../errors.ts';
import { type CheckId, isCheckId } from './data/checks.ts';
import { measuredJson, recordJson } from './job-check-json.ts';
import { pathOfJob } from './path-of-job.ts';

/** A check of the path by its name; another is not there. */
export function knownCheck(check: string): CheckId {
  if (!isCheckId(check)) throw new ApiError('not_found', { message: 'There is no such check.' });
  return check;
}

/** What was recorded for a check of a job, and what its captures show by themselves. */
export async function getJobCheck(
  job: Parameters<typeof pathOfJob>[0],
  check: string,
): Promise<JobCheckJson> {
  const known = knownCheck(check);
  const { facts, rows } = await pathOfJob(job);
  const row = rows.find((one) => one.check === known);
  return {
    check: known,
    record: row === undefined ? null : recordJson(row),
    measured: measuredJson(known, facts.measured),
  };
}
