import { and, count, eq, inArray, isNull, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { checkInput } from '../../../contract/areas/path.ts';
import { db } from '../../db/client.ts';
import { capture, jobCheck, job as jobTable } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { checkIfMatch } from '../../http/etag.ts';
import { tidyCode } from './codes-of.ts';
import { CHECKS } from './data/checks.ts';
import { knownCheck } from './get-job-check.ts';
import { readReadings } from './read-readings.ts';

interface Put {
  readonly job: { readonly id: string; readonly workshopId: string };
  readonly check: string;
  readonly by: { readonly personId: string; readonly name: string };
  readonly input: z.output<typeof checkInput>;
  readonly ifMatch: string | undefined;
}

/** Records a check of a job. Two writers: with If-Match the later one is told, without it the last word stands. */
export async function putJobCheck({ job, check, by, input, ifMatch }: Put): Promise<void> {
  const known = knownCheck(check);
  const invalid = (path: string, message: string) =>
    new ApiError('invalid', { details: [{ path, message }] });
  const finding = input.finding === null ? undefined : CHECKS[known].findings[input.finding];
  if (input.finding !== null && finding === undefined) throw invalid('finding', 'is none of this check');
  if (finding !== undefined && finding.result !== input.result)
    throw invalid('finding', `goes with the result "${finding.result}"`);
  const values = {
    result: input.result,
    finding: input.finding,
    readings: readReadings(known, input.readings),
    codes: [...new Set(input.codes.map(tidyCode))],
    captureIds: [...new Set(input.captureIds)],
    note: input.note,
    stands: input.stands,
    personId: by.personId,
    author: by.name,
  };
  await db().transaction(async (tx) => {
    // The job is held, so that two at once come one after the other and it is not hidden meanwhile.
    const [held] = await tx
      .select({ deletedAt: jobTable.deletedAt })
      .from(jobTable)
      .where(eq(jobTable.id, job.id))
      .for('update');
    if (held === undefined || held.deletedAt !== null) throw new ApiError('not_found');
    if (values.captureIds.length > 0) {
      const [there] = await tx
        .select({ total: count() })
        .from(capture)
        .where(
          and(
            inArray(capture.id, values.captureIds),
            eq(capture.workshopId, job.workshopId),
            isNull(capture.deletedAt),
            eq(capture.practice, false),
          ),
        );
      if (there?.total !== values.captureIds.length)
        throw invalid('captureIds', 'names a capture that is not in this workshop');
    }
    const at = and(eq(jobCheck.jobId, job.id), eq(jobCheck.check, known));
    const [present] = await tx.select({ edition: jobCheck.edition }).from(jobCheck).where(at);
    checkIfMatch(ifMatch, present?.edition ?? 0);
    if (present === undefined) await tx.insert(jobCheck).values({ jobId: job.id, check: known, ...values });
    else
      await tx
        .update(jobCheck)
        .set({ ...values, edition: sql`${jobCheck.edition} + 1`, updatedAt: sql`now()` })
        .where(at);
  });
}
