import { eq, sql } from 'drizzle-orm';
import type { ShareCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { shareLink } from '../../db/schema.ts';
import { countsLook } from '../../http/limits.ts';

/** The trace was drawn: one look. Many from one address in a minute are not many people. */
export async function countLook(caller: ShareCaller, address: string): Promise<void> {
  if (!(await countsLook(caller.linkId, address))) return;
  await db()
    .update(shareLink)
    .set({ seen: sql`${shareLink.seen} + 1` })
    .where(eq(shareLink.id, caller.linkId));
}
