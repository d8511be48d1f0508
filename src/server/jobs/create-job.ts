import { eq, max, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { jobInput } from '../../contract/areas/jobs.ts';
import type { JobRecord, PersonCaller } from '../access.ts';
import { db, type Executor } from '../db/client.ts';
import { job } from '../db/schema.ts';
import { newId } from '../ids.ts';
import { auditedBy, recordAudit } from '../workshop/audit.ts';
import { checkAssignee } from './check-assignee.ts';
import { noteEvent } from './entries/note-event.ts';

/** Opens a job in the caller's workshop, with the next number there. The caller works on it unless somebody else is named. */
export async function createJob(
  caller: PersonCaller,
  input: z.output<typeof jobInput>,
  address: string,
): Promise<JobRecord> {
  const { workshopId, personId } = caller;
  const assigneeId = input.assigneeId === undefined ? personId : input.assigneeId;
  return db().transaction(async (tx) => {
    const assignee = assigneeId === null ? null : await checkAssignee(tx, workshopId, assigneeId);
    const [made] = await tx
      .insert(job)
      .values({
        id: newId(),
        workshopId,
        number: await nextNumber(tx, workshopId),
        createdBy: personId,
        assigneeId,
        ...input.vehicle,
        complaint: input.complaint,
        codes: input.codes,
      })
      .returning();
    if (made === undefined) throw new Error('the job was not returned');
    const text = assignee === null || assigneeId === personId ? 'Opened' : `Opened, for ${assignee}`;
    await noteEvent(tx, made.id, caller, text);
    await recordAudit(
      { ...auditedBy(caller, workshopId, address), action: 'job opened', subject: nameOf(made) },
      tx,
    );
    return made;
  });
}

/** Two at once wait for each other, so that no number is given twice or left out. */
async function nextNumber(tx: Executor, workshopId: string): Promise<number> {
  await tx.execute(
    sql`select pg_advisory_xact_lock(hashtext('gapmark job number'), hashtext(${workshopId}))`,
  );
  const [last] = await tx
    .select({ number: max(job.number) })
    .from(job)
    .where(eq(job.workshopId, workshopId));
  return (last?.number ?? 0) + 1;
}

/** How a job is named in lists of what happened. */
export const nameOf = (row: Pick<JobRecord, 'number'>): string => `J-${String(row.number).padStart(4, '0')}`;
