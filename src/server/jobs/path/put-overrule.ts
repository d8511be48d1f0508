import { and, eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { overruleInput } from '../../../contract/areas/path.ts';
import { db } from '../../db/client.ts';
import { jobOverrule } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { CAUSE_IDS } from './data/causes.ts';

/** A person's word over the reasoning about one cause; null takes it back. */
export async function putOverrule(
  jobId: string,
  cause: string,
  by: { readonly personId: string; readonly name: string },
  { decision, why }: z.output<typeof overruleInput>,
): Promise<void> {
  if (!CAUSE_IDS.some((one) => one === cause))
    throw new ApiError('not_found', { message: 'There is no such cause.' });
  if (decision === null) {
    await db()
      .delete(jobOverrule)
      .where(and(eq(jobOverrule.jobId, jobId), eq(jobOverrule.cause, cause)));
    return;
  }
  const values = { decision, why, personId: by.personId, author: by.name };
  await db()
    .insert(jobOverrule)
    .values({ jobId, cause, ...values })
    .onConflictDoUpdate({ target: [jobOverrule.jobId, jobOverrule.cause], set: values });
}
