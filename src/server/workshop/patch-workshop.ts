import { and, eq, sql } from 'drizzle-orm';
import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { workshop } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { checkIfMatch } from '../http/etag.ts';
import { auditedBy, recordAudit } from './audit.ts';

interface WorkshopPatch {
  readonly name?: string | undefined;
  readonly timeZone?: string | undefined;
  readonly auditDays?: number | undefined;
}

/** Changes the current workshop's name or time zone. */
export async function patchWorkshop(
  caller: PersonCaller,
  patch: WorkshopPatch,
  ifMatch: string | undefined,
  address: string,
) {
  return db().transaction(async (tx) => {
    const mine = eq(workshop.id, caller.workshopId);
    const [now] = await tx.select().from(workshop).where(mine).for('update');
    if (now === undefined) throw new ApiError('not_found');
    checkIfMatch(ifMatch, now.edition);
    const [changed] = await tx
      .update(workshop)
      .set({
        name: patch.name ?? now.name,
        timeZone: patch.timeZone ?? now.timeZone,
        auditDays: patch.auditDays ?? now.auditDays,
        edition: sql`${workshop.edition} + 1`,
      })
      .where(and(mine, eq(workshop.edition, now.edition)))
      .returning();
    if (changed === undefined) throw new ApiError('stale');
    await recordAudit(
      { ...auditedBy(caller, caller.workshopId, address), action: 'workshop changed', subject: changed.name },
      tx,
    );
    return changed;
  });
}
