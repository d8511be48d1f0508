import { and, eq, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { jobPatch } from '../../contract/areas/jobs.ts';
import type { JobRecord, PersonCaller } from '../access.ts';
import type { Executor } from '../db/client.ts';
import { job, person } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { checkIfMatch } from '../http/etag.ts';
import { mailHandOver } from '../mail/hand-over-mail.ts';
import { inTransaction } from '../queue/transaction.ts';
import { auditedBy, recordAudit } from '../workshop/audit.ts';
import { checkAssignee } from './check-assignee.ts';
import { nameOf } from './create-job.ts';
import { noteEvent } from './entries/note-event.ts';

type Patch = z.output<typeof jobPatch>;

/**
 * Changes what people edit of a job. A named edition that is no longer the present one is 412; closing what somebody else
 * closed meanwhile is 409 with their name, also when no edition was named.
 */
export async function patchJob(
  caller: PersonCaller,
  row: JobRecord,
  patch: Patch,
  ifMatch: string | undefined,
  address: string,
): Promise<JobRecord> {
  return inTransaction(async (transaction) => {
    const { tx } = transaction;
    const [now] = await tx.select().from(job).where(eq(job.id, row.id)).for('update');
    if (now === undefined || now.deletedAt !== null) throw new ApiError('not_found');
    checkIfMatch(ifMatch, now.edition);
    const closes = patch.state === 'closed';
    if (closes && now.state === 'closed') throw await closedAlready(tx, now);
    const outcome = patch.outcome === undefined ? now.outcome : patch.outcome;
    if ((closes || (now.state === 'closed' && patch.state === undefined)) && !saysEnough(outcome)) {
      throw new ApiError('invalid', {
        details: [
          { path: 'outcome.cause', message: 'say what was found, or in the note why it ends without' },
        ],
      });
    }
    const reopens = now.state === 'closed' && patch.state !== undefined;
    const events = await eventsOf(tx, now, patch);
    const [changed] = await tx
      .update(job)
      .set({
        ...patch.vehicle,
        complaint: patch.complaint ?? now.complaint,
        codes: patch.codes ?? now.codes,
        assigneeId: patch.assigneeId === undefined ? now.assigneeId : patch.assigneeId,
        state: patch.state ?? now.state,
        outcome,
        ...(closes ? { closedAt: sql`now()`, closedBy: caller.personId } : {}),
        ...(reopens ? { closedAt: null, closedBy: null } : {}),
        edition: now.edition + 1,
        updatedAt: sql`now()`,
      })
      .where(and(eq(job.id, now.id), eq(job.edition, now.edition)))
      .returning();
    if (changed === undefined) throw new ApiError('stale');
    for (const text of events) await noteEvent(tx, now.id, caller, text);
    if (changed.assigneeId !== null && changed.assigneeId !== now.assigneeId) {
      const { assigneeId: to, complaint } = changed;
      await mailHandOver(transaction, { jobId: now.id, job: nameOf(now), complaint, to, by: caller });
    }
    if (closes || reopens) {
      const action = closes ? 'job closed' : 'job opened again';
      await recordAudit({ ...auditedBy(caller, now.workshopId, address), action, subject: nameOf(now) }, tx);
    }
    return changed;
  });
}

const saysEnough = (outcome: JobRecord['outcome']): boolean =>
  outcome !== null && (outcome.cause !== '' || outcome.note !== '');

/** What the timeline says about it. */
async function eventsOf(tx: Executor, now: JobRecord, patch: Patch): Promise<string[]> {
  const events: string[] = [];
  if (patch.assigneeId !== undefined && patch.assigneeId !== now.assigneeId) {
    const name = patch.assigneeId === null ? null : await checkAssignee(tx, now.workshopId, patch.assigneeId);
    events.push(name === null ? 'Nobody works on it now' : `Handed to ${name}`);
  }
  if (patch.state !== undefined && patch.state !== now.state) {
    events.push({ open: 'Open again', waiting: 'Waiting', closed: 'Closed' }[patch.state]);
  }
  return events;
}

async function closedAlready(tx: Executor, now: JobRecord): Promise<ApiError> {
  const [by] =
    now.closedBy === null
      ? []
      : await tx.select({ name: person.name }).from(person).where(eq(person.id, now.closedBy));
  return new ApiError('conflict', {
    message: `${by?.name ?? 'Somebody'} closed this job already. Their outcome stands; yours was not kept.`,
    hint: 'Load the job again. Its outcome can be added to while it is closed.',
  });
}
