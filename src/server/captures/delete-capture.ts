import { and, eq, isNull, sql } from 'drizzle-orm';
import type { CaptureRecord } from '../access.ts';
import { db } from '../db/client.ts';
import { capture } from '../db/schema.ts';
import { ApiError } from '../errors.ts';

/** Hides a capture; it can be brought back for 30 days, then the sweep removes it. Stale editions are 412. */
export async function deleteCapture(row: CaptureRecord): Promise<void> {
  const [hidden] = await db()
    .update(capture)
    .set({ deletedAt: sql`now()`, edition: sql`${capture.edition} + 1` })
    .where(and(eq(capture.id, row.id), eq(capture.edition, row.edition), isNull(capture.deletedAt)))
    .returning({ id: capture.id });
  if (hidden === undefined) throw new ApiError('stale');
}
