import { eq } from 'drizzle-orm';
import { db } from '../server/db/client.ts';
import { capture } from '../server/db/schema.ts';

/** Whether the work at this revision is still wanted; asked when a stop was heard, which may have meant an earlier attempt. */
export async function stillWanted(captureId: string, revision: number): Promise<boolean> {
  const [row] = await db()
    .select({ revision: capture.revision, status: capture.status })
    .from(capture)
    .where(eq(capture.id, captureId));
  return row !== undefined && row.revision === revision && row.status !== 'cancelled';
}
