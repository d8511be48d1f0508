import { and, eq } from 'drizzle-orm';
import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { token } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { auditedBy, recordAudit } from '../workshop/audit.ts';

/** Ends one of the person's own tokens at once. */
export async function deleteToken(caller: PersonCaller, tokenId: string, address: string): Promise<void> {
  await db().transaction(async (tx) => {
    const [gone] = await tx
      .delete(token)
      .where(and(eq(token.id, tokenId), eq(token.personId, caller.personId)))
      .returning({ name: token.name, workshopId: token.workshopId });
    if (gone === undefined) throw new ApiError('not_found');
    await recordAudit(
      { ...auditedBy(caller, gone.workshopId, address), action: 'token ended', subject: gone.name },
      tx,
    );
  });
}
